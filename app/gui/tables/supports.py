"""Another support typed at a joint, in the table of segments as in that of joints."""

from __future__ import annotations

from msgspec import UnsetType

from app import edits
from app.gui.tables.column import Change
from app.hand.freeing import gone_with_supports
from solver.model import AnySupport, Project


def with_support(project: Project, joint: int, support: AnySupport | UnsetType) -> Change:
    """The joint held so; with no support its movements go as well, which the note says."""
    if isinstance(support, UnsetType):
        freed = edits.free_joints(project, (joint,))
        return Change(freed, gone_with_supports(project, freed))
    return Change(edits.set_value(project, ("joints", joint, "support"), support))
