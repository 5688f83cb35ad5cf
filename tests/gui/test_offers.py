"""Names offered while a cell is typed into: keys, previews, clicks, and typical materials marked as such."""

import pytest
from PySide6.QtCore import QPoint, Qt
from PySide6.QtGui import QAccessible, QGuiApplication
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QMenu

from app import edits
from app.gui.document import Document
from app.gui.tables.column import Offer
from app.gui.tables.offer_list import MOST_ROWS, ROW_HEIGHT
from app.gui.tables.offers import matching
from app.gui.tables.pane import TablesPane
from app.gui.theme import DARK, LIGHT, contrast
from app.gui.view import View
from app.typical_materials import TYPICAL
from solver.model import DisplacementLimit, FixedSupport, JointLoad, Limits, ReactionLimit, SegmentLoad
from tests.gui.hand import begin, cell, chord, editor, enter, go_to, text_at
from tests.gui.windows import solved
from tests.members import Part, case, member, round_bar

KEY = Qt.Key
STIFFNESS = "210\u202f000 MPa"
ADDED = "{} added with typical values, verify; it has no allowable stresses yet"


def shaft():
    bar = round_bar(0.04)
    loads = case("Dead", on_segments=[SegmentLoad("A", 1.0)], on_joints=[JointLoad("1", 1.0)])
    project = member([Part(1.0, bar), Part(1.0, bar)], {0: FixedSupport(), 2: FixedSupport()}, [loads])
    for place, name in enumerate(("Bridge steel", "B")):
        project = edits.set_value(project, ("materials", place, "name"), name)
    limits = Limits(displacement=(DisplacementLimit("1", 1.0),), reaction=(ReactionLimit("0", 1.0),))
    return edits.set_value(project, ("limits",), limits)


@pytest.fixture
def document(qapp):
    return Document(shaft())


@pytest.fixture
def pane(qtbot, document):
    made = TablesPane(document, View(document), LIGHT)
    qtbot.addWidget(made)
    made.resize(1200, 260)
    made.show()
    with qtbot.waitActive(made):
        made.activateWindow()
    made.views["segments"].setFocus()
    return made


@pytest.fixture
def table(pane):
    go_to(pane.views["segments"], 1, "material")
    return pane.views["segments"]


@pytest.fixture
def told(pane):
    lines = []
    pane.noted.connect(lines.append)
    return lines


def names(line):
    """What is offered to see."""
    return [] if line.offer_list is None else [offer.name for offer in line.offer_list.offers]


def materials(document):
    return [material.name for material in document.project.materials]


def made_of(document):
    return [segment.material for segment in document.project.segments]


# Typed


def test_a_typed_name_of_the_list_adds_that_material_with_the_assignment(table, document, told):
    before = document.project
    enter(table, 1, "material", "stainless steel")
    assert made_of(document) == ["Stainless steel", "B"]
    assert document.project.materials[-1].modulus == 200e9
    assert told == [ADDED.format("Stainless steel")]
    assert not document.snapshot.drafts
    document.undo()
    assert document.project is before


def test_a_material_that_is_there_is_only_assigned(table, document, told):
    enter(table, 1, "material", "Brass")
    enter(table, 2, "material", "brass")
    assert made_of(document) == ["Brass", "Brass"]
    assert materials(document) == ["Bridge steel", "B", "Brass"]
    assert told == [ADDED.format("Brass")]


def test_a_material_of_the_users_own_goes_before_a_typical_one(table, document, told):
    own = edits.set_value(document.project, ("materials", 1, "name"), "brass")
    document.commit(own, "Name")
    enter(table, 1, "material", "brass")
    assert made_of(document) == ["brass", "brass"]
    assert told == []


def test_the_adding_row_of_materials_takes_a_name_of_the_list(pane, document, told):
    pane.tabs.setCurrentIndex(4)
    view = pane.views["materials"]
    enter(view, 2, "name", "titanium")
    assert materials(document)[-1] == "Titanium"
    assert text_at(view, 2, "allowable_tension") == ""
    assert told == [ADDED.format("Titanium")]
    enter(view, 3, "name", "titanium")
    assert "taken already" in next(iter(document.snapshot.drafts.values())).reason


def test_a_paste_says_that_it_brought_typical_values(pane, table, document, told):
    QGuiApplication.clipboard().setText("Brass\nCopper")
    table.blocks.paste()
    assert made_of(document) == ["Brass", "Copper"]
    assert told == [ADDED.format("Brass") + " (and 1 thing more)"]
    pane.tabs.setCurrentIndex(4)
    view = pane.views["materials"]
    view.setCurrentIndex(view.table_model.index(view.table_model.rowCount() - 1, 0))
    QGuiApplication.clipboard().setText("Titanium\t114000\nGunmetal\t95000")
    view.blocks.paste()
    assert told[1:] == [ADDED.format("Titanium")], "Gunmetal's modulus is its own, not that of the row above"


# Offered


def test_the_projects_names_stand_before_typical_ones_which_are_marked(table):
    line = begin(table, "st")
    assert names(line) == ["Bridge steel", "Steel", "Stainless steel"]
    remarks = [offer.remark for offer in line.offer_list.offers]
    assert remarks == [STIFFNESS, f"{STIFFNESS}, typical, verify", "200\u202f000 MPa, typical, verify"]
    QTest.keyClicks(line, "ai")
    assert names(line) == ["Stainless steel"]
    QTest.keyClicks(line, "x")
    assert names(line) == []


def test_down_goes_through_the_names_and_previews_each(table, document):
    line = begin(table, "st")
    for name in ("Bridge steel", "Steel", "Stainless steel", "Stainless steel"):
        QTest.keyClick(line, KEY.Key_Down)
        assert line.text() == name
        assert document.shown_project.segments[0].material == name
    assert document.project.segments[0].material == "Bridge steel"
    for text in ("Steel", "Bridge steel", "st"):
        QTest.keyClick(line, KEY.Key_Up)
        assert line.text() == text
    assert document.preview.project is None


def test_enter_takes_the_name_in_and_moves_down(table, document, told):
    line = begin(table, "st")
    QTest.keyClick(line, KEY.Key_Down)
    QTest.keyClick(line, KEY.Key_Down)
    shown = line.offer_list
    QTest.keyClick(line, KEY.Key_Return)
    assert made_of(document) == ["Steel", "B"]
    assert not shown.isVisible()
    assert table.currentIndex() == cell(table, 2, "material")
    assert told == [ADDED.format("Steel")]
    assert document.undo_name == "Material of A"


def test_enter_without_going_into_the_list_takes_what_was_typed(table, document):
    line = begin(table, "B")
    assert names(line) == ["Bridge steel", "B", "Tin bronze", "Brass"]
    QTest.keyClick(line, KEY.Key_Return)
    assert made_of(document) == ["B", "B"]


def test_one_escape_restores_the_cell(table, document):
    line = begin(table, "st")
    QTest.keyClick(line, KEY.Key_Down)
    shown = line.offer_list
    QTest.keyClick(line, KEY.Key_Escape)
    assert not shown.isVisible()
    assert document.preview is None
    assert document.undo_name is None
    assert text_at(table, 1, "material") == "Bridge steel"
    assert table.hasFocus()


def test_tab_takes_the_name_in_and_goes_on(table, document):
    line = begin(table, "tin")
    QTest.keyClick(line, KEY.Key_Down)
    QTest.keyClick(line, KEY.Key_Tab)
    assert made_of(document) == ["Tin bronze", "B"]
    assert table.currentIndex() == cell(table, 1, "modulus")


def test_down_in_a_cell_opened_by_f2_offers_all_from_where_it_stands(table, document):
    QTest.keyClick(table, KEY.Key_F2)
    line = editor(table)
    QTest.keyClick(line, KEY.Key_Up)
    assert names(line) == []
    QTest.keyClick(line, KEY.Key_Down)
    assert line.text() == "B"
    assert len(names(line)) == 2 + len(TYPICAL)
    QTest.keyClick(line, KEY.Key_Up)
    assert line.text() == "Bridge steel"


def test_a_change_elsewhere_leaves_the_chosen_name_in_the_cell(table, document):
    line = begin(table, "st")
    QTest.keyClick(line, KEY.Key_Down)
    QTest.keyClick(line, KEY.Key_Down)
    document.commit(edits.set_value(document.project, ("title",), "Other"), "Title")
    assert line.text() == "Steel"


def test_a_click_on_a_name_takes_it_in(table, document):
    line = begin(table, "st")
    shown = line.offer_list
    spot = shown.visualRect(shown.model().index(2, 0)).center()
    QTest.mouseClick(shown.viewport(), Qt.MouseButton.LeftButton, pos=spot)
    assert made_of(document) == ["Stainless steel", "B"]
    assert not shown.isVisible()
    assert table.currentIndex() == cell(table, 1, "material")
    assert table.hasFocus()


@pytest.mark.parametrize(
    ("tab", "key", "row", "column", "text", "offered"),
    [
        (2, "segment_loads", 0, "segment", None, ["A", "B"]),
        (2, "segment_loads", 1, "segment", None, ["A", "B"]),
        (2, "joint_loads", 0, "joint", None, ["0", "1", "2"]),
        (2, "joint_loads", 1, "joint", None, ["0", "1", "2"]),
        (5, "limits displacement", 0, "joint", None, ["0", "1", "2"]),
        (5, "limits displacement", 1, "joint", None, ["0", "1", "2"]),
        (5, "limits reaction", 0, "joint", None, ["0", "2"]),
        (5, "limits reaction", 1, "joint", None, ["0", "2"]),
        (4, "materials", 2, "name", "co", ["Copper", "Concrete, normal weight"]),
        (4, "materials", 0, "name", "co", []),
        (0, "segments", 1, "length", "1", []),
    ],
)
def test_cells_that_refer_to_something_offer_it(pane, tab, key, row, column, text, offered):
    pane.tabs.setCurrentIndex(tab)
    view = pane.views[key]
    view.setFocus()
    go_to(view, row, column)
    if text is None:
        QTest.keyClick(view, KEY.Key_F2)
        line = editor(view)
        QTest.keyClick(line, KEY.Key_Down)
    else:
        line = begin(view, text)
    assert names(line) == offered
    QTest.keyClick(line, KEY.Key_Escape)


def test_words_are_matched_from_their_beginnings():
    offers = (Offer("Steel"), Offer("Stainless steel"), Offer("Cast steel 2"))
    assert matching(offers, "STEEL") == offers
    assert matching(offers, "teel") == ()
    assert matching(offers, "steel 2") == offers[2:]
    assert matching((Offer("A"), Offer("B")), "A") == (), "nothing is left to offer"


# Seen and heard


def test_the_list_stays_inside_the_window_and_next_to_its_cell(pane, table):
    for row in (1, 2):
        go_to(table, row, "material")
        QTest.keyClick(table, KEY.Key_F2)
        line = editor(table)
        QTest.keyClick(line, KEY.Key_Down)
        box, spot = line.offer_list.geometry(), line.mapTo(pane, QPoint(0, 0))
        assert pane.rect().contains(box)
        assert box.top() == spot.y() + line.height()
        QTest.keyClick(line, KEY.Key_Escape)


def test_the_list_opens_upwards_where_there_is_no_room_below(qtbot, window):
    table = window.tables.views["segments"]
    go_to(table, 3, "material")
    QTest.keyClick(table, KEY.Key_F2)
    line = editor(table)
    QTest.keyClick(line, KEY.Key_Down)
    box, spot = line.offer_list.geometry(), line.mapTo(window, QPoint(0, 0))
    assert box.bottom() + 1 == spot.y()
    assert box.height() >= MOST_ROWS * ROW_HEIGHT
    QTest.keyClick(line, KEY.Key_Escape)


def test_names_and_remarks_are_read_aloud(table):
    line = begin(table, "st")
    assert "Down" in line.accessibleDescription()
    spoken = QAccessible.queryAccessibleInterface(line.offer_list)
    assert spoken.text(QAccessible.Text.Name) == "Names to choose from"
    assert spoken.role() == QAccessible.Role.List
    assert spoken.child(1).text(QAccessible.Text.Name) == f"Steel, {STIFFNESS}, typical, verify"
    QTest.keyClick(line, KEY.Key_Escape)


@pytest.mark.parametrize("theme", [LIGHT, DARK])
def test_the_list_can_be_read(theme):
    for ground in (theme.card, theme.select_fill):
        assert contrast(theme.ink, ground) >= 4.5
        assert contrast(theme.quiet, ground) >= 4.5
    assert contrast(theme.joint, theme.card) >= 3.0
    assert contrast(theme.select, theme.select_fill) >= 3.0


# By the menu


@pytest.mark.qt_log_ignore(r"does not support (raise\(\)|grabbing the keyboard)")  # of the offscreen platform
def test_the_menu_adds_by_keys_and_goes_to_the_new_row(qtbot, window):
    menu = window.typical_menu
    member_menu = next(m for m in window.menuBar().findChildren(QMenu) if menu.menuAction() in m.actions())
    QTest.keyClick(window, KEY.Key_M, Qt.KeyboardModifier.AltModifier)
    QTest.keyRelease(window, KEY.Key_Alt)
    qtbot.waitUntil(member_menu.isVisible)
    QTest.keyClick(member_menu, KEY.Key_T)
    qtbot.waitUntil(menu.isVisible)
    assert menu.actions()[1].text() == "Stainless steel (typical, verify)"
    menu.setActiveAction(menu.actions()[0])
    QTest.keyClick(menu, KEY.Key_Down)
    QTest.keyClick(menu, KEY.Key_Return)
    added = window.document.project.materials[-1]
    assert added.name == "Stainless steel"
    assert window.status.news.text() == ADDED.format("Stainless steel")
    view = window.tables.views["materials"]
    assert view.isVisible()
    qtbot.waitUntil(view.hasFocus)
    assert view.chosen_records() == (len(window.document.project.materials) - 1,)
    chord(window, KEY.Key_Z)
    assert added not in window.document.project.materials


def test_the_menu_offers_only_what_is_not_there_yet(window):
    for count in range(len(TYPICAL), 0, -1):
        window.typical_menu.fill()
        assert len(window.typical_menu.actions()) == count
        window.typical_menu.actions()[0].trigger()
    window.typical_menu.fill()
    (none_left,) = window.typical_menu.actions()
    assert not none_left.isEnabled()


def test_the_status_line_tells_of_an_added_material(qtbot, window):
    table = window.tables.views["segments"]
    enter(table, 1, "material", "Brass")
    assert window.status.news.text() == ADDED.format("Brass")
    solved(qtbot, window)
    assert window.status.news.text() == ADDED.format("Brass")
