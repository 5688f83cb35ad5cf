"""What was entered of stability: the least critical factor, and why the check is done without."""

from __future__ import annotations

from collections.abc import Iterator

from msgspec import UnsetType

from app.sheet.blocks import Block, paragraph
from app.sheet.readings import Readings
from app.words import tr
from solver.model import Project
from solver.stability_checks import waiver_of


def stability_inputs(project: Project, say: Readings) -> Iterator[Block]:
    """A line for each; nothing where neither was entered."""
    required, waiver = project.limits.stability_factor, waiver_of(project)
    if not isinstance(required, UnsetType):
        words = tr("Stability: critical factor of at least {factor} required.")
        yield paragraph(words.format(factor=say.exact(required, "factor")))
    if waiver is not None:
        yield paragraph(tr("Stability waived where it cannot be checked: {reason}").format(reason=waiver))
