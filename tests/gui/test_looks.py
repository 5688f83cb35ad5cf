"""Colours, displaced shape, scale along and zoom to the selection in the window, by keys and menu."""

from __future__ import annotations

import pytest
from PySide6.QtCore import QPoint, Qt
from PySide6.QtTest import QTest

from app.gui.drawing.results_layer import STRONGEST
from app.gui.drawing_menu import DrawingMenu
from app.gui.theme import DARK, LIGHT, contrast, mixed
from app.gui.view import Selection, Shown
from app.looks import Looks
from tests.gui.hand import chord, enter
from tests.gui.windows import beyond_window


def pick(window, action):
    """Choose an entry of the drawing's menu with the mouse."""
    menu = next(menu for menu in window.findChildren(DrawingMenu))
    menu.popup(QPoint(0, 0))
    QTest.mouseClick(menu, Qt.MouseButton.LeftButton, pos=menu.actionGeometry(action(menu)).center())


def said(window) -> set[str]:
    return {text.text for text in window.sheet.drawing.picture.texts}


class TestColour:
    def test_is_off_at_first_and_costs_no_item(self, window):
        items = window.sheet.scene().on_drawing.items
        assert not any(item.isVisible() for item in items)

    def test_is_chosen_in_the_menu_and_remembered(self, window):
        pick(window, lambda menu: menu.colours["stress"])
        layer = window.sheet.scene().on_drawing.colours
        assert layer.isVisible()
        assert any(tint.over for tint in layer.tinting.tints)
        assert window.store.looks == Looks("stress")
        pick(window, lambda menu: menu.colours["none"])
        assert not layer.isVisible()

    def test_is_grey_when_out_of_date(self, window, table):
        window.view.set_looks(Looks("force"))
        layer = window.sheet.scene().on_drawing.colours
        assert layer._theme.tension != layer._theme.quiet
        enter(table, 1, "length", "nonsense")
        assert layer._theme.tension == layer._theme.compression == layer._theme.quiet

    @pytest.mark.parametrize("theme", [LIGHT, DARK], ids=["light", "dark"])
    @pytest.mark.parametrize("ink", ["tension", "compression"])
    def test_marks_can_be_read_on_the_strongest_shade(self, theme, ink):
        ground = mixed(getattr(theme, ink), theme.paper, STRONGEST)
        assert contrast(theme.ink, ground) >= 4.5


class TestDisplaced:
    def test_says_its_factor_and_is_of_a_single_state(self, window):
        pick(window, lambda menu: menu.displaced)
        assert "displaced ×20" in said(window)
        assert window.sheet.scene().on_drawing.displaced.strokes
        window.view.set_shown(Shown("envelope"))
        assert "displaced shape: choose a single state at Show" in said(window)
        assert not window.sheet.scene().on_drawing.displaced.isVisible()


class TestScaleAlong:
    def test_least_widths_are_said_until_all_is_true_to_scale(self, window, table):
        enter(table, 1, "length", "2")
        assert any("A: not to scale along" in text for text in said(window))
        pick(window, lambda menu: menu.true)
        assert not any("not to scale" in text for text in said(window))
        assert window.sheet.ruler.to_scale
        assert {strip.place.ruler for strip in window.sheet.strips} == {window.sheet.ruler}


class TestZoom:
    def test_to_what_is_selected_and_back(self, window):
        window.view.set_selection(Selection(segments=frozenset((3,))))
        chord(window, Qt.Key.Key_9)
        ruler, positions = window.sheet.ruler, window.document.project.segments
        start = sum(segment.length for segment in positions[:3])
        assert ruler.holds(start)
        assert ruler.holds(start + positions[3].length)
        assert not ruler.holds(start + 2 * positions[3].length)
        chord(window, Qt.Key.Key_0)
        assert window.sheet.ruler.whole_shown

    def test_to_the_segments_of_a_joint(self, window):
        window.view.set_selection(Selection(joints=frozenset((0,))))
        window.sheet.zoom_to_selection()
        assert window.sheet.ruler.holds(0.18)
        assert not window.sheet.ruler.holds(0.30)

    def test_colours_stay_within_the_window_of_the_ruler(self, window):
        window.view.set_looks(Looks("stress"))
        window.view.set_selection(Selection(segments=frozenset((3,))))
        window.sheet.zoom_to_selection()
        drawn = window.sheet.grab().toImage()
        axis = round(window.sheet.drawing.picture.axis)
        beside = drawn.pixelColor(round(window.sheet.ruler.begin) - 12, axis - 4).name().upper()
        assert beside == LIGHT.paper

    @pytest.mark.parametrize("end", [-1, 1])
    @pytest.mark.parametrize("layout", ["horizontal", "vertical"])
    def test_the_displaced_shape_is_cut_where_the_member_goes_on(self, window, layout, end):
        window.on_layout_picked(layout)
        window.view.set_looks(Looks(displaced=True))
        shown = window.sheet.scene().on_drawing.displaced
        window.view.set_selection(Selection(segments=frozenset((2,))))
        window.sheet.zoom_to_selection()
        assert not beyond_window(window, shown, end)
