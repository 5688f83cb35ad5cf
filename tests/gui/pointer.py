"""What a hand does on the drawing, as real pointer events on the window's sheet."""

from __future__ import annotations

from PySide6.QtCore import QEvent, QPointF, Qt
from PySide6.QtGui import QMouseEvent
from PySide6.QtWidgets import QApplication

LEFT, NONE = Qt.MouseButton.LeftButton, Qt.MouseButton.NoButton
PLAIN = Qt.KeyboardModifier.NoModifier
SHIFT, CTRL = Qt.KeyboardModifier.ShiftModifier, Qt.KeyboardModifier.ControlModifier


def handle_of(window, kind, index, where, number=0):
    """The first handle of a number on the drawing."""
    handles = window.sheet.drawing.handles
    wanted = kind, index, where, number
    return next(h for h in handles if (h.kind, h.index, h.where, h.number) == wanted)


class Pointer:
    """A pointer over the sheet of a window; `grab` presses on a handle, `pull` goes on from there."""

    def __init__(self, window):
        self.window = window
        self.viewport = window.sheet.viewport()
        self.at = QPointF()
        self.outward = QPointF()

    def send(self, kind, button=NONE, buttons=NONE, modifiers=PLAIN):
        glob = QPointF(self.viewport.mapToGlobal(self.at.toPoint()))
        event = QMouseEvent(kind, self.at, glob, button, buttons, modifiers)
        QApplication.sendEvent(self.viewport, event)

    def over(self, kind, index, where, modifiers=PLAIN, number=0):
        """Go over a handle."""
        handle = handle_of(self.window, kind, index, where, number)
        self.outward = QPointF(*handle.outward)
        self.at = QPointF(*handle.centre)
        if kind == "joint":  # beside the mark of a segment and the force on the axis
            (x, y), (cx, cy) = handle.line[0], handle.centre
            self.at = QPointF(0.7 * x + 0.3 * cx, 0.7 * y + 0.3 * cy)
        self.send(QEvent.Type.MouseMove, modifiers=modifiers)

    def grab(self, kind, index, where, modifiers=PLAIN, number=0):
        self.over(kind, index, where, modifiers, number)
        self.press(modifiers)

    def press(self, modifiers=PLAIN):
        self.send(QEvent.Type.MouseButtonPress, LEFT, LEFT, modifiers)

    def pull(self, pixels, modifiers=PLAIN):
        """Outward by so many pixels, in a few moves."""
        for _ in range(4):
            self.move(pixels / 4.0, modifiers)

    def move(self, pixels, modifiers=PLAIN):
        """Outward in a single move."""
        self.at += self.outward * pixels
        self.send(QEvent.Type.MouseMove, NONE, LEFT, modifiers)

    def let_go(self, modifiers=PLAIN):
        self.send(QEvent.Type.MouseButtonRelease, LEFT, NONE, modifiers)

    def drag(self, kind, index, where, pixels, modifiers=PLAIN):
        self.grab(kind, index, where, modifiers)
        self.pull(pixels, modifiers)
        self.let_go(modifiers)
