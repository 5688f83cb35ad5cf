"""The hand by keys: take a handle of the selection in hand, nudge it by steps; a burst is one undo step."""

from __future__ import annotations

from PySide6.QtCore import Qt
from PySide6.QtGui import QKeyEvent

from app.drawing.handles import Handle
from app.gui.hand.grasp import Grasp, Phase
from app.gui.hand.keys import ARROWS, NEXT_HANDLE, NUDGE, NUDGE_COARSE
from app.gui.view import View
from app.words import tr

ALIGNED = 0.5  # least product of a handle's direction with that of the arrow key

Way = tuple[Handle, bool]  # a handle, and whether the total stays


class Nudges:
    """Keys of the sheet that take and move what is selected."""

    def __init__(self, grasp: Grasp, view: View) -> None:
        self._grasp, self._view = grasp, view

    def take(self, event: QKeyEvent) -> bool:
        """Whether a key is one of the hand's own; if so it has been done."""
        pressed = event.modifiers() & ~Qt.KeyboardModifier.KeypadModifier
        key = Qt.Key(event.key())
        shift = Qt.KeyboardModifier.ShiftModifier
        if key == NEXT_HANDLE and pressed in (Qt.KeyboardModifier.NoModifier, shift):
            self._next(-1 if pressed else 1)
            return True
        if key in ARROWS and pressed in (NUDGE, NUDGE_COARSE):
            self._nudge(ARROWS[key], coarse=pressed == NUDGE_COARSE)
            return True
        return False

    def _ways(self) -> list[Way]:
        """What can be taken of the selection, each number once: the sides of an edge are the same."""
        ways: dict[tuple[object, ...], Way] = {}
        last = len(self._grasp.sheet.positions) - 1  # beyond the last joint there is nothing that could stay
        for handle in self._grasp.paper.hand_marks.quiet:
            ways.setdefault((*handle.key[:4], False), (handle, False))
            if handle.kind == "joint" and handle.index < last:
                ways.setdefault((*handle.key[:4], True), (handle, True))
        return list(ways.values())

    def _next(self, direction: int) -> None:
        """The next handle in hand, round and round."""
        ways, pull = self._ways(), self._grasp.pull
        if not ways:
            self._grasp.told.emit(tr("Select a segment or a joint first: Space takes the one at the cursor."))
            return
        held = None if pull is None else (pull.handle.key[:4], pull.total_stays)
        places = [place for place, (h, total) in enumerate(ways) if (h.key[:4], total) == held]
        first = places[0] + direction if places else 0 if direction > 0 else -1
        for offset in range(len(ways)):  # past those that cannot be taken
            handle, total = ways[(first + direction * offset) % len(ways)]
            if self._grasp.take(handle, total_stays=total) is not None:
                self._grasp.keep()
                return

    def _nudge(self, arrow: tuple[float, float], *, coarse: bool) -> None:
        """A step of the handle in hand; where none is, of the first of the selection that goes that way."""
        if self._grasp.phase is not Phase.AFTER and not self._take_first(arrow):
            return
        pull = self._grasp.pull
        along = 0.0 if pull is None else _product(pull.handle, arrow)
        if pull is None or abs(along) < ALIGNED:
            return
        if pull.changed and not self._grasp.may_amend():  # something came between: from here on anew
            pull = self._grasp.take(pull.handle, total_stays=pull.total_stays) or pull
        value = pull.grip.nudged(pull.outcome.value, 1 if along > 0 else -1, coarse=coarse)
        pull.go(value, total_stays=pull.total_stays)
        self._grasp.commit()

    def _take_first(self, arrow: tuple[float, float]) -> bool:
        """Take the selection's first handle that goes along with an arrow; both ends before one."""
        ways = [way for way in self._ways() if abs(_product(way[0], arrow)) >= ALIGNED]
        ways.sort(key=lambda way: (way[1], way[0].where != "both" and way[0].kind != "joint"))
        if not ways:
            self._grasp.told.emit(tr("Select a segment or a joint first: Space takes the one at the cursor."))
            return False
        return self._grasp.take(ways[0][0], total_stays=ways[0][1]) is not None


def _product(handle: Handle, arrow: tuple[float, float]) -> float:
    return handle.outward[0] * arrow[0] + handle.outward[1] * arrow[1]
