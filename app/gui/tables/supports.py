"""Other supports typed at a joint, in the table of segments as in that of joints."""

from __future__ import annotations

from app import edits
from app.gui.tables.column import Change
from app.hand.freeing import gone_with_supports
from app.support_entry import Supports
from solver.model import Project


def with_supports(project: Project, joint: int, supports: Supports) -> Change:
    """The joint held so; with no support its movements go as well, which the note says."""
    held = edits.hold_joint(project, joint, supports)
    return Change(held, "" if supports else gone_with_supports(project, held))
