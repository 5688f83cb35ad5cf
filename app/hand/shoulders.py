"""What a shoulder begins with where it is put on by hand.

Between two solid round sections it is a fillet radius, since the factor follows from it. Elsewhere it is a
factor high enough for most steps. Both are typed over at once.
"""

from __future__ import annotations

from msgspec import UnsetType

from app.shoulder_entry import parse_shoulder
from solver.model import Project, RoundSection, Shoulder, UnitSystemName

CAUTIOUS = 3.0  # a factor that few steps exceed in tension


def begun_shoulder(project: Project, joint: int, text: str, system: UnitSystemName) -> Shoulder | UnsetType:
    """The shoulder of a joint until it is typed; `text` is what one between round sections begins with."""
    beside = project.segments[max(joint - 1, 0) : joint + 1]
    if all(isinstance(segment.section, RoundSection) for segment in beside):
        return parse_shoulder(text, system)
    return Shoulder(factor=CAUTIOUS)


def is_at_end(project: Project, joint: int) -> bool:
    """Whether the member ends at the joint, so that there can be no step."""
    return joint in (0, len(project.segments))
