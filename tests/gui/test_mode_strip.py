"""The mode shape as a strip of its own: chosen, read, compared and taken away on the real window."""

from __future__ import annotations

import numpy as np
import pytest
from msgspec import UNSET, structs
from numpy.testing import assert_allclose
from PySide6.QtCore import QEvent, QPoint, QPointF, Qt
from PySide6.QtGui import QGuiApplication, QHelpEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QToolTip

from app.gui.hand.keys import NEXT_HANDLE
from app.gui.main import open_window
from app.gui.settings import Settings
from app.gui.strips import mode
from app.gui.theme import greyed
from app.gui.view import Cursor, Selection, Shown
from app.hand import kinds
from app.samples import read_sample
from app.strip_choice import KINDS, USUAL, StripChoice
from solver.model import Combination, FixedSupport, JointLoad, Lateral, Limits
from tests.gui.test_references import keep
from tests.gui.test_strip_choice import ask_for_menu, grip, pick, turn
from tests.gui.windows import end, solved
from tests.members import Part, case, member, round_bar

HELD = Lateral(translation="fixed")
BOTH_WAYS = pytest.mark.parametrize("layout", ["horizontal", "vertical"])


def column(size=10e3, factor=2.0, middle=UNSET):
    """Two halves of a pinned column that buckles in half a sine, pushed, pulled, or both in an envelope."""
    parts = [Part(1.0, round_bar(0.04), allowable_tension=1e9, allowable_compression=1e9)] * 2
    cases = [
        case("Push", on_joints=[JointLoad("2", force=-size)]),
        case("Pull", on_joints=[JointLoad("2", force=size)]),
    ]
    combinations = [Combination("Pushed", {"Push": 1.0}), Combination("Pulled", {"Pull": 1.0})]
    project = member(parts, {0: FixedSupport()}, cases, combinations)
    laterals = {0: HELD, 1: middle, 2: HELD}
    joints = tuple(structs.replace(j, lateral=laterals[i]) for i, j in enumerate(project.joints))
    return structs.replace(project, joints=joints, limits=Limits(stability_factor=factor))


def open_column(qtbot, window, project=None):
    window.document.load(project or column(), None)
    solved(qtbot, window)
    window.view.set_shown(Shown("combination", "Pushed"))
    window.view.set_strips(StripChoice(KINDS))
    return window.sheet.strips[-1]


def texts(strip):
    return " ".join(label.text for label in strip.labels).replace("\n", " ")


def test_the_strip_waits_hidden_is_shown_by_key_and_remembered(qtbot, window, rod, store, tmp_path):
    assert window.view.strips.shown == USUAL
    menu = window.strips_menu
    menu.popup(QPoint(0, 0))
    QTest.keyClick(menu, Qt.Key.Key_5)
    assert window.view.strips.shown == KINDS
    assert window.sheet.strips[-1].isVisible()
    end(qtbot, window)
    again = open_window(rod, Settings(tmp_path / "settings.ini"), tmp_path / "recovery")
    solved(qtbot, again)
    assert again.view.strips.shown == KINDS
    ask_for_menu(again, grip(again, 4))
    pick(again.strip_menu, "Hide w, mode shape")
    assert again.view.strips.shown == USUAL
    ask_for_menu(again, grip(again, 0))
    pick(again.strip_menu, "Show w, mode shape")
    assert again.sheet.strips[-1].content.kind == "mode"
    end(qtbot, again)


@BOTH_WAYS
def test_a_pinned_column_bends_out_in_half_a_sine_without_a_unit(qtbot, window, layout):
    turn(window, layout)
    strip = open_column(qtbot, window)
    (trace,) = strip.content.traces
    assert_allclose(trace.value, np.sin(0.5 * np.pi * trace.x), atol=1e-6)
    assert trace.value.max() == pytest.approx(1.0, abs=1e-15)
    assert (strip.content.title, strip.content.unit) == ("w", "")
    assert "shape only" in texts(strip)
    assert not any(a.rect.intersects(b.rect) for a in strip.labels for b in strip.labels if a is not b)
    axes = window.sheet.places.axes
    assert axes.across_of(window.sheet.places.crossing)[1] == axes.across_of(strip.place.rect)[1]
    window.view.set_cursor(Cursor(1.5))
    assert window.sheet.readout.replace("\n", " ").endswith("w 0.707 (shape only)")


def test_a_hidden_strip_costs_nothing(qtbot, window, monkeypatch):
    open_column(qtbot, window)
    asked = []
    monkeypatch.setattr(mode, "mode_curve", lambda *_args, **_more: asked.append(1))
    monkeypatch.setattr(mode, "mode_at", lambda *_args: asked.append(2))
    window.view.set_strips(StripChoice())
    window.view.set_shown(Shown("combination", "Pulled"))
    window.view.set_cursor(Cursor(0.5))
    assert asked == []
    window.view.set_strips(StripChoice(("mode",)))
    assert set(asked) == {1, 2}


@pytest.mark.parametrize(
    ("shown", "why"),
    [
        (Shown("envelope"), "no mode shape of an envelope, only of a single combination"),
        (Shown("case", "Push"), "no mode shape: this state is not checked"),
        (Shown("combination", "Pulled"), "no mode shape: nothing is compressed"),
    ],
)
def test_where_there_is_no_shape_the_strip_says_why(qtbot, window, shown, why):
    strip = open_column(qtbot, window)
    window.view.set_together(True)
    window.view.set_shown(shown)
    assert strip.content.traces == strip.content.extremes == ()
    assert why in texts(strip)
    window.view.set_cursor(Cursor(1.0))
    assert window.sheet.readout.replace("\n", " ").endswith(why)
    x = window.sheet.paper.ruler.pixel(1.0)
    point = QPointF(x, strip.place.rect.center().y())
    window.sheet.paper.set_pointer(point)  # on an envelope no state is nearest
    assert "nearest" not in window.sheet.readout


def test_what_is_not_checked_says_so_in_the_strip_and_in_its_tip(qtbot, window):
    window.document.load(read_sample("capstan_shaft"), None)
    solved(qtbot, window)
    window.view.set_strips(StripChoice((*USUAL[:1], "mode")))
    window.view.set_shown(Shown("combination", "Hauling, warm"))
    strip = window.sheet.strips[-1]
    assert strip.content.traces
    assert "stability not checked" in texts(strip)
    viewport, at = window.sheet.viewport(), grip(window, 1)
    QApplication.sendEvent(viewport, QHelpEvent(QEvent.Type.ToolTip, at, viewport.mapToGlobal(at)))
    assert "a companion is compressed" in QToolTip.text()
    assert "not a design resistance" in QToolTip.text()
    QToolTip.hideText()
    window.view.set_shown(Shown("combination", "Hauling, cold"))
    assert not strip.content.traces
    assert "a companion is compressed" in texts(strip)


def test_a_reference_is_drawn_dashed_in_its_own_shape(qtbot, window):
    open_column(qtbot, window, column(middle=HELD))
    keep(window, "Braced")
    window.document.commit(column(), "No brace")
    solved(qtbot, window)
    strip = window.sheet.strips[-1]
    (earlier,), (now,) = strip.content.earlier, strip.content.traces
    assert_allclose(np.abs(earlier.value), np.abs(np.sin(np.pi * earlier.x)), atol=1e-6)
    assert_allclose(now.value, np.sin(0.5 * np.pi * now.x), atol=1e-6)
    window.view.set_strips(StripChoice(("mode",)))
    assert "dashed: Braced" in texts(strip)
    window.view.set_shown(Shown("envelope"))
    assert strip.content.earlier == ()


def test_what_is_out_of_date_has_no_colour(qtbot, window):
    strip = open_column(qtbot, window)
    window.view.set_cursor(Cursor(1.0))
    before = strip._theme
    results = window.showing.outcome.results
    window.sheet.paper.show_results(window.document.project, results, current=False, waiting=False)
    assert strip._theme == greyed(before)
    assert window.sheet.readout.replace("\n", " ").endswith("w 1.00 (shape only)  (out of date)")


def test_it_is_taken_as_numbers_and_as_lines(qtbot, window, tmp_path):
    open_column(qtbot, window)
    window.taking.copy_numbers(("mode",))
    head, *rows = [line.split("\t") for line in QGuiApplication.clipboard().text().splitlines()]
    assert head[1:] == ["Segment", "w, shape only, Pushed"]
    values = np.array([float(row[2]) for row in rows])
    assert values.max() == 1.0
    window.taking.write_picture(tmp_path / "strip.svg", ("mode",))
    assert "w, mode shape" in (tmp_path / "strip.svg").read_text(encoding="utf-8")
    ask_for_menu(window, grip(window, 4))
    pick(window.strip_menu, "Copy picture")
    assert not QGuiApplication.clipboard().image().isNull()


def test_without_a_shape_there_is_nothing_to_take(qtbot, window, tmp_path):
    open_column(qtbot, window)
    window.view.set_shown(Shown("combination", "Pulled"))
    told = []
    window.taking.told.connect(told.append)
    window.taking.write_numbers(tmp_path / "none.csv", ("mode",))
    window.taking.write_picture(tmp_path / "none.svg", ("mode",))
    assert told == ["Nothing to take: no mode shape: nothing is compressed"] * 2
    assert list(tmp_path.glob("none.*")) == []
    window.taking.write_numbers(tmp_path / "all.csv", KINDS)
    assert "w, shape only, Pulled" in (tmp_path / "all.csv").read_text(encoding="utf-8-sig")


def test_lateral_supports_put_on_by_their_letters_make_the_shape(qtbot, window):
    bare = column()
    bare = structs.replace(bare, joints=tuple(structs.replace(j, lateral=UNSET) for j in bare.joints))
    strip = open_column(qtbot, window, bare)
    assert "no joint is held sideways" in texts(strip)
    window.sheet.setFocus()
    for letter in (Qt.Key.Key_W, Qt.Key.Key_N):
        window.view.set_selection(Selection(joints=frozenset((0,))))
        QTest.keyClick(window.sheet, letter)
        if window.in_place.editor is not None:
            QTest.keyClick(window.in_place.editor, Qt.Key.Key_Return)
        window.sheet.setFocus()
    assert window.document.project.joints[0].lateral == Lateral(translation="fixed", rotation="fixed")
    solved(qtbot, window)
    (trace,) = strip.content.traces
    assert_allclose(trace.value, 1.0 - np.cos(0.25 * np.pi * trace.x), atol=1e-6)  # a cantilever's


def test_no_letter_of_a_symbol_belongs_to_the_handles():
    assert NEXT_HANDLE.value not in {ord(kind.letter) for kind in kinds.KINDS}
