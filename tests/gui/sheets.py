"""Places on the sheet for the tests of drawing and strips."""

from __future__ import annotations

from PySide6.QtGui import QFont

from app.drawing.member import Member
from app.drawing.ruler import Ruler
from app.gui.fonts import Fonts
from app.gui.sheet_layout import Place, SheetLayout, sheet_layout

SIZES = ((900, 480), (1900, 1000))  # the sheet in windows of 1280×800 and 2560×1440


def laid_out(size: tuple[int, int], *, upright: bool) -> SheetLayout:
    """The sheet's layout at a size."""
    return sheet_layout(*size, upright, Fonts(QFont()).text_height)


def drawing_place(member: Member, size: tuple[int, int], *, upright: bool) -> Place:
    """The place of the drawing on a sheet of a size."""
    layout = laid_out(size, upright=upright)
    ruler = Ruler.fitting(member.position, layout.begin, layout.end)
    return Place(layout.drawing, ruler, layout.axes, Fonts(QFont()))
