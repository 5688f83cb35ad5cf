"""The dimension chain: slanted ticks at the joints, lengths on one side of the line, sections on the other.

Upright, marks of level at the joints as well, between the drawing and the strips.
"""

from __future__ import annotations

from itertools import groupby

from app.drawing.placing import TIGHT, UNDER_EACH_OTHER, Span, Wish, place
from app.drawing.shapes import Box, Part, Stroke, Text
from app.drawing.sketch import Sketch
from app.drawing.words import section_text
from app.units import format_value

TICK = 4.0
BREAK = ((-3.0, 0.0), (-1.5, -5.0), (1.5, 5.0), (3.0, 0.0))  # the zigzag of what is not to scale
LEAST_BREAK = 9.0  # px of the segment
LONGEST_MARK = 10  # of a joint beside its level, in digits
MARK_RANK = 2  # after all levels
NUDGE = 4.0  # px that lengths and sections may stand off the middle upright, where segments are short
OUTWARD = 10.0  # px upright, the margin beyond sections: an arrow is as wide
LEVEL_GAP = 16.0  # room of the triangle before a level's text


def draw_chain(sketch: Sketch, lengths: list[Wish], sections: list[Wish]) -> None:
    """Line, ticks, lengths and sections of all segments inside the window."""
    rows = sketch.rows
    low, high = sketch.window
    sketch.line((low, rows.chain), *_breaks(sketch), (high, rows.chain), ink="quiet", clip=True)
    shown = [sketch.along(joint) for joint in range(len(sketch.member.position)) if sketch.holds(joint)]
    ticks = [
        end
        for along in shown
        for end in ((along - TICK, rows.chain + TICK), (along + TICK, rows.chain - TICK))
    ]
    sketch.lines(ticks, width=1.6)
    clear = UNDER_EACH_OTHER if sketch.frame.upright else TIGHT
    sketch.put(lengths, rows.lengths, "high", clear)
    sketch.put(sections, _reaching_out(sketch), "low", clear)
    for index in range(len(sketch.member.project.segments)):
        span = sketch.shown_span(index)
        if span is not None:
            across = rows.lengths[0][0], rows.sections[-1][1]
            sketch.target(span, across, Part("length", index))


def _reaching_out(sketch: Sketch) -> tuple[Span, ...]:
    """The rows of sections, upright with the margin beyond: the text of a pulled one grows into it."""
    last = sketch.rows.sections[-1]
    return (*sketch.rows.sections[:-1], (last[0], last[1] + (OUTWARD if sketch.frame.upright else 0.0)))


def _breaks(sketch: Sketch) -> list[tuple[float, float]]:
    """The zigzag on the dimension line of every segment that is not to scale and has room for it."""
    spans = [sketch.shown_span(index) for index in sketch.frame.ruler.widened]
    chain, points = sketch.rows.chain, []
    for low, high in sorted(span for span in spans if span is not None):
        if high - low >= LEAST_BREAK:
            middle = 0.5 * (low + high)
            points += [(middle + a, chain + c) for a, c in BREAK]
    return points


def draw_joint_marks(sketch: Sketch, wishes: list[Wish]) -> None:
    """The mark of every joint at the end of a thin line from it, which ends at the dimension line if any."""
    foot = sketch.rows.chain if sketch.frame.detail.dimensions else sketch.rows.marks[0][1]
    for joint in range(len(sketch.member.position)):
        along = sketch.along(joint)
        sketch.line((along, sketch.rows.axis), (along, foot), ink="joint", width=0.7)
    sketch.put(wishes, sketch.rows.marks, "high", TIGHT)


def joint_wishes(sketch: Sketch) -> list[Wish]:
    """The marks of joints, where they are written at all."""
    if not sketch.frame.detail.explained:
        return []
    marks = enumerate(joint.mark for joint in sketch.member.project.joints)
    return [sketch.wish(mark, sketch.along(joint), Part("joint", joint), slide=6.0) for joint, mark in marks]


def length_wishes(sketch: Sketch) -> list[Wish]:
    """Each length in the middle of its span; where only a part is shown, in the middle of that."""
    if not sketch.frame.detail.dimensions:
        return []
    wishes = []
    for index, segment in enumerate(sketch.member.project.segments):
        span = sketch.shown_span(index)
        if span is not None:
            text = format_value(segment.length, "length", sketch.member.system, strip=True)
            wishes.append(
                sketch.wish(text, 0.5 * (span[0] + span[1]), Part("length", index), slide=_nudge(sketch))
            )
    return wishes


def _nudge(sketch: Sketch) -> float:
    return NUDGE if sketch.frame.upright else 0.0


def section_wishes(sketch: Sketch) -> list[Wish]:
    """One text for neighbours of the same section."""
    if not sketch.frame.detail.dimensions:
        return []
    segments = sketch.member.project.segments
    found: list[tuple[str, int, float]] = []
    for _, group in groupby(range(len(segments)), key=lambda index: segments[index].section):
        members = list(group)
        spans = [span for index in members if (span := sketch.shown_span(index)) is not None]
        if spans:
            text = section_text(segments[members[0]].section, sketch.member.system)
            found.append((text, members[0], 0.5 * (min(s[0] for s in spans) + max(s[1] for s in spans))))
    texts = _in_a_column(sketch, [text for text, _, _ in found])
    return [
        sketch.wish(text, middle, Part("section", first), slide=_nudge(sketch))
        for text, (_, first, middle) in zip(texts, found, strict=True)
    ]


def _in_a_column(sketch: Sketch, texts: list[str]) -> list[str]:
    """Upright, tapers in two lines where they would widen the column."""
    if not sketch.frame.upright:
        return texts
    broken = [text.replace("→", "\n→") for text in texts]
    widest = max((sketch.frame.measure(text, "small")[0] for text in broken), default=0.0)
    return [
        text if sketch.frame.measure(text, "small")[0] <= widest else lines
        for text, lines in zip(texts, broken, strict=True)
    ]


def level_texts(sketch: Sketch) -> list[str]:
    """The position of every joint as a level above the first, which is the datum."""
    texts = []
    for x in sketch.member.position:
        text = format_value(x, "length", sketch.member.system, strip=True)
        texts.append(f"+{text}" if x > 0 else f"±{text}")
    return texts


def level_width(sketch: Sketch) -> float:
    """The room of the widest level; a mark of a joint gets that of one that is not long."""
    if not sketch.frame.detail.levels:
        return 0.0
    levels = max(sketch.frame.measure(text, "small")[0] for text in level_texts(sketch))
    marks = max(sketch.frame.measure(joint.mark, "small")[0] for joint in sketch.member.project.joints)
    return max(levels, min(marks, LONGEST_MARK * sketch.frame.measure("0", "small")[0]))


def draw_levels(sketch: Sketch, column: float) -> None:
    """A triangle standing on each joint's line, its level beside it, its mark under it, from `column` on."""
    left, wishes = column + 4.0, _level_wishes(sketch)
    first = left + LEVEL_GAP
    for label in place(wishes, 1, sketch.room, TIGHT):
        foot = label.span[1]
        box = Box(first, label.span[0], first + label.wish.depth, foot)
        if label.wish.rank == MARK_RANK and any(text.box.meets(box) for text in sketch.picture.texts):
            continue
        sketch.picture.texts.append(Text(box, label.wish.text, "small", "quiet", label.wish.part))
        if label.wish.rank < MARK_RANK:
            corners = (left, foot - 9.0), (left + 11.0, foot - 9.0), (left + 5.5, foot - 0.5)
            sketch.picture.strokes.append(Stroke(corners, "ink", 1.2, closed=True, fill="paper", clip=False))


def _level_wishes(sketch: Sketch) -> list[Wish]:
    """Levels over the joints' lines, those of the ends before all others, and marks that fit under them."""
    ends, widest, wishes = (0, len(sketch.member.position) - 1), level_width(sketch), []
    for joint, text in enumerate(level_texts(sketch)):
        if not sketch.holds(joint):
            continue
        part, along = Part("joint", joint), sketch.along(joint)
        width, height = sketch.frame.measure(text, "small")
        rank = 0 if joint in ends else 1
        wishes.append(Wish(text, along - 0.5 * height, height, width, part, rank))
        mark = sketch.member.project.joints[joint].mark
        width = sketch.frame.measure(mark, "small")[0]
        if width <= widest:
            wishes.append(Wish(mark, along + TIGHT + 0.5 * height, height, width, part, MARK_RANK))
    return wishes
