"""Where a drawing lies and what it shows there: the one difference between screen and paper.

On the screen room is given and labels without any are left to tooltips; on paper the drawing takes the room
it needs, since nothing can be pointed at.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import TypeAlias

from msgspec import Struct

from app.drawing.ruler import Ruler
from app.drawing.shapes import Box, Face

Measure: TypeAlias = Callable[[str, Face], tuple[float, float]]  # width and height; line breaks count


class StopMark(Struct, frozen=True, gc=False):
    """What a stop does in the shown state, in words; the joint by mark, the number among its supports."""

    joint: str
    number: int
    closed: bool
    text: str


class Detail(Struct, frozen=True, gc=False):
    """What is drawn beside the member, and how much room it may take."""

    load_rows: int = 3  # of labels of loads, at most; upright one column
    text_rows: int = 2  # of lengths, of sections and of joint marks, at most
    column: float = 0.34  # widest column of load labels upright, of the drawing's room
    dimensions: bool = True  # lengths, sections, stiffnesses
    levels: bool = True  # upright, beside the drawing
    explained: bool = False  # marks of joints, brackets under labels: where nothing can be pointed at
    factor: bool = True  # whether the drawing itself says how it is stretched
    least_half: float = 17.0  # of the thickest section, before labels of loads give way, px
    hollow: bool = False  # bodies without their fill, where results colour them
    words: str = ""  # more to be said of the drawing
    legend: tuple[float, float] = (0.0, 0.0)  # room for a scale of colours, px
    contacts: tuple[StopMark, ...] = ()


@dataclass(frozen=True, slots=True)
class Frame:
    """The room of a drawing, its ruler, which way it lies, and how texts are measured."""

    box: Box
    ruler: Ruler
    upright: bool
    measure: Measure
    detail: Detail = Detail()  # noqa: RUF009 - frozen

    @property
    def along(self) -> tuple[float, float]:
        """The room along the axis, growing."""
        box = self.box
        return (box.top, box.bottom) if self.upright else (box.left, box.right)

    @property
    def across(self) -> tuple[float, float]:
        """The room across the axis, growing."""
        box = self.box
        return (box.left, box.right) if self.upright else (box.top, box.bottom)
