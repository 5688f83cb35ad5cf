"""The loads of the shown state: bands with arrows, arrows with values, and what can only be said in words.

Arrows show the direction, so values stand without sign, except where a load changes direction on its way.
"""

from __future__ import annotations

from itertools import groupby

import numpy as np

from app.gui.drawing.placing import Wish
from app.gui.drawing.shapes import Part
from app.gui.drawing.sketch import Sketch
from app.gui.drawing.supports import support_of
from app.units import Quantity, format_value
from app.words import tr
from solver.arrays import FloatArray
from solver.chain import Loads
from solver.model import end_of

ARROW = 32.0  # length of the arrow of a joint force, px
HEAD = 5.0
LEAST_BAND = 5.0  # height of the smallest distributed load, px


def draw_loads(sketch: Sketch) -> None:
    """Everything that acts, and the bedding, which is drawn whether anything acts or not."""
    wishes = _bedding_wishes(sketch)
    loads = sketch.member.loads
    if loads is not None:
        wishes += _draw_distributed(sketch, loads.distributed[0])
        wishes += _draw_forces(sketch, loads.joint_force[0])
        wishes += _word_wishes(sketch, loads)
    placed = sketch.placed(wishes, sketch.rows.labels)
    for label in placed:
        forceful = label.wish.part.kind == "force"
        sketch.text(
            label.wish.text,
            label.span,
            sketch.rows.labels[label.row],
            label.wish.part,
            face="small_strong" if forceful else "small",
            ink="ink" if forceful else "quiet",
        )


def value_text(sketch: Sketch, value: float, quantity: Quantity, *, with_unit: bool = True) -> str:
    """A value with needless zeros taken off."""
    return format_value(value, quantity, sketch.member.system, strip=True, with_unit=with_unit)


def range_text(sketch: Sketch, start: float, end: float, quantity: Quantity) -> str:
    """ "520 → 320 kN/m", or one value where both are equal."""
    if start == end:
        return value_text(sketch, start, quantity)
    first = value_text(sketch, start, quantity, with_unit=False)
    return f"{first} → {value_text(sketch, end, quantity)}"


# Distributed loads


def _draw_distributed(sketch: Sketch, distributed: FloatArray) -> list[Wish]:
    largest = float(np.max(np.abs(distributed)))
    wishes = []
    for index, (start, end) in enumerate(distributed.tolist()):
        span = sketch.shown_span(index)
        if span is not None and (start or end):
            _draw_band(sketch, index, start / largest, end / largest)
            same_way = start * end >= 0.0
            text = range_text(sketch, *((abs(start), abs(end)) if same_way else (start, end)), "distributed")
            part = Part("distributed", index)
            tip = tr("Distributed load on {mark}: {value}").format(
                mark=sketch.member.project.segments[index].mark,
                value=range_text(sketch, start, end, "distributed"),
            )
            sketch.target(span, sketch.rows.band, part, tip)
            wishes.append(sketch.wish(text, 0.5 * (span[0] + span[1]), part, rank=1, slide=40.0))
    return wishes


def _draw_band(sketch: Sketch, index: int, start: float, end: float) -> None:
    """A band as high as the load's share of the largest, with arrows of its direction."""
    base, room = sketch.rows.band[1], sketch.rows.band[1] - sketch.rows.band[0]
    ends = sketch.along(index), sketch.along(index + 1)
    part = Part("distributed", index)
    heights = [LEAST_BAND + abs(v) * (room - LEAST_BAND) if v else 0.0 for v in (start, end)]
    top = [(a, base - h) for a, h in zip(ends, heights, strict=True)]
    outline = [(ends[0], base), *top, (ends[1], base)]
    sketch.line(*outline, ink="quiet", fill="load_fill", closed=True, part=part, clip=True)
    count = max(int(abs(ends[1] - ends[0]) / 26.0), 1)
    for i in range(count):
        share = (i + 0.5) / count
        value = start + share * (end - start)
        if value:
            direction = sketch.forward * np.sign(value)
            middle = ends[0] + share * (ends[1] - ends[0])
            _arrow(sketch, middle - 6.0 * direction, 12.0 * direction, base - 3.5, 1.0, 3.0, part)


def _arrow(
    sketch: Sketch, tail: float, length: float, across: float, width: float, head: float, part: Part
) -> None:
    """An arrow along the axis from its tail."""
    tip = tail + length
    back = tip - np.sign(length) * head
    clip = part.kind == "distributed"
    sketch.line((tail, across), (tip, across), width=width, part=part, clip=clip)
    wings = (back, across - 0.7 * head), (tip, across), (back, across + 0.7 * head)
    sketch.line(*wings, width=width, part=part, clip=clip)


# Forces at joints


def _draw_forces(sketch: Sketch, forces: FloatArray) -> list[Wish]:
    wishes = []
    for joint, force in enumerate(forces.tolist()):
        if force and sketch.holds(joint):
            wishes.append(_draw_force(sketch, joint, force))
    return wishes


def _draw_force(sketch: Sketch, joint: int, force: float) -> Wish:
    """The arrow starts at its joint, or ends there where a force presses on an end from outside."""
    direction = sketch.forward * (1.0 if force > 0 else -1.0)
    last = len(sketch.member.project.segments)
    pressing = (joint == 0 and force > 0) or (joint == last and force < 0)
    along = sketch.along(joint)
    gap = 2.0 * direction
    tail = along - gap - ARROW * direction if pressing else along + gap
    part = Part("force", joint)
    across = _force_row(sketch, joint, last)
    _arrow(sketch, tail, ARROW * direction, across, 2.4, HEAD + 3.0, part)
    value = value_text(sketch, abs(force), "force")
    tip = tr("Force at joint {mark}: {value}").format(
        mark=sketch.member.project.joints[joint].mark, value=value_text(sketch, force, "force")
    )
    span = tail, tail + ARROW * direction
    sketch.target(span, (across - 12.0, across + 12.0), part, tip)
    return sketch.wish(value, 0.5 * (span[0] + span[1]), part, face="small_strong", slide=46.0)


def _force_row(sketch: Sketch, joint: int, last: int) -> float:
    """On the axis outside a free end, else in the row of arrows."""
    at_end = joint in (0, last)
    return sketch.rows.axis if at_end and support_of(sketch, joint) is None else sketch.rows.arrows


# What is said in words


def _word_wishes(sketch: Sketch, loads: Loads) -> list[Wish]:
    wishes = _movement_wishes(sketch, loads.movement[0])
    wishes += _run_wishes(sketch, [_fit_text(sketch, v) for v in loads.lack_of_fit[0].tolist()], rank=2)
    warm = [_warmth_text(sketch, *ends) for ends in loads.temperature[0].tolist()]
    return wishes + _run_wishes(sketch, warm, rank=3) + _gravity_wishes(sketch, float(loads.gravity[0]))


def _movement_wishes(sketch: Sketch, movement: FloatArray) -> list[Wish]:
    wishes = []
    for joint, value in enumerate(movement.tolist()):
        if value and sketch.holds(joint):
            text = tr("moved {value}").format(value=_signed(sketch, value, "displacement"))
            wishes.append(sketch.wish(text, sketch.along(joint), Part("note", joint), rank=1, slide=60.0))
    return wishes


def _signed(sketch: Sketch, value: float, quantity: Quantity) -> str:
    text = value_text(sketch, value, quantity)
    return f"+{text}" if value > 0 else text


def _fit_text(sketch: Sketch, value: float) -> str:
    if not value:
        return ""
    amount = value_text(sketch, abs(value), "displacement")
    words = tr("{amount} too long") if value > 0 else tr("{amount} too short")
    return words.format(amount=amount)


def _warmth_text(sketch: Sketch, start: float, end: float) -> str:
    return f"ΔT {range_text(sketch, start, end, 'temperature')}" if start or end else ""


def _run_wishes(sketch: Sketch, texts: list[str], rank: int) -> list[Wish]:
    """One label for neighbours that say the same, in the middle of what is shown of them."""
    wishes = []
    for text, group in groupby(range(len(texts)), key=lambda index: texts[index]):
        spans = [span for index in group if (span := sketch.shown_span(index)) is not None]
        if text and spans:
            low, high = min(s[0] for s in spans), max(s[1] for s in spans)
            part = Part("note", rank)
            wish = sketch.wish(text, 0.5 * (low + high), part, rank=rank, slide=0.5 * (high - low))
            wishes.append(wish)
    return wishes


def _bedding_wishes(sketch: Sketch) -> list[Wish]:
    """Slanted ticks along the far edge of a bedded segment, and its stiffness."""
    texts = []
    for index, segment in enumerate(sketch.member.project.segments):
        ends = segment.bedding, end_of(segment.bedding, segment.bedding_end)
        bedded = any(ends)
        texts.append(
            tr("bedding {value}").format(value=range_text(sketch, *ends, "bedding")) if bedded else ""
        )
        span = sketch.shown_span(index)
        if bedded and span is not None:
            edge = sketch.rows.axis + sketch.rows.half + 3.0
            sketch.hatch((span[0], span[1] - 4.0), (edge, edge), (4.0, 5.0))
    return _run_wishes(sketch, texts, rank=4)


def _gravity_wishes(sketch: Sketch, gravity: float) -> list[Wish]:
    if not gravity:
        return []
    text = tr("self-weight, g {value} along x").format(value=_signed(sketch, gravity, "acceleration"))
    middle = 0.5 * (sketch.window[0] + sketch.window[1])
    return [sketch.wish(text, middle, Part("note", 5), rank=5, slide=sketch.window[1] - sketch.window[0])]
