"""What went unasked with a support that was taken off, in words."""

from __future__ import annotations

from itertools import compress

from app import edits
from app.words import tr, trn
from solver.model import Project, supports_of


def gone_with_supports(old: Project, new: Project) -> str:
    """A line on the movements that went with the supports between two states of one chain, empty for none."""
    pairs = zip(old.joints, new.joints, strict=True)
    freed = (bool(supports_of(was)) and not supports_of(now) for was, now in pairs)
    marks = edits.moving_joints(old, compress(range(len(old.joints)), freed))
    if len(marks) == 1:
        return tr("the movement of joint {mark} went with its support").format(mark=marks[0])
    words = trn(
        "the movement of {count} joint went with its support",
        "the movements of {count} joints went with their supports",
        len(marks),
    )
    return words.format(count=len(marks)) if marks else ""
