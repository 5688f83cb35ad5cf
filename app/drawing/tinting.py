"""The shapes of results on the drawing, in pixels: tinted stretches of the body, signs, scale, outline.

They are laid over what `layout` has made of the same member in the same frame, by its axis and scale.
"""

from __future__ import annotations

import numpy as np
from msgspec import Struct

from app.drawing.frame import Frame
from app.drawing.member import Member
from app.drawing.overlay import STEPS, Graded, Shade, Sign, shades
from app.drawing.shapes import Box, Picture, Point, Stroke, Text
from app.drawing.signs import Mark, sign_marks
from app.units import format_value, symbol
from app.words import tr
from solver.arrays import FloatArray
from solver.sections import outline

LEAST_HALF = 2.0  # pixels, as the body is drawn
STEP_WIDTH, BAR, GAP = 9.0, 6.0, 5.0  # of the scale, px
SAMPLES = 6  # of a stretch whose edge may be curved


class Tint(Struct, frozen=True):
    """A filled polygon: the colour of tension or compression in some strength.

    It is hatched where over 1, and the other way where a check was not made.
    """

    points: tuple[Point, ...]
    sign: Sign
    step: int
    over: bool = False
    unchecked: bool = False


class Tinting(Struct, frozen=True):
    """All that is tinted."""

    tints: tuple[Tint, ...] = ()
    marks: tuple[Mark, ...] = ()
    scale: tuple[Tint, ...] = ()
    texts: tuple[Text, ...] = ()


def tinted(member: Member, frame: Frame, picture: Picture, shown: Graded) -> Tinting:
    """The body's stretches in their shades, with signs, and the scale where there is room for it."""
    body = _Body(member, frame, picture)
    last = len(member.project.segments)
    found = [shade for shade in shades(shown, frame.ruler) if shade.until < last]
    tints = tuple(
        Tint(body.stretch(shade), shade.sign, shade.step, shade.over, shade.unchecked)
        for shade in found
        if shade.sign or shade.unchecked
    )
    scale, words = _scale(frame, picture, shown, member)
    return Tinting(tints, sign_marks(member, frame, picture, shown, found), tuple(scale), words)


class _Body:
    """Turns places of segments into points of the drawing."""

    def __init__(self, member: Member, frame: Frame, picture: Picture) -> None:
        self._member, self._frame, self._picture = member, frame, picture

    def point(self, along: float, aside: float) -> Point:
        across = self._picture.axis + aside
        return (across, along) if self._frame.upright else (along, across)

    def stretch(self, shade: Shade) -> tuple[Point, ...]:
        """The part of a segment's outline between two places; results may be of an earlier, longer one."""
        segment = self._member.project.segments[shade.segment]
        start, end = self._member.position[shade.segment : shade.segment + 2]
        until = self._member.position[shade.until + 1]
        samples = SAMPLES if shade.until == shade.segment else 2
        places = np.clip(np.linspace(shade.first, shade.last, samples), start, until).tolist()
        edge = []
        for x in places:
            share = min((x - start) / (end - start), 1.0)
            depth = outline(segment.section, share).outer * self._picture.scale
            edge.append((self._frame.ruler.pixel(x), max(depth, LEAST_HALF)))
        upper = [self.point(a, -h) for a, h in edge]
        return (*upper, *(self.point(a, h) for a, h in reversed(edge)))


def _scale(
    frame: Frame, picture: Picture, shown: Graded, member: Member
) -> tuple[list[Tint], tuple[Text, ...]]:
    """From the largest compression through 0 to the largest tension, numbers at the ends."""
    if picture.legend is None:
        return [], ()
    return (
        _upright_scale(frame, picture.legend, shown, member)
        if frame.upright
        else _flat_scale(frame, picture.legend, shown, member)
    )


def _flat_scale(frame: Frame, box: Box, shown: Graded, member: Member) -> tuple[list[Tint], tuple[Text, ...]]:
    """In one line: title, number, steps, number."""
    height = box.bottom - box.top
    title, at = _word(frame, scale_title(shown, member), (box.left, box.top))
    before, at = _word(frame, _numbers(shown, member)[0], (at + GAP, box.top))
    tints, at = _bar(at + GAP, box.top + 0.5 * height, _ends(shown))
    after, _ = _word(frame, _numbers(shown, member)[1], (at + GAP, box.top))
    return tints, (title, before, after)


def _upright_scale(
    frame: Frame, box: Box, shown: Graded, member: Member
) -> tuple[list[Tint], tuple[Text, ...]]:
    """As narrow as the dimensions under it: title, numbers, steps, one under the other."""
    height = 0.5 * (box.bottom - box.top - BAR)
    title, _ = _word(frame, scale_title(shown, member), (box.left, box.top))
    tints, right = _bar(box.left, box.bottom - 0.5 * BAR, _ends(shown), _upright_step(member, frame, shown))
    first, last = _numbers(shown, member)
    before, _ = _word(frame, first, (box.left, box.top + height))
    after, _ = _word(frame, last, (right - frame.measure(last, "small")[0], box.top + height))
    return tints, (title, before, after)


def _upright_step(member: Member, frame: Frame, shown: Graded) -> float:
    """So wide that the numbers at the ends keep apart."""
    numbers = GAP + sum(frame.measure(text, "small")[0] for text in _numbers(shown, member))
    return max(STEP_WIDTH, numbers / (len(_ends(shown)) * STEPS))


def _word(frame: Frame, text: str, corner: Point) -> tuple[Text, float]:
    """A text from its top left corner on, and where it ends."""
    width, height = frame.measure(text, "small")
    (left, top), right = corner, corner[0] + width
    return Text(Box(left, top, right, top + height), text, "small", "quiet"), right


def _numbers(shown: Graded, member: Member) -> tuple[str, str]:
    """What stands at the ends of the scale."""
    number, ends = format_value(shown.largest, shown.quantity, member.system, strip=True), _ends(shown)
    return (f"−{number}" if -1 in ends else "0", f"+{number}" if 1 in ends else "0")


def _ends(shown: Graded) -> tuple[Sign, ...]:
    signs: tuple[Sign, ...] = (-1, 1)
    return tuple(sign for sign in signs if (shown.value * sign > 0).any())


def _bar(
    left: float, middle: float, ends: tuple[Sign, ...], width: float = STEP_WIDTH
) -> tuple[list[Tint], float]:
    """The steps of the scale, from compression to tension."""
    steps = [(sign, step) for sign in ends for step in _steps(sign)]
    tints = []
    for index, (sign, step) in enumerate(steps):
        a, b = left + index * width, left + (index + 1) * width
        top, foot = middle - 0.5 * BAR, middle + 0.5 * BAR
        tints.append(Tint(((a, top), (b, top), (b, foot), (a, foot)), sign, step))
    return tints, left + len(steps) * width


def _steps(sign: Sign) -> list[int]:
    return list(range(STEPS, 0, -1)) if sign < 0 else list(range(1, STEPS + 1))


def scale_title(shown: Graded, member: Member) -> str:
    """What the colours mean, with its unit; of an envelope that it is the governing value."""
    unit = symbol(shown.quantity, member.system)
    name = "N" if shown.quantity == "force" else "σ"
    if shown.governing:
        return tr("{name} {unit}, largest of all:").format(name=name, unit=unit)
    if not shown.checked:
        return tr("{name} {unit}, not checked:").format(name=name, unit=unit)
    return f"{name} {unit}:"


def legend_size(member: Member, frame: Frame, shown: Graded) -> tuple[float, float]:
    """The room that the scale takes: beside its title, upright under it."""
    title, height = frame.measure(scale_title(shown, member), "small")
    ends = len(_ends(shown))
    if frame.upright:
        return max(title, ends * STEPS * _upright_step(member, frame, shown)), 2.0 * height + BAR
    numbers = sum(frame.measure(text, "small")[0] for text in _numbers(shown, member))
    return title + numbers + ends * STEPS * STEP_WIDTH + 3.0 * GAP, height


def displaced_outline(
    member: Member, frame: Frame, picture: Picture, moved: FloatArray, factor: float
) -> tuple[Stroke, ...]:
    """The outline of every segment and the line of every joint, moved along the axis by `factor` times u."""
    body, ruler = _Body(member, frame, picture), frame.ruler
    shifts = (moved * factor * ruler.scale).tolist()
    along = [ruler.pixel(x) + shift for x, shift in zip(member.position, shifts, strict=False)]
    strokes = []
    for segment, a, b in zip(member.project.segments, along[:-1], along[1:], strict=False):
        if not _near(a, b, frame):
            continue
        ends = [max(outline(segment.section, s).outer * picture.scale, LEAST_HALF) for s in (0.0, 1.0)]
        corners = ((a, -ends[0]), (b, -ends[1]), (b, ends[1]), (a, ends[0]))
        points = tuple(body.point(*corner) for corner in corners)
        strokes.append(Stroke(points, "quiet", 1.3, closed=True))
    return tuple(strokes)


def _near(a: float, b: float, frame: Frame) -> bool:
    low, high = sorted((frame.ruler.begin, frame.ruler.end))
    return max(a, b) >= low - 40.0 and min(a, b) <= high + 40.0
