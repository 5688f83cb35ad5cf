"""Single states thin with their envelope, the envelope dotted around a single state, the nearest named."""

import numpy as np
import pytest
from PySide6.QtCore import QEvent, Qt
from PySide6.QtTest import QTest

from app.gui.strips.company import Company, envelope_beside
from app.gui.strips.content import envelope_contents, state_contents
from app.gui.strips.curves import DOTS
from app.gui.strips.readout import nearest_state
from app.gui.view import Shown
from app.samples import read_sample
from solver.fields import at, checked_states
from solver.solve import solve
from tests.drawn_members import busy_member
from tests.gui.pointer import Pointer

KINDS = ("displacement", "force", "stress", "utilisation")


@pytest.fixture(scope="module")
def shaft():
    return solve(read_sample("hoist_shaft"))


def test_single_states_lie_inside_their_envelope_and_touch_it(shaft):
    for kind, content in zip(KINDS[:3], envelope_contents(shaft, together=True), strict=False):
        assert len(content.singles) == len(checked_states(shaft))
        values = np.array([trace.value for trace in content.singles])
        largest = getattr(shaft.segments, f"{kind}_max")[checked_states(shaft)].max()
        assert values.max() == pytest.approx(largest, rel=1e-9)
        assert content.low <= values.min()
        assert values.max() <= content.high


def test_a_state_lies_inside_the_envelope_around_it(shaft):
    for content in state_contents(shaft, 0, together=True)[:3]:
        upper, lower = content.around
        own = np.interp(upper.x, content.traces[0].x, content.traces[0].value)
        inside = np.diff(upper.x, append=np.inf) > 1e-6  # not at a jump, where both sides share x
        inside &= np.diff(upper.x, prepend=-np.inf) > 1e-6
        room = 1e-3 * (upper.value.max() - lower.value.min())  # between the points of two curves
        assert (own[inside] <= upper.value[inside] + room).all()
        assert (own[inside] >= lower.value[inside] - room).all()
        assert content.low <= lower.value.min()
        assert upper.value.max() <= content.high


def test_alone_there_is_neither(shaft):
    for content in (*envelope_contents(shaft), *state_contents(shaft, 0)):
        assert content.singles == content.around == ()
        assert content.legend == ""


def test_one_state_alone_has_no_envelope_around_it():
    one = solve(busy_member(5))
    checked = checked_states(one)
    assert (envelope_beside(one) is None) is (len(checked) < 2)
    assert Company().legend == ""


def test_the_nearest_state_is_the_one_whose_value_is_nearest(shaft):
    x = 0.3
    forces = {shaft.states[i].name: at(shaft, i, x).left.force for i in checked_states(shaft).tolist()}
    for name, force in forces.items():
        assert f": {name}, " in nearest_state(shaft, "force", x, force)
    assert nearest_state(shaft, "force", x, 1e9).startswith("nearest in N: ")


def thin(strip):
    return [curve for curve in strip.curves if curve.shape.thin]


def test_the_window_draws_them_and_names_the_nearest(window):
    window.view.set_shown(Shown("envelope"))
    window.view.set_together(True)
    strip = window.sheet.strips[1]
    assert len(thin(strip)) == len(strip.content.singles) > 1
    assert "thin: states" in [label.text for label in window.sheet.strips[0].labels]
    pointer = Pointer(window)
    pointer.at = strip.place.rect.center()
    pointer.send(QEvent.Type.MouseMove)
    assert "nearest in N: " in window.sheet.readout
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, Qt.Key.Key_Home)  # the pointer is not where the cursor is now
    assert "nearest" not in window.sheet.readout
    window.view.set_shown(Shown("combination", window.document.project.combinations[0].name))
    strip = window.sheet.strips[1]
    assert [list(curve.pen.dashPattern()) for curve in thin(strip)] == [[*DOTS]] * 2
    assert "dotted: envelope" in [label.text for label in window.sheet.strips[0].labels]
    window.view.set_together(False)
    assert thin(window.sheet.strips[1]) == []
