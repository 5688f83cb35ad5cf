"""+ and − on the tinted member, so that colour is not alone in saying what is tension and what compression.

They stand beside the marks of segments; where segments are too short for that, once for each run of one sign.
"""

from __future__ import annotations

from itertools import groupby, pairwise

import numpy as np
from msgspec import Struct

from app.drawing.frame import Frame
from app.drawing.member import Member
from app.drawing.overlay import Graded, Shade, Sign
from app.drawing.placing import Span
from app.drawing.shapes import Picture, Point

GROUND = 6.5  # px, radius of the ground of a sign
SIGN = 12.0  # px, of a sign on its ground and a gap


class Mark(Struct, frozen=True, gc=False):
    """A + or − on a ground of its own."""

    centre: Point
    sign: Sign


def sign_marks(
    member: Member, frame: Frame, picture: Picture, shown: Graded, found: list[Shade]
) -> tuple[Mark, ...]:
    """The signs of segments with room for them, and of the runs of shades that then have none."""
    signs = _Signs(member, frame, picture)
    marks = signs.of_segments(shown)
    return (*marks, *signs.of_runs(found, marks))


class _Signs:
    """Places signs along the axis, off the marks of segments."""

    def __init__(self, member: Member, frame: Frame, picture: Picture) -> None:
        self._member, self._frame, self._picture = member, frame, picture
        low, high = sorted((frame.ruler.begin, frame.ruler.end))
        self._window = low, high

    def of_segments(self, shown: Graded) -> list[Mark]:
        """+ or − on both sides of the mark of every segment that is long enough."""
        joints = np.clip(self._frame.ruler.pixel(np.asarray(self._member.position)), *self._window)
        long = np.flatnonzero(np.abs(np.diff(joints)) > 3.0 * SIGN)[: len(self._member.project.segments)]
        spans = [(int(i), *sorted(joints[i : i + 2].tolist())) for i in long]
        return [mark for index, low, high in spans for mark in self._of_segment(shown, index, (low, high))]

    def _of_segment(self, shown: Graded, index: int, span: Span) -> list[Mark]:
        width, middle = span[1] - span[0], 0.5 * (span[0] + span[1])
        extent = max(self._frame.measure(self._member.project.segments[index].mark, "strong"))
        aside = max(0.25 * width, 0.5 * extent + SIGN)
        if 0.5 * width < aside + 0.6 * SIGN:
            return []
        marks = []
        for along in (middle - aside, middle + aside):
            value = np.interp(self._frame.ruler.position_at(along), shown.x, shown.value)
            if value:
                marks.append(self._mark(along, 0.0, 1 if value > 0 else -1))
        return marks

    def of_runs(self, found: list[Shade], marks: list[Mark]) -> list[Mark]:
        """One sign for each run of one sign that carries none yet and is wide enough for it."""
        said = [self._along(mark.centre) for mark in marks]
        taken = self._taken()
        added = []
        for sign, run in groupby(found, key=lambda shade: shade.sign):
            span = self._span_of(list(run))
            if sign and span[1] - span[0] >= SIGN and not any(span[0] <= at <= span[1] for at in said):
                added.append(self._in_run(span, taken, sign))
        return added

    def _in_run(self, span: Span, taken: list[Span], sign: Sign) -> Mark:
        """In the widest gap between marks of segments; beside the axis where they leave none."""
        inside = [(max(a, span[0]), min(b, span[1])) for a, b in taken if b > span[0] and a < span[1]]
        corners = [(span[0], span[0]), *inside, (span[1], span[1])]
        gaps = [(after[0] - before[1], 0.5 * (after[0] + before[1])) for before, after in pairwise(corners)]
        room, middle = max(gaps)
        if room >= 2.0 * GROUND:
            return self._mark(middle, 0.0, sign)
        height = self._frame.measure("0", "strong")[1]
        return self._mark(0.5 * (span[0] + span[1]), 0.5 * height + 2.0 + GROUND, sign)

    def _taken(self) -> list[Span]:
        """Along the axis, where marks of segments stand, growing."""
        boxes = [t.box for t in self._picture.texts if t.part is not None and t.part.kind == "mark"]
        upright = self._frame.upright
        spans = [(b.top, b.bottom) if upright else (b.left, b.right) for b in boxes]
        return sorted((low - 4.0, high + 4.0) for low, high in spans)

    def _span_of(self, run: list[Shade]) -> Span:
        ends = (self._frame.ruler.pixel(run[0].first), self._frame.ruler.pixel(run[-1].last))
        low, high = np.clip(sorted(ends), *self._window).tolist()
        return low, high

    def _along(self, point: Point) -> float:
        return point[1] if self._frame.upright else point[0]

    def _mark(self, along: float, aside: float, sign: Sign) -> Mark:
        across = self._picture.axis + aside
        return Mark((across, along) if self._frame.upright else (along, across), sign)
