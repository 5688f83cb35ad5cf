"""What is found, as window, terminal and sheet all show it: frozen values made from `Results`, with words.

`records` says what there is to show, `stress` and `limits` make the checked part, `books` reactions,
displacements and energy; `comparison` holds results against a reference. Nothing here is computed anew: the
numbers were made and compared by the solver.
"""

from app.findings.comparison import Change, Comparison, comparison
from app.findings.make import findings, findings_in
from app.findings.records import (
    Band,
    CompanionFinding,
    CompanionState,
    ContactFinding,
    Findings,
    JointDisplacement,
    JointReaction,
    LimitFinding,
    NotMade,
    SegmentFinding,
    StateBooks,
    SupportPart,
)

__all__ = [
    "Band",
    "Change",
    "CompanionFinding",
    "CompanionState",
    "Comparison",
    "ContactFinding",
    "Findings",
    "JointDisplacement",
    "JointReaction",
    "LimitFinding",
    "NotMade",
    "SegmentFinding",
    "StateBooks",
    "SupportPart",
    "comparison",
    "findings",
    "findings_in",
]
