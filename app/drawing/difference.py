"""Where two pictures of the same member differ, so that a step of a pull paints that and no more."""

from __future__ import annotations

from collections.abc import Iterator

from app.drawing.shapes import Box, Circle, Picture, Stroke, Target, Text

Shape = Stroke | Circle | Text | Target


def differing_box(one: Picture, other: Picture) -> Box | None:
    """The box around all that is not alike in both; None where all is."""
    found = [bounds_of(shape) for shape in _differing(one, other)]
    if not found:
        return None
    return Box(
        min(box.left for box in found),
        min(box.top for box in found),
        max(box.right for box in found),
        max(box.bottom for box in found),
    )


def _differing(one: Picture, other: Picture) -> Iterator[Shape]:
    """What stands in one of them only."""
    yield from set(one.strokes) ^ set(other.strokes)
    yield from set(one.circles) ^ set(other.circles)
    yield from set(one.texts) ^ set(other.texts)
    yield from set(one.targets) ^ set(other.targets)


def bounds_of(shape: Shape) -> Box:
    """The box around a shape, without the width of its line."""
    if isinstance(shape, Stroke):
        across, down = zip(*shape.points, strict=True)
        return Box(min(across), min(down), max(across), max(down))
    if isinstance(shape, Circle):
        return Box.around(shape.centre, 2.0 * shape.radius, 2.0 * shape.radius)
    return shape.box
