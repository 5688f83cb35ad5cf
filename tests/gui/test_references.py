"""References in the window: kept by keys and mouse, dashed in the strips, differences in the findings."""

from __future__ import annotations

import numpy as np
import pytest
from msgspec.structs import replace
from PySide6.QtCore import Qt
from PySide6.QtGui import QFont
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QToolButton

from app import samples
from app.drawing.ruler import Ruler
from app.gui.fonts import Fonts
from app.gui.sheet_layout import Place
from app.gui.strips.company import earlier_curves
from app.gui.strips.content import envelope_contents, state_contents
from app.gui.strips.curves import DASHES
from app.gui.strips.strip import Strip
from app.gui.theme import DARK, LIGHT
from app.gui.view import Shown
from app.units import SYSTEM_NAMES
from solver.fields import curves
from solver.solve import solve
from tests.gui.hand import begin, chord, enter, go_to
from tests.gui.sheets import SIZES, laid_out
from tests.gui.test_strips import pulled
from tests.gui.windows import end, solved

KEY = Qt.Key


def keep(window, name=None):
    """Ctrl+K, a name or the proposed one, Enter."""
    chord(window, KEY.Key_K)
    if name is not None:
        QTest.keyClicks(window.against.field, name)
    QTest.keyClick(window.against.field, KEY.Key_Return)


def names(window):
    return window.comparing.references.names


def dashed(window):
    """The dashed curves of each strip."""
    return [[curve for curve in strip.curves if is_dashed(curve)] for strip in window.sheet.strips]


def is_dashed(curve):
    return curve.pen is not None and curve.pen.dashPattern() == [*DASHES]


def block_titles(window):
    return [block.block.title for block in window.findings.blocks]


def line(window, name):
    """The value of a line of the block on top."""
    (found,) = [line.value for line in window.findings.blocks[0].block.lines if line.name == name]
    return found


# By hand


def test_a_reference_is_kept_and_held_against_the_next_edit(qtbot, window, table):
    before = window.showing.outcome.results
    assert not window.against.isVisible(), "nothing is in the bar until there is a reference"
    keep(window)
    assert names(window) == ("Before 1",)
    assert window.against.picker.currentText() == "Before 1"
    assert "no file holds it" in window.status.news.text()
    assert line(window, "largest utilisation").endswith("unchanged")
    enter(table, 4, "section", "A 976")
    solved(qtbot, window)
    new = window.showing.outcome.results
    difference = new.governing.utilisation - before.governing.utilisation
    assert line(window, "largest utilisation").endswith(f"(+{difference:.4f})")
    assert block_titles(window)[:3] == [
        "Against Before 1",
        "Displacements against Before 1",
        "Reactions against Before 1",
    ]
    assert all(len(found) == 1 for found in dashed(window))
    assert "dashed: Before 1" in [label.text for label in window.sheet.strips[0].labels]


def test_the_places_that_changed_most_are_named_whole_with_both_values(qtbot, window, table):
    before = window.showing.outcome.results.solution.joint_displacement
    keep(window)
    enter(table, 4, "section", "A 976")
    solved(qtbot, window)
    results = window.showing.outcome.results
    changed = abs(results.solution.joint_displacement - before)[:3]
    state, joint = divmod(int(changed.argmax()), changed.shape[1])
    lines = window.findings.blocks[1].block.lines
    assert lines[0].name == f"joint {results.project.joints[joint].mark}, {results.states[state].name}"
    assert lines[1].value.startswith(f"{1e3 * before[state, joint]:.3f}".replace("-", "−"))
    assert lines[0].name in window.findings.blocks[1].accessibleName()


def test_it_survives_undo_and_is_held_against_what_undo_brings_back(qtbot, window, table):
    keep(window)
    enter(table, 4, "section", "A 976")
    solved(qtbot, window)
    assert "→" in line(window, "mass")
    chord(window, KEY.Key_Z)
    solved(qtbot, window)
    assert names(window) == ("Before 1",)
    assert line(window, "mass").endswith("unchanged")
    assert not window.document.modified, "it is no part of the document"


def test_the_button_of_the_bar_asks_in_the_bar_and_nothing_is_modal(window, table):
    go_to(table, 2, "length")
    (button,) = [b for b in window.top_bar.findChildren(QToolButton) if b.text() == "Keep"]
    QTest.mouseClick(button, Qt.MouseButton.LeftButton)
    field = window.against.field
    assert field.hasFocus()
    assert field.selectedText() == "Before 1"
    QTest.keyClicks(field, "As built")
    QTest.keyClick(field, KEY.Key_Return)
    assert names(window) == ("As built",)
    assert not field.isVisible()


def test_enter_gives_the_keyboard_back_to_the_table(window, table):
    table.setFocus()
    keep(window)
    assert table.hasFocus()


def test_escape_keeps_nothing(window, table):
    table.setFocus()
    chord(window, KEY.Key_K)
    QTest.keyClick(window.against.field, KEY.Key_Escape)
    assert names(window) == ()
    assert not window.against.isVisible()
    assert table.hasFocus()


def test_going_on_with_the_table_keeps_it_under_the_name_typed(qtbot, window, table):
    before = window.showing.outcome.results
    chord(window, KEY.Key_K)
    QTest.keyClicks(window.against.field, "Old")
    at = table.visualRect(table.table_model.index(2, 1)).center()
    QTest.mouseClick(table.viewport(), Qt.MouseButton.LeftButton, pos=at)
    assert names(window) == ("Old",)
    assert window.comparing.references.against.results is before
    assert table.hasFocus()


def test_the_window_closes_while_a_name_is_asked_for(qtbot, window):
    chord(window, KEY.Key_K)
    end(qtbot, window)


def test_what_is_kept_is_what_was_shown_when_it_was_asked_for(qtbot, window):
    before = window.showing.outcome.results
    chord(window, KEY.Key_K)
    window.on_layout_picked("vertical")
    solved(qtbot, window)
    assert window.showing.outcome.results is not before
    QTest.keyClick(window.against.field, KEY.Key_Return)
    assert window.comparing.references.against.results is before


def test_results_that_are_out_of_date_are_not_kept(window, table):
    go_to(table, 1, "length")
    QTest.keyClick(begin(table, "abc"), KEY.Key_Return)
    chord(window, KEY.Key_K)
    assert not window.against.field.isVisible()
    assert names(window) == ()


def test_results_on_their_way_are_not_kept(qtbot, window, table):
    enter(table, 1, "length", "900")
    chord(window, KEY.Key_K)
    assert not window.against.field.isVisible()
    solved(qtbot, window)


@pytest.mark.parametrize("act", ["show", "look"])
def test_what_was_forgotten_is_no_news_once_something_else_is_picked(window, act):
    keep(window)
    chord(window, KEY.Key_K, Qt.KeyboardModifier.ControlModifier | Qt.KeyboardModifier.ShiftModifier)
    assert "forgotten" in window.status.news.text()
    if act == "show":
        window.top_bar.show_picker.setFocus()
        QTest.keyClick(window.top_bar.show_picker, KEY.Key_Down)
    else:
        window.view.set_looks(replace(window.view.looks, displaced=True))
    assert window.status.news.text() == ""


def test_several_are_picked_and_forgotten_by_keys(window):
    keep(window, "One")
    keep(window, "Two")
    keep(window)
    picker = window.against.picker
    assert [picker.itemText(i) for i in range(picker.count())] == ["none", "One", "Two", "Before 1"]
    picker.setFocus()
    QTest.keyClick(picker, KEY.Key_Up)
    assert block_titles(window)[0] == "Against Two"
    chord(window, KEY.Key_K, Qt.KeyboardModifier.ControlModifier | Qt.KeyboardModifier.ShiftModifier)
    assert names(window) == ("One", "Before 1")
    assert picker.currentText() == "none"
    assert not any(title.startswith("Against") for title in block_titles(window))
    assert not any(dashed(window))
    chord(window, KEY.Key_K, Qt.KeyboardModifier.ControlModifier | Qt.KeyboardModifier.ShiftModifier)
    assert names(window) == ("One", "Before 1"), "with none looked at none is forgotten"


@pytest.mark.parametrize("way", ["new", "sample"])
def test_another_project_forgets_them(qtbot, window, way):
    keep(window)
    chord(window, KEY.Key_K)  # a name that is being asked for is of the old project too
    window.files.new() if way == "new" else window.files.open_sample(samples.read_sample("hoist_shaft"))
    solved(qtbot, window)
    assert names(window) == ()
    assert not window.against.isVisible()
    assert not any(dashed(window))
    assert not any(title.startswith("Against") for title in block_titles(window))


# With everything else


@pytest.mark.parametrize("system", SYSTEM_NAMES)
def test_the_differences_turn_with_the_units(qtbot, window, table, system):
    keep(window)
    enter(table, 4, "section", "A 976")
    window.on_units_picked(system)
    solved(qtbot, window)
    assert f" {'lb' if system.startswith('in') else 'kg'} (" in line(window, "mass")


def test_they_are_marked_out_of_date_with_the_rest(window, table):
    keep(window)
    go_to(table, 1, "length")
    begin(table, "abc")
    assert window.findings.is_marked_out_of_date
    assert window.findings.blocks[0]._theme != window.findings._theme
    assert window.sheet.notice
    assert all(dashed(window))


def test_another_state_shows_its_own_dashed_curves(window):
    keep(window)
    window.view.set_shown(Shown("combination", "Gate shut"))
    earlier = window.sheet.strips[1].content.earlier[0]
    results = window.showing.outcome.results
    assert np.array_equal(
        earlier.value, curves(results, results.state_index("Gate shut", "combination")).force
    )
    window.view.set_shown(Shown("envelope"))
    assert [len(strip.content.earlier) for strip in window.sheet.strips] == [2, 2, 2, 1]


def test_a_state_that_the_reference_has_not_shows_no_curves_and_says_so(qtbot, window):
    keep(window)
    project = window.document.project
    first = replace(project.combinations[0], name="Anew")
    window.document.commit(replace(project, combinations=(first, *project.combinations[1:])), "Rename")
    solved(qtbot, window)
    window.view.set_shown(Shown("combination", "Anew"))
    assert not any(dashed(window))
    assert window.sheet.strips[0].content.legend == "Before 1: no state of this name"


def test_the_bar_has_room_for_them_at_the_least_usual_size(window):
    window.resize(1280, 800)
    keep(window)
    assert window.against.picker.isVisible()
    assert window.top_bar.minimumSizeHint().width() <= 1280
    chord(window, KEY.Key_K)
    assert window.against.field.isVisible()
    assert window.top_bar.minimumSizeHint().width() <= 1280
    QTest.keyClick(window.against.field, KEY.Key_Escape)


def test_a_long_name_neither_widens_the_bar_nor_leaves_the_strip(window):
    window.resize(1280, 800)
    width = window.top_bar.minimumSizeHint().width()
    keep(window, "W" * 40)
    assert window.top_bar.minimumSizeHint().width() <= max(width, 1280)
    for layout in ("vertical", "horizontal"):
        window.on_layout_picked(layout)
        strip = window.sheet.strips[0]
        (legend,) = [label for label in strip.labels if label.text.startswith("dashed")]
        room = strip.place.rect
        assert room.left() <= legend.rect.left() < legend.rect.right() <= room.right()


@pytest.mark.parametrize(
    ("layout", "together"), [("vertical", False), ("vertical", True), ("horizontal", False)]
)
@pytest.mark.parametrize("sample", samples.names())
def test_the_words_for_the_lines_are_whole_and_lie_on_no_curve(qtbot, window, sample, layout, together):
    window.files.open_path(samples.sample_path(sample))
    solved(qtbot, window)
    window.on_layout_picked(layout)
    window.view.set_together(together)
    solved(qtbot, window)
    keep(window, "As drawn")
    strip = window.sheet.strips[0]
    (legend,) = [label for label in strip.labels if "dashed" in label.text]
    assert "dashed: As drawn" in legend.text.replace("\n", " ")
    if not legend.rect.intersects(strip.place.rect):
        return
    content, axes, ruler = strip.content, strip.place.axes, strip.place.ruler
    along, (low, high) = axes.along_of(legend.rect), axes.across_of(legend.rect)
    x = np.array([ruler.position_at(a) for a in np.linspace(*along, 50)])
    for trace in (*content.traces, *content.earlier, *content.singles, *content.around):
        curve = strip.scale.pixels(np.interp(x, trace.x, trace.value))
        assert not np.any((curve > low) & (curve < high))


# Without a window


def test_the_strips_hold_both_and_the_scale_takes_the_larger():
    old, new = pulled(2e5), pulled(1e5)
    for index, content in enumerate(state_contents(new, 0, earlier_curves("Before 1", old, 0))):
        before = state_contents(old, 0)[index].traces[0].value
        assert content.low <= np.nanmin(before)
        assert content.high >= np.nanmax(before)
    plain = state_contents(new, 0)
    assert all(content.earlier == () and content.legend == "" for content in plain)
    same = state_contents(new, 0, earlier_curves("Before 1", pulled(0.5e5), 0))
    assert [(c.low, c.high) for c in same] == [(c.low, c.high) for c in plain], (
        "a smaller one changes nothing"
    )


def test_a_limit_within_the_scale_of_the_reference_is_drawn_there():
    """Far from the new stress, and yet on the strip: drawn where it is, not named beyond the edge."""
    small, large = pulled(2e3), pulled(2e5)
    assert state_contents(small, 0)[2].beyond
    content = state_contents(small, 0, earlier_curves("Before 1", large, 0))[2]
    assert not content.beyond
    assert all(content.low <= limit.value <= content.high for limit in content.limits)


def test_a_longer_reference_keeps_its_own_positions():
    old, new = solve(samples.read_sample("tie_rod")), pulled()
    content = envelope_contents(new, earlier_curves("Before 1", old, None))[0]
    assert content.earlier[0].x[-1] == old.position[-1]
    assert content.traces[0].x[-1] == new.position[-1]


@pytest.mark.parametrize("theme", [LIGHT, DARK], ids=["light", "dark"])
@pytest.mark.parametrize("upright", [False, True], ids=["across", "upright"])
def test_a_reference_is_thin_dashed_and_under_the_new_curve(qapp, theme, upright):
    old, new = pulled(2e5), pulled(1e5)
    layout = laid_out(SIZES[0], upright=upright)
    ruler = Ruler.whole(2.0, layout.begin, layout.end)
    strip = Strip(theme)
    strip.set_place(Place(layout.strips[1], ruler, layout.axes, Fonts(QFont())))
    strip.show_content(state_contents(new, 0, earlier_curves("Before 1", old, 0))[1])
    strip.refresh()
    lines = [curve for curve in strip.curves if curve.pen is not None]
    (thin,) = [curve for curve in lines if is_dashed(curve)]
    assert thin.pen.color().name().upper() == theme.quiet
    assert lines[0] is thin  # under the others
    points = thin.shape.points
    along = points.y if upright else points.x
    assert along[[0, -1]] == pytest.approx(ruler.pixel(curves(old, 0).x[[0, -1]]))
    strip.show_content(state_contents(new, 0)[1])
    strip.refresh()
    assert not any(map(is_dashed, strip.curves))
