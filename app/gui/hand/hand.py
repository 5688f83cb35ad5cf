"""The hand on the sheet: a press on a handle, a pull, the release; and the keys meanwhile and afterwards.

Once the pointer has moved a little the number is pulled: every move is a preview, so that results follow, and
the release is one undo step. Afterwards the number stays in hand until anything else is done: a digit opens
the field for its exact value, which amends that step.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import ClassVar

from PySide6.QtCore import QEvent, QObject, QPointF, Qt, Signal
from PySide6.QtGui import QKeyEvent, QMouseEvent
from PySide6.QtWidgets import QApplication

from app.drawing.handles import Handle
from app.gui.hand.entry import ExactEntry, begins_entry
from app.gui.hand.exact import Exact
from app.gui.hand.grasp import Grasp, Phase
from app.gui.hand.keys import FREE, GIVE_UP, TOTAL_STAYS
from app.gui.hand.near import Near
from app.gui.hand.nudges import Nudges
from app.gui.view import View
from app.words import tr

FORGET = 40.0  # px that the pointer goes away before what was pulled is out of the hand
SHIFT, CTRL = Qt.KeyboardModifier.ShiftModifier, Qt.KeyboardModifier.ControlModifier
MODIFIER_KEYS = (Qt.Key.Key_Shift, Qt.Key.Key_Control, Qt.Key.Key_Alt, Qt.Key.Key_AltGr, Qt.Key.Key_Meta)
MODIFIERS = {TOTAL_STAYS: SHIFT, FREE: CTRL}


class Hand(QObject):
    """Follows pointer and keys over one sheet."""

    told = Signal(str)

    def __init__(self, grasp: Grasp, view: View, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._grasp = grasp
        self._sheet = grasp.sheet
        self._viewport = self._sheet.viewport()
        self._near = Near(self._sheet, self._viewport)
        self._exact = Exact(grasp, self._viewport)
        self._nudges = Nudges(grasp, view)
        self._pressed: Handle | None = None  # not moved yet
        self._start = self._point = QPointF()
        self._at_origin = False  # whether the press was on the first joint
        grasp.told.connect(self.told)
        grasp.ended.connect(self._near.plain)
        view.selection_changed.connect(self._on_selection)
        self._viewport.installEventFilter(self)
        self._sheet.installEventFilter(self)

    @property
    def phase(self) -> Phase:
        """What the hand is doing."""
        return self._grasp.phase

    @property
    def entry(self) -> ExactEntry:
        """The field for the exact value."""
        return self._exact.entry

    def cancel(self) -> bool:
        """Give up what is being done; False where nothing is."""
        self._pressed = None
        return self._grasp.cancel()

    def close(self) -> None:
        """Let go of everything; the sheet may go."""
        self.cancel()
        self._viewport.removeEventFilter(self)
        self._sheet.removeEventFilter(self)

    def _on_selection(self, selection: object) -> None:
        self._grasp.paper.hand_marks.set_selection(selection)
        self._grasp.forget()

    # From the press to the release

    def _on_press(self, event: QMouseEvent) -> bool:
        self._grasp.forget()
        if event.button() != Qt.MouseButton.LeftButton or self.phase is not Phase.IDLE:
            return self.phase is Phase.PULLING
        self._pressed = self._near.at(_xy(event.position()))
        self._start = self._point = event.position()
        self._at_origin = self._pressed is None and self._near.is_at_origin(_xy(self._start))
        return self._pressed is not None and self._is_bare()

    def _is_bare(self) -> bool:
        """Whether no part lies under the press; else a click without a pull selects it."""
        return self._sheet.drawing.part_at(self._start) is None

    def _on_move(self, event: QMouseEvent) -> bool:
        if self._pressed is not None and self._has_moved(event):
            self._begin()
        if self._at_origin and self._has_moved(event):
            self._at_origin = False
            self.told.emit(
                tr("The first joint stays where x is 0: pull the joint at the far end of its segment.")
            )
        if self.phase is Phase.PULLING:
            self._point = event.position()
            self._follow(event.modifiers())
            return True
        if not event.buttons():
            self._hover(event)
        return False

    def _has_moved(self, event: QMouseEvent) -> bool:
        """Whether a press has become a pull."""
        way = (event.position() - self._start).manhattanLength()
        held = bool(event.buttons() & Qt.MouseButton.LeftButton)
        return held and way >= QApplication.startDragDistance()

    def _begin(self) -> None:
        handle, self._pressed = self._pressed, None
        if handle is not None and self._grasp.take(handle) is not None:
            self._grasp.phase = Phase.PULLING
            self._grasp.hold_sheet()

    def _follow(self, modifiers: Qt.KeyboardModifier) -> None:
        """The number goes where the pointer is."""
        pull = self._grasp.pull
        if pull is None:
            return
        total = bool(modifiers & SHIFT) and pull.has_two_ways
        pixels = pull.handle.pull(_xy(self._start), _xy(self._point))
        if pull.go(pull.grips[total].pulled(pixels, free=bool(modifiers & CTRL)), total_stays=total):
            self._grasp.preview()
            if self._grasp.follow_end():
                self._start = self._point
        self._grasp.light()
        self._near.shape(pull.handle, total_stays=total)
        self._grasp.point = self._point
        self._grasp.say(pull.hint())

    def _on_release(self, event: QMouseEvent) -> bool:
        pressed, self._pressed = self._pressed, None
        self._at_origin = False
        if self.phase is Phase.PULLING and event.button() == Qt.MouseButton.LeftButton:
            self._grasp.commit()
        return pressed is not None and self._is_bare()

    def _hover(self, event: QMouseEvent) -> None:
        if self.phase is Phase.AFTER:
            if (event.position() - self._point).manhattanLength() < FORGET:
                return
            self._grasp.forget()
        if self.phase is Phase.IDLE:
            self._point = event.position()
            self._near.light(_xy(self._point), total_stays=bool(event.modifiers() & SHIFT))

    def _on_leave(self, _event: QEvent) -> bool:
        if self.phase is Phase.IDLE:
            self._near.leave()
        return False

    def _on_wheel(self, _event: QEvent) -> bool:
        """While a number is pulled or typed the sheet keeps still."""
        self._grasp.forget()
        return self.phase in (Phase.PULLING, Phase.TYPING)

    # Keys

    def _on_key(self, event: QKeyEvent) -> bool:
        if self.phase is Phase.PULLING:
            self._key_while_pulling(event)
            return True
        if self._nudges.take(event):
            return True
        if self.phase is Phase.AFTER:
            return self._key_in_hand(event)
        if event.key() == TOTAL_STAYS and self.phase is Phase.IDLE:
            self._near.light(_xy(self._point), total_stays=True)
        return False

    def _key_in_hand(self, event: QKeyEvent) -> bool:
        """A digit begins the exact value; any other key but a modifier alone is something else done."""
        if begins_entry(event.text()) and not event.modifiers() & CTRL:
            self._exact.begin(event.text())
            return True
        if event.key() not in MODIFIER_KEYS:
            self._grasp.forget()
        return event.key() == GIVE_UP

    def _key_while_pulling(self, event: QKeyEvent) -> None:
        if event.key() == GIVE_UP:
            self.cancel()
        elif event.key() in MODIFIERS:
            self._follow(event.modifiers() | MODIFIERS[Qt.Key(event.key())])
        elif begins_entry(event.text()):
            self._exact.begin(event.text())

    def _on_key_up(self, event: QKeyEvent) -> bool:
        if event.key() in MODIFIERS:
            if self.phase is Phase.PULLING:
                self._follow(event.modifiers() & ~MODIFIERS[Qt.Key(event.key())])
            elif self.phase is Phase.IDLE:
                self._near.light(_xy(self._point), total_stays=False)
        return False

    def _on_shortcut(self, event: QKeyEvent) -> bool:
        """Keys that the hand takes are not a command's meanwhile."""
        mine = event.key() == GIVE_UP or begins_entry(event.text())
        if mine and self.phase in (Phase.PULLING, Phase.AFTER):
            event.accept()
            return True
        return False

    def _on_focus_out(self, _event: QEvent) -> bool:
        """Another window or pane takes over: a pull is given up."""
        if self.phase is Phase.PULLING:
            self.cancel()
        self._grasp.forget()
        return False

    # Qt's own

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        """Pointer events of the viewport, key events of the sheet."""
        table = self._POINTER if watched is self._viewport else self._KEYS
        handle = table.get(event.type())
        return False if handle is None else handle(self, event)

    _POINTER: ClassVar[dict[QEvent.Type, Callable[..., bool]]] = {
        QEvent.Type.MouseButtonPress: _on_press,
        QEvent.Type.MouseMove: _on_move,
        QEvent.Type.MouseButtonRelease: _on_release,
        QEvent.Type.Wheel: _on_wheel,
        QEvent.Type.Leave: _on_leave,
    }
    _KEYS: ClassVar[dict[QEvent.Type, Callable[..., bool]]] = {
        QEvent.Type.KeyPress: _on_key,
        QEvent.Type.KeyRelease: _on_key_up,
        QEvent.Type.ShortcutOverride: _on_shortcut,
        QEvent.Type.FocusOut: _on_focus_out,
    }


def _xy(point: QPointF) -> tuple[float, float]:
    return point.x(), point.y()
