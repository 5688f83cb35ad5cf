"""The sweep that is under way: a number of a cell runs up and down and everything follows, as while typing.

Whoever starts it (a table's cell, a label of the drawing, the keys) gives the cells and tells of steps. It
ends when the modifier is let go, when another key or button is pressed or the window left: one undo step.
Escape restores.
"""

from __future__ import annotations

from PySide6.QtCore import QEvent, QObject, Qt, Signal
from PySide6.QtGui import QKeyEvent, QWheelEvent
from PySide6.QtWidgets import QApplication

from app.gui.document import Document
from app.gui.hand.cell_entry import CellEntry
from app.sweep import COARSE, Sweep, sweep_of
from app.words import tr

MODIFIERS = (Qt.Key.Key_Control, Qt.Key.Key_Alt, Qt.Key.Key_Shift, Qt.Key.Key_Meta)
HOLDERS = MODIFIERS[:2]  # what is held down during a sweep
CONTROL = Qt.KeyboardModifier.ControlModifier
NOTCH = 120  # eighths of a degree, of a wheel
PULL = 6  # px of a pull for a step
ENDS = (QEvent.Type.MouseButtonPress, QEvent.Type.WindowDeactivate, QEvent.Type.ApplicationDeactivate)


class Wheel:
    """Whole notches out of the turns of a wheel, also of one that turns smoothly."""

    def __init__(self) -> None:
        self._turned = 0

    def notches(self, event: QWheelEvent) -> int:
        """The notches that are full by now; positive away from the hand."""
        turn = event.angleDelta()
        self._turned += turn.y() or turn.x()
        whole = int(self._turned / NOTCH)
        self._turned -= whole * NOTCH
        return whole


class Sweeper(QObject):
    """At most one sweep at a time, in the tables and on the drawing together."""

    told = Signal(str)

    def __init__(self, document: Document, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self._entry: CellEntry | None = None
        self._sweep: Sweep | None = None
        self._steps = 0
        document.changed.connect(lambda _snapshot: self._end())

    @property
    def is_running(self) -> bool:
        """Whether a number is being swept."""
        return self._entry is not None

    def is_of(self, entry: CellEntry, at: int | None) -> bool:
        """Whether these cells, and the number at that place of their text, are swept now."""
        if self._entry is None or self._sweep is None or self._entry.index != entry.index:
            return False
        wanted = sweep_of(self._sweep.before, at)
        return at is None or (wanted is not None and wanted.number == self._sweep.number)

    def begin(self, entry: CellEntry, at: int | None = None) -> bool:
        """Take hold of the number at a place of the cells' text, of the first one where none is there."""
        self.commit()
        sweep = sweep_of(entry.text or "", at) if entry.can_be_swept else None
        if sweep is None:
            self.told.emit(entry.refusal or tr("there is no number here to run up and down"))
            return False
        self._entry, self._sweep, self._steps = entry, sweep, 0
        QApplication.instance().installEventFilter(self)
        return True

    def by(self, steps: int, modifiers: Qt.KeyboardModifier) -> None:
        """So many steps up or down, larger ones with Shift, as far as the values are valid."""
        entry, sweep = self._entry, self._sweep
        if entry is None or sweep is None:
            return
        wanted = self._steps + steps * (COARSE if modifiers & Qt.KeyboardModifier.ShiftModifier else 1)
        self._steps = sweep.reached(self._steps, wanted, entry.accepts)
        text = sweep.text(self._steps)
        entry.show_swept(text)
        if self._steps:
            entry.preview(text)
        else:
            self._document.drop_preview()
        line = self._line(entry, sweep, self._steps)
        stopped = tr("{line}; the next value is not valid").format(line=line)
        self.told.emit(line if self._steps == wanted else stopped)

    @staticmethod
    def _line(entry: CellEntry, sweep: Sweep, steps: int) -> str:
        words = tr("{cell}: {now} (was {was})")
        return words.format(cell=entry.caption, now=sweep.text(steps), was=sweep.before)

    def commit(self) -> None:
        """Take the number in as it stands, as one undo step."""
        entry, sweep, steps = self._entry, self._sweep, self._steps
        self._end()
        if entry is None or sweep is None or not entry.valid:
            return
        if not steps:
            self._document.drop_preview()
            return
        notes: list[str] = []
        entry.model.noted.connect(notes.append)
        entry.commit(sweep.text(steps))
        entry.model.noted.disconnect(notes.append)
        self.told.emit("; ".join([self._line(entry, sweep, steps), *notes]))

    def cancel(self) -> None:
        """Leave the number as it was."""
        if self.is_running:
            self._end()
            self._document.drop_preview()
            self.told.emit("")

    def _end(self) -> None:
        entry, self._entry, self._sweep = self._entry, None, None
        if entry is not None:
            QApplication.instance().removeEventFilter(self)
            entry.show_swept(None)

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        """What ends the sweep, wherever it happens."""
        if event.type() in ENDS:
            self.commit()
        elif isinstance(event, QKeyEvent):
            return self._on_key(event)
        return super().eventFilter(watched, event)

    def _on_key(self, event: QKeyEvent) -> bool:
        """Escape restores; the modifier let go, or any other key, takes the number in."""
        pressed = event.type() == QEvent.Type.KeyPress
        if event.key() == Qt.Key.Key_Escape:
            if pressed:
                self.cancel()
            return True
        let_go = event.type() == QEvent.Type.KeyRelease and event.key() in HOLDERS
        if let_go or (pressed and event.key() not in MODIFIERS and not is_step(event)):
            self.commit()
        return False


def is_step(event: QKeyEvent) -> bool:
    """Whether a key is the one that sweeps: Alt with Up or Down."""
    arrows = (Qt.Key.Key_Up, Qt.Key.Key_Down)
    return event.key() in arrows and bool(event.modifiers() & Qt.KeyboardModifier.AltModifier)
