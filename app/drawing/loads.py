"""The loads of the shown state: bands with arrows, arrows with values, and what can only be said in words.

Arrows show the direction, so values stand without sign, except where a load changes direction on its way.
"""

from __future__ import annotations

from collections.abc import Iterator
from itertools import groupby

import numpy as np
from msgspec.structs import replace

from app.drawing.bonded import bonded_text
from app.drawing.placing import CLEAR, STACKED, Placed, Span, Wish
from app.drawing.shapes import Box, Part, PartKind, Point
from app.drawing.sketch import Sketch, Toward
from app.drawing.words import (
    bedding_text,
    distributed_text,
    fit_text,
    gravity_text,
    signed_text,
    value_text,
    warmth_text,
)
from app.words import tr
from solver.arrays import FloatArray
from solver.chain import Loads
from solver.model import UnitSystemName, end_of, supports_of

ARROW = 32.0  # length of the arrow of a joint force, px
LEAST_ARROW = 13.0
HEAD = 5.0
GRAVITY_RANK = 2  # before what is said of many segments, where it finds no room after them
LAST_RANK = 6  # it is of no one segment, so that it stands where the others leave room
LEAST_BAND = 5.0  # height of the smallest distributed load, px
HIGHEST_BAND = 60.0  # while a load is pulled beyond its row


def draw_loads(sketch: Sketch, wishes: list[Wish]) -> None:
    """All that acts, and the bedding, which is drawn whether anything acts or not, with their labels."""
    _draw_bedding(sketch)
    _draw_brackets(sketch)
    if sketch.member.loads is not None:
        _draw_distributed(sketch, sketch.member.loads.distributed[0])
        _draw_forces(sketch, sketch.member.loads.joint_force[0])
    rows = sketch.rows.labels
    others = sketch.texts_in(rows)
    for label in _placed(sketch, wishes, others):
        toward = _toward(label.wish)
        if not sketch.is_free(label.wish, label.span, rows[label.row], toward, others):
            sketch.picture.left_out += 1
        elif label.wish.part.kind == "force":
            sketch.text(label.wish, label.span, rows[label.row], "high", "small_strong", "ink")
        else:
            sketch.text(label.wish, label.span, rows[label.row], toward)


def _toward(wish: Wish) -> Toward:
    """The side of its row that a label keeps to: the member's, but for weight, which is of no place on it."""
    return "low" if wish.part.kind == "gravity" else "high"


def _placed(sketch: Sketch, wishes: list[Wish], others: list[Box]) -> list[Placed]:
    """The labels with a place; self-weight after all others, but before them rather than not at all."""
    rows, clear = sketch.rows.labels, STACKED if sketch.frame.upright else CLEAR
    before = sketch.picture.left_out
    found = sketch.placed(wishes, rows, clear)
    weights = [label for label in found if label.wish.part.kind == "gravity"]
    stands = any(sketch.is_free(w.wish, w.span, rows[w.row], _toward(w.wish), others) for w in weights)
    if stands or all(wish.part.kind != "gravity" for wish in wishes):
        return found
    sketch.picture.left_out = before
    first = [replace(w, rank=GRAVITY_RANK) if w.part.kind == "gravity" else w for w in wishes]
    return sketch.placed(first, rows, clear)


def load_wishes(sketch: Sketch) -> list[Wish]:
    """The labels that want a place in the rows of labels; forces come first."""
    wishes = _bedding_wishes(sketch) + _bonded_wishes(sketch)
    loads = sketch.member.loads
    if loads is None:
        return wishes
    wishes += _force_wishes(sketch, loads.joint_force[0])
    wishes += _distributed_wishes(sketch, loads.distributed[0])
    wishes += _movement_wishes(sketch, loads.movement[0])
    system = sketch.member.system
    wishes += _run_wishes(sketch, _misfits(loads, system), "fit", rank=3)
    wishes += _run_wishes(sketch, _warmths(loads, system), "warmth", rank=4)
    return wishes + _gravity_wishes(sketch, float(loads.gravity[0]))


# Distributed loads


def _draw_distributed(sketch: Sketch, distributed: FloatArray) -> None:
    heights = band_heights(sketch, distributed)
    for index, (start, end) in enumerate(distributed.tolist()):
        span, pair = sketch.shown_span(index), heights[index]
        if span is not None and pair is not None:
            _draw_band(sketch, index, (start, end), pair)
            sketch.target(span, sketch.rows.band, Part("distributed", index))
            if start != end:
                _aim_at_end(sketch, index, span)


def _aim_at_end(sketch: Sketch, index: int, span: Span) -> None:
    """Of a load that varies, the half towards its end is pointed at by itself."""
    low, high = span
    half = 0.5 * (low + high)
    last = (half, high) if sketch.forward > 0 else (low, half)
    sketch.target(last, sketch.rows.band, Part("distributed_end", index))


def band_heights(sketch: Sketch, distributed: FloatArray) -> list[tuple[float, float] | None]:
    """How high the band of each segment is at its start and end, px, by its share of the largest load."""
    room = sketch.rows.band[1] - sketch.rows.band[0] - LEAST_BAND
    largest = sketch.largest or sketch.largest_load or 1.0
    heights = np.where(distributed == 0.0, 0.0, LEAST_BAND + np.abs(distributed) / largest * room)
    pairs: list[tuple[float, float]] = [(a, b) for a, b in np.minimum(heights, HIGHEST_BAND).tolist()]
    return [pair if pair[0] or pair[1] else None for pair in pairs]


def _distributed_wishes(sketch: Sketch, distributed: FloatArray) -> list[Wish]:
    wishes = []
    for index, (start, end) in enumerate(distributed.tolist()):
        span = sketch.shown_span(index)
        if span is not None and (start or end):
            text = distributed_text(start, end, sketch.member.system, signed=False)
            part = Part("distributed", index)
            wishes.append(
                sketch.wish(text, 0.5 * (span[0] + span[1]), part, rank=1, slide=0.5 * (span[1] - span[0]))
            )
    return wishes


def _draw_band(sketch: Sketch, index: int, load: tuple[float, float], heights: tuple[float, float]) -> None:
    """A band as high as the load's share of the largest, with arrows of its direction."""
    base, (start, end) = sketch.rows.band[1], load
    ends = sketch.along(index), sketch.along(index + 1)
    part = Part("distributed", index)
    top = [(a, base - h) for a, h in zip(ends, heights, strict=True)]
    outline = [(ends[0], base), *top, (ends[1], base)]
    sketch.line(*outline, ink="quiet", fill="load_fill", closed=True, part=part, clip=True)
    arrows: list[tuple[float, float]] = []
    for share in _shares_of_arrows(sketch, ends):
        value = start + share * (end - start)
        if value:
            direction = sketch.forward if value > 0.0 else -sketch.forward
            arrows += _little_arrow(ends[0] + share * (ends[1] - ends[0]), base - 3.5, direction)
    sketch.lines(arrows, part=part, clip=True)


def _little_arrow(middle: float, across: float, direction: float) -> list[tuple[float, float]]:
    """The lines of an arrow of a distributed load, point by point."""
    tail, tip = (middle - 6.0 * direction, across), (middle + 6.0 * direction, across)
    back = tip[0] - 3.0 * direction
    return [tail, tip, (back, across - 2.1), tip, tip, (back, across + 2.1)]


def _shares_of_arrows(sketch: Sketch, ends: Span) -> Iterator[float]:
    """Where along a band its arrows are, in shares of it: only near the window, however far zoomed in."""
    length = ends[1] - ends[0]
    count = max(int(abs(length) / 26.0), 1)
    low, high = sorted((edge - ends[0]) / length * count for edge in sketch.window)
    for i in range(max(int(low) - 1, 0), min(int(high) + 2, count)):
        yield (i + 0.5) / count


def _arrow(
    sketch: Sketch, tail: float, length: float, across: float, width: float, head: float, part: Part
) -> None:
    """An arrow along the axis from its tail."""
    tip = tail + length
    back = tip - np.sign(length) * head
    sketch.line((tail, across), (tip, across), width=width, part=part)
    wings = (back, across - 0.7 * head), (tip, across), (back, across + 0.7 * head)
    sketch.line(*wings, width=width, part=part)


# Forces at joints


def _draw_forces(sketch: Sketch, forces: FloatArray) -> None:
    for joint, force in enumerate(forces.tolist()):
        if force and sketch.holds(joint):
            _draw_force(sketch, joint, force)


def force_line(sketch: Sketch, joint: int, force: float) -> tuple[Point, Point]:
    """Tail and tip of the arrow of a force, (along, across)."""
    tail, tip_at = _force_span(sketch, joint, force)
    across = sketch.rows.axis if lies_outside(sketch, joint) else sketch.rows.arrows
    return (tail, across), (tip_at, across)


def _draw_force(sketch: Sketch, joint: int, force: float) -> None:
    part = Part("force", joint)
    (tail, across), (tip_at, _) = force_line(sketch, joint, force)
    outside = lies_outside(sketch, joint)
    _arrow(sketch, tail, tip_at - tail, across, 2.4, HEAD + 3.0, part)
    below = 12.0 if outside else 9.0  # the row of arrows is near the member, which must stay within reach
    sketch.target((tail, tip_at), (across + below - 24.0, across + below), part)
    wish = _outside_wish(sketch, joint, force) if outside else None
    if wish is not None:
        span = wish.along - 0.5 * wish.extent, wish.along + 0.5 * wish.extent
        across -= 10.0
        sketch.text(wish, span, (across - wish.depth, across), face="small_strong", ink="ink")


def _force_span(sketch: Sketch, joint: int, force: float) -> tuple[float, float]:
    """Tail and tip: an arrow starts at its joint, or ends there where it presses on an end from outside."""
    direction = sketch.forward * (1.0 if force > 0 else -1.0)
    last = len(sketch.member.project.segments)
    pressing = (joint == 0 and force > 0) or (joint == last and force < 0)
    along, gap = sketch.along(joint), 3.0 * direction
    inner = min(max(0.45 * sketch.shortest_beside(joint), LEAST_ARROW), ARROW)
    length = direction * (ARROW if lies_outside(sketch, joint) else inner)
    tail = along - gap - length if pressing else along + gap
    return tail, tail + length


def lies_outside(sketch: Sketch, joint: int) -> bool:
    """Whether a force lies on the axis outside the member: at a free end; else it is in the row of arrows."""
    at_end = joint in (0, len(sketch.member.project.segments))
    return at_end and not supports_of(sketch.member.project.joints[joint])


def _outside_wish(sketch: Sketch, joint: int, force: float) -> Wish | None:
    """The label beside an arrow outside the member, None where the margin is too narrow for it."""
    wish = _force_wish(sketch, joint, force)
    low, high = sketch.margin_beyond(joint)
    if wish.extent > high - low:
        return None
    half = 0.5 * wish.extent
    return replace(wish, along=min(max(wish.along, low + half), high - half))


def _force_wish(sketch: Sketch, joint: int, force: float) -> Wish:
    middle = 0.5 * sum(_force_span(sketch, joint, force))
    text = value_text(abs(force), "force", sketch.member.system)
    wish = sketch.wish(text, middle, Part("force", joint), face="small_strong")
    return replace(wish, slide=0.4 * wish.extent)


def _force_wishes(sketch: Sketch, forces: FloatArray) -> list[Wish]:
    """Labels of forces that do not stand beside their arrow."""
    return [
        _force_wish(sketch, joint, force)
        for joint, force in enumerate(forces.tolist())
        if force
        and sketch.holds(joint)
        and not (lies_outside(sketch, joint) and _outside_wish(sketch, joint, force) is not None)
    ]


# What is said in words


def _movement_wishes(sketch: Sketch, movement: FloatArray) -> list[Wish]:
    wishes = []
    for joint, value in enumerate(movement.tolist()):
        if value and sketch.holds(joint):
            text = tr("moved {value}").format(value=signed_text(value, "displacement", sketch.member.system))
            wish = sketch.wish(text, sketch.along(joint), Part("movement", joint), rank=1, slide=60.0)
            wishes.append(replace(wish, along=_beyond_end(sketch, joint, wish)))
    return wishes


def _beyond_end(sketch: Sketch, joint: int, wish: Wish) -> float:
    """At an end of the member beyond it, as far as there is room: segments need the place beside them."""
    if 0 < joint < len(sketch.member.project.segments):
        return wish.along
    low, high = sketch.margin_beyond(joint)
    half = 0.5 * wish.extent
    outward = low < sketch.window[0]
    along = min(wish.along, high - half) if outward else max(wish.along, low + half)
    return min(max(along, sketch.room[0] + half), sketch.room[1] - half)


def _misfits(loads: Loads, system: UnitSystemName) -> list[str]:
    return [fit_text(value, system) for value in loads.lack_of_fit[0].tolist()]


def _warmths(loads: Loads, system: UnitSystemName) -> list[str]:
    return [warmth_text(first, last, system) for first, last in loads.temperature[0].tolist()]


def _runs(sketch: Sketch, texts: list[str]) -> list[tuple[str, int, Span]]:
    """What is said of neighbours that say the same, the first of them, the pixels of them that are shown."""
    runs = []
    for text, group in groupby(range(len(texts)), key=lambda index: texts[index]):
        members = list(group)
        spans = [span for index in members if (span := sketch.shown_span(index)) is not None]
        if text and spans:
            runs.append((text, members[0], (min(s[0] for s in spans), max(s[1] for s in spans))))
    return runs


def _run_wishes(sketch: Sketch, texts: list[str], kind: PartKind, rank: int) -> list[Wish]:
    """One label for neighbours that say the same, in the middle of what is shown of them."""
    return [
        sketch.wish(text, 0.5 * (low + high), Part(kind, first), rank=rank, slide=0.5 * (high - low))
        for text, first, (low, high) in _runs(sketch, texts)
    ]


def bracketed(sketch: Sketch) -> list[list[Span]]:
    """Where brackets are drawn: a row for what is too long or short, one for what is warmed, if any is."""
    loads, system = sketch.member.loads, sketch.member.system
    if loads is None or not sketch.frame.detail.explained:
        return []
    rows = (_runs(sketch, texts) for texts in (_misfits(loads, system), _warmths(loads, system)))
    return [[span for _, _, span in row] for row in rows if row]


def _draw_brackets(sketch: Sketch) -> None:
    for spans, (top, foot) in zip(bracketed(sketch), sketch.rows.brackets, strict=True):
        for low, high in spans:
            inset = min(2.0, 0.25 * (high - low))
            ends = low + inset, high - inset
            sketch.line((ends[0], foot), (ends[0], top), (ends[1], top), (ends[1], foot), ink="quiet")


def _bedding_wishes(sketch: Sketch) -> list[Wish]:
    if not sketch.frame.detail.dimensions:
        return []
    texts = []
    for segment in sketch.member.project.segments:
        end = end_of(segment.bedding, segment.bedding_end)
        texts.append(bedding_text(segment.bedding, end, sketch.member.system))
    return _run_wishes(sketch, texts, "bedding", rank=5)


def _bonded_wishes(sketch: Sketch) -> list[Wish]:
    segments = sketch.member.project.segments
    if not sketch.frame.detail.dimensions or not any(segment.bonded for segment in segments):
        return []
    texts = [bonded_text(segment.bonded, sketch.member.system) for segment in segments]
    return _run_wishes(sketch, texts, "bonded", rank=5)


def _draw_bedding(sketch: Sketch) -> None:
    """Slanted ticks along the far edge of every bedded segment."""
    for index, segment in enumerate(sketch.member.project.segments):
        span = sketch.shown_span(index)
        if span is not None and (segment.bedding or end_of(segment.bedding, segment.bedding_end)):
            edge = sketch.rows.axis + sketch.rows.half + 3.0
            sketch.hatch((span[0], span[1] - 4.0), (edge, edge), (4.0, 5.0))


def no_loads_text(sketch: Sketch) -> str:
    """Why no loads are drawn, where others can be picked: an envelope has none of its own."""
    shown = sketch.member.loads is not None or not sketch.member.project.load_cases
    if shown or sketch.frame.detail.explained:
        return ""
    return tr("loads: pick a case or combination")


def _gravity_wishes(sketch: Sketch, gravity: float) -> list[Wish]:
    text = gravity_text(gravity, sketch.member.system)
    if not text:
        return []
    low, high = sketch.room if sketch.frame.upright else sketch.window
    middle = 0.5 * (low + high)
    wish = sketch.wish(text, middle, Part("gravity", 0), rank=LAST_RANK, slide=high - low)
    if not sketch.frame.upright:
        return [wish]
    return [replace(wish, along=high)]  # slides up from the foot, where no segment needs the place
