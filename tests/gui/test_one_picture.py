"""A step of a pull and its results are painted together; results that are late hold nothing back."""

from __future__ import annotations

import pytest
from PySide6.QtCore import QEvent, QObject

from app.gui.hand.grasp import Phase
from tests.gui.pointer import Pointer

LONG = 60_000  # ms, longer than any solve


class Paints(QObject):
    """Counts how often a widget is painted."""

    def __init__(self, widget):
        super().__init__(widget)
        self.count = 0
        widget.installEventFilter(self)

    def eventFilter(self, _watched, event):
        self.count += event.type() == QEvent.Type.Paint
        return False


@pytest.fixture
def pulled(window, qtbot):
    """A joint in the hand, a step on its way shown."""
    pointer = Pointer(window)
    pointer.grab("joint", 1, "end")
    pointer.pull(24.0)
    qtbot.waitUntil(lambda: window.showing.current and not window.sheet.one_picture.waits)
    qtbot.wait(1)  # what is to be painted still
    yield pointer
    pointer.let_go()


def test_a_step_and_its_results_are_painted_once(window, pulled, qtbot):
    window.sheet.one_picture._moment.setInterval(LONG)
    paints = Paints(window.sheet.viewport())
    pulled.move(12.0)
    assert window.sheet.one_picture.waits
    qtbot.waitUntil(lambda: paints.count > 0)
    assert window.showing.current
    assert window.sheet.viewportUpdateMode() == window.sheet.viewportUpdateMode().MinimalViewportUpdate
    assert paints.count == 1


def test_results_that_are_late_do_not_hold_the_drawing_back(window, pulled, qtbot, monkeypatch):
    monkeypatch.setattr(window.showing.solver, "request", lambda _wanted: 0)
    paints = Paints(window.sheet.viewport())
    pulled.move(12.0)
    assert window.hand.phase is Phase.PULLING
    window.showing._late.stop()  # which would paint by and by
    qtbot.waitUntil(lambda: paints.count > 0)
    assert not window.showing.current
    assert not window.sheet.one_picture.waits
    monkeypatch.undo()
    window.showing._asked = None
    pulled.move(12.0)
    qtbot.waitUntil(lambda: window.showing.current)
