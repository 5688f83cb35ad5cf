"""Over a handle: it lights up, and the shape of the pointer says which way it goes."""

from __future__ import annotations

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QWidget

from app.drawing.body import edge_at
from app.drawing.handles import JOINT_REACH, Handle, handle_at
from app.drawing.shapes import Point
from app.gui.sheet_view import SheetView

SHAPES = {  # (upright, direction)
    (False, "along"): Qt.CursorShape.SizeHorCursor,
    (False, "across"): Qt.CursorShape.SizeVerCursor,
    (True, "along"): Qt.CursorShape.SizeVerCursor,
    (True, "across"): Qt.CursorShape.SizeHorCursor,
}
SPLIT = {False: Qt.CursorShape.SplitHCursor, True: Qt.CursorShape.SplitVCursor}  # the total stays


class Near:
    """Shows the handle that a press would take."""

    def __init__(self, sheet: SheetView, viewport: QWidget) -> None:
        self._sheet, self._viewport = sheet, viewport

    def at(self, point: Point) -> Handle | None:
        """The handle at a point."""
        return handle_at(self._sheet.drawing.handles, point)

    def is_at_origin(self, point: Point) -> bool:
        """Whether a point is on the first joint, which has no handle."""
        sketch = self._sheet.drawing.sketch
        if sketch is None:
            return False
        along, across = reversed(point) if self._sheet.places.axes.upright else point
        half = max(edge_at(sketch, 0), JOINT_REACH)
        near = abs(along - sketch.along(0)) <= JOINT_REACH
        return near and abs(across - self._sheet.drawing.picture.axis) <= half

    def light(self, point: Point, *, total_stays: bool) -> None:
        """Show the handle at a point, if any."""
        handle = self.at(point)
        if handle is None or self._viewport.cursor().shape() == Qt.CursorShape.CrossCursor:
            self.leave()  # with a symbol in the hand a click puts it on, and nothing can be pulled
        else:
            self._sheet.paper.hand_marks.light(handle.key, total_stays=total_stays)
            self.shape(handle, total_stays=total_stays)

    def shape(self, handle: Handle, *, total_stays: bool) -> None:
        """Give the pointer the shape of a handle's direction."""
        upright = self._sheet.places.axes.upright
        both = total_stays and handle.kind == "joint"
        self._viewport.setCursor(SPLIT[upright] if both else SHAPES[upright, handle.direction])

    def plain(self) -> None:
        """The pointer as it is elsewhere, unless another hand has given it a shape of its own."""
        if self._viewport.cursor().shape() in (*SHAPES.values(), *SPLIT.values()):
            self._viewport.unsetCursor()

    def leave(self) -> None:
        """Over no handle."""
        self._sheet.paper.hand_marks.light(None)
        self.plain()
