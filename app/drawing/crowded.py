"""The word that labels are left out: it stands at a free edge of the drawing, whatever else is there.

A drawing that leaves out a load without saying so would pass for the whole of what acts. The word therefore
takes the place of quieter labels where no corner is free.
"""

from __future__ import annotations

from itertools import product
from operator import itemgetter

import numpy as np
from msgspec.structs import astuple

from app.drawing.shapes import Box, Part, Stroke, Text
from app.drawing.sketch import Sketch
from app.words import tr, trn
from solver.arrays import FloatArray

INSET = 6.0  # px, from the edge of the drawing
SHARES = (1.0, 0.5, 0.34, 0.25)  # of the words' length in one line, that lines may have
STEP = 6.0  # px, between the places that are tried
ASIDE = 24.0  # px, from another note, so that it does not read on
GAP = 8.0  # px, from any other text beside
WORTH = 100  # of the scale of colours, in labels
SPACES = ("joint",)  # parts that are pointed at where nothing is drawn


def say_left_out(sketch: Sketch) -> None:
    """How many labels found no room, and how to see them."""
    if sketch.picture.left_out and sketch.frame.detail.factor:
        box, words = _place(sketch, left_out_words(sketch.picture.left_out))
        standing = sketch.picture.texts
        sketch.picture.texts[:] = [text for text in standing if not text.box.meets(box)]
        sketch.picture.texts.append(Text(box, words, "small", "quiet", Part("note", -2)))


def left_out_words(count: int) -> tuple[str, str]:
    """The words, and those for where they are too long."""
    words = trn("{count} label without room", "{count} labels without room", count).format(count=count)
    return tr("{labels}: point at the parts, or zoom in").format(labels=words), words


def _place(sketch: Sketch, words: tuple[str, str]) -> tuple[Box, str]:
    """The first free box, at the foot or head in as few lines as fit there, else between them at the sides.

    Where none is free it is the one over the least.
    """
    taken, room = _taken(sketch), sketch.frame.box.right - sketch.frame.box.left - 2.0 * INSET
    found: list[tuple[int, Box, str]] = []
    for freest, text, share in product((_freest_at_foot_or_head, _freest_at_sides), words, SHARES):
        width = min(share * sketch.frame.measure(text, "small")[0] + 1.0, room)
        lines = sketch.in_even_lines(text, "small", width)
        met, box = freest(sketch.frame.box, taken, *sketch.frame.measure(lines, "small"))
        found.append((met, box, lines))
        if not met:
            break
    _, box, lines = min(found, key=itemgetter(0))
    return box, lines


def free_box(sketch: Sketch, width: float, height: float) -> Box | None:
    """A box of a size at an edge of the drawing that nothing else reaches into, if there is one."""
    met, box = _freest_at_sides(sketch.frame.box, _taken(sketch), width, height)
    return None if met else box


def _freest_at_foot_or_head(room: Box, taken: FloatArray, width: float, height: float) -> tuple[int, Box]:
    """The first of the boxes along the foot from the right, then the head from the left, over the least."""
    count = max(int((room.right - room.left - 2.0 * INSET - width) / STEP), 0) + 1
    steps, rows = np.arange(count, dtype=np.float64) * STEP, []
    foot = room.bottom - 2.0 - height, room.right - INSET - width - steps
    head = room.top + 2.0, room.left + INSET + steps
    for top, lefts in (foot, head):
        beside = taken[(taken[:, 1] < top + height) & (taken[:, 3] > top)]
        met, left = _least_met(lefts, width, beside[:, 0], beside[:, 2])
        rows.append((met, Box(left, top, left + width, top + height)))
    return min(rows, key=itemgetter(0))


def _freest_at_sides(room: Box, taken: FloatArray, width: float, height: float) -> tuple[int, Box]:
    """The first of the boxes along the right edge from the foot up, then the left, that meets the fewest."""
    columns = []
    count = max(int((room.bottom - room.top - height - 4.0) / STEP), 0) + 1
    tops = room.bottom - 2.0 - height - np.arange(count, dtype=np.float64) * STEP  # from the foot up
    for left in (room.right - INSET - width, room.left + INSET):
        beside = taken[(taken[:, 0] < left + width) & (taken[:, 2] > left)]
        met, top = _least_met(tops, height, beside[:, 1], beside[:, 3])
        columns.append((met, Box(left, top, left + width, top + height)))
    return min(columns, key=itemgetter(0))


def _around(stroke: Stroke) -> Box:
    xs, ys = zip(*stroke.points, strict=True)
    return Box(min(xs), min(ys), max(xs), max(ys))


def _taken(sketch: Sketch) -> FloatArray:
    """The boxes of all that is drawn, (n, 4): texts, parts, hatches, the scale of colours."""
    picture = sketch.picture
    notes = [text.box for text in picture.texts if text.part is not None and text.part.kind == "note"]
    texts = [text.box for text in (*picture.texts, *picture.contact_texts)]
    beside = [(box, ASIDE) for box in notes] + [(box, GAP) for box in texts]
    boxes = [Box(b.left - gap, b.top, b.right + gap, b.bottom) for b, gap in beside]
    boxes += [target.box for target in picture.targets if target.part.kind not in SPACES]
    boxes += [_around(stroke) for stroke in picture.strokes if stroke.pairs]
    boxes += [picture.legend] * WORTH if picture.legend is not None else []
    return np.array([astuple(box) for box in boxes]).reshape(-1, 4)


def _least_met(starts: FloatArray, length: float, low: FloatArray, high: FloatArray) -> tuple[int, float]:
    """How many of the taken spans the first of the places (k,) that meets the fewest meets, and the place."""
    start = starts[:, np.newaxis]
    met = np.count_nonzero((low < start + length) & (high > start), axis=1)
    best = int(np.argmin(met))
    return int(met[best]), float(starts[best])
