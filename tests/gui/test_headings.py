"""Blocks from spreadsheets with headings: columns in any order, units that convert, and what is refused."""

from contextlib import suppress

import pytest
from hypothesis import given
from hypothesis import strategies as st
from PySide6.QtCore import Qt
from PySide6.QtGui import QGuiApplication
from PySide6.QtTest import QTest

from app import words
from app.gui.tables.column import Sight
from app.gui.tables.headings import headed_block
from app.gui.tables.materials import COLUMNS as MATERIAL_COLUMNS
from app.gui.tables.reasons import NotTaken
from app.gui.tables.segments import COLUMNS
from app.units import SYSTEM_NAMES, symbol
from solver.model import AreaSection, RoundSection
from tests.gui.hand import cell, chord, go_to, text_at

SIGHT = Sight("mm-kN-MPa", 0)
PLACES = {column.key: place for place, column in enumerate(COLUMNS)}
CTRL, SHIFT = Qt.KeyboardModifier.ControlModifier, Qt.KeyboardModifier.ShiftModifier


def read(text, columns=COLUMNS, sight=SIGHT):
    return headed_block([line.split("\t") for line in text.split("\n")], columns, sight)


def only(text, **options):
    """The one text that a block of one column and one row gives."""
    (row,) = read(text, **options).rows
    ((_column, found),) = row.items()
    return found


@pytest.mark.parametrize(
    ("text", "found"),
    [
        ("Length\n350", "350"),
        ("length\n350", "350"),
        ("  LENGTH \n350", "350"),
        ("Length (mm)\n350", "350"),
        ("Length [in]\n3/8", "3/8 in"),
        ("Length, cm\n3,5", "3,5 cm"),
        ("Length m\n0.35", "0.35 m"),
        ("Length in m\n0.35", "0.35 m"),
        ("Length in\n14", "14 in"),
        ("Length\ncm\n35", "35 cm"),
        ("Length\n[cm]\n35", "35 cm"),
        ("Length (in)\n350 mm", "350 mm"),
        ("Length (in)\n2*(7+1)", "2*(7+1) in"),
        ("Length (in)\n", ""),
        ("Length (in)\nlong", "long"),
        ("Section (cm)\nd4", "d4 cm"),
        ("Section (cm)\nd6x0.5->5x0.5", "d6x0.5->5x0.5 cm"),
        ("Section (cm)\nA 12", "A 12 cm²"),
        ("Temperature rise (°F)\n10→20", "10 °F→20 °F"),
        ("Bedding (kN/m²)\n20 -> 45", "20 kN/m²->45 kN/m²"),
        ("Modulus (GPa)\n210", "210 GPa"),
        ("Load at start\n1", "1"),
    ],
)
def test_titles_and_units_are_read(text, found):
    assert only(text) == found


@pytest.mark.parametrize(
    "text", ["A\t350\nB\t400", "Length", "350\n400", "Length\t350\n1\t2", "Long\n1", "\n1"]
)
def test_a_block_without_headings_is_none(text):
    assert read(text) is None


def test_columns_stand_in_any_order_and_unknown_ones_are_named():
    block = read("Comment\tSection\tLength (m)\tArea of paint\tLength\nnew\td40\t0.5\t3\t9")
    assert block.rows == ({PLACES["section"]: "d40", PLACES["length"]: "0.5 m"},)
    assert block.unknown == ("Comment", "Area of paint", "Length")


def test_a_row_of_units_is_told_from_a_row_of_values():
    assert read("Mark\tLength\tModulus\n\tcm\tGPa\nA\t5\t210").rows[0][PLACES["modulus"]] == "210 GPa"
    assert len(read("Mark\tLength\tModulus\nA\t\t\nB\t5\t210").rows) == 2
    assert len(read("Mark\tMaterial\tLength\nm\tcm\t5\nB\tC45\t7").rows) == 2


@pytest.mark.parametrize("text", ["Length (kN)\n1", "Length kN\n1", "Length\nkN\n1", "Section (mm²)\nd4"])
def test_a_unit_of_another_quantity_is_refused_with_a_sentence(text):
    with pytest.raises(
        NotTaken, match=r"^nothing was pasted, because of the heading “(Length|Section).*unit"
    ):
        read(text)


def test_titles_are_known_in_the_users_language_too():
    words.use_language("de")
    try:
        german = COLUMNS[PLACES["length"]].words
        assert german != "Length"
        assert only(f"{german} (cm)\n35") == only("Length (cm)\n35") == "35 cm"
    finally:
        words.use_language("en")


@given(st.sampled_from(SYSTEM_NAMES), st.sampled_from([c for c in MATERIAL_COLUMNS if c.quantity]))
def test_headings_in_the_display_unit_change_no_text(system, column):
    heading = f"{column.title} ({symbol(column.quantity, system)})"
    assert only(f"{heading}\n123", columns=MATERIAL_COLUMNS, sight=Sight(system, None)) == "123"


@given(st.lists(st.lists(st.text("LengthMark ([])mN0123.,\"'-", max_size=12), min_size=1), min_size=1))
def test_any_block_is_read_or_refused_in_words(block):
    with suppress(NotTaken):
        headed_block(block, COLUMNS, SIGHT)


# In the window


def paste(table, text, row=1, key="mark"):
    QGuiApplication.clipboard().setText(text)
    go_to(table, row, key)
    chord(table, Qt.Key.Key_V)


def test_a_headed_block_grows_the_table_as_one_step(window, table):
    before = window.document.project
    paste(table, 'Section (cm)\tNote\t"Length (m)"\nd4\tx\t"0,5"\n\t\t\nd5\ty\t2/5\n\n', 9)
    new = window.document.project.segments[8:]
    assert [(one.length, one.section.diameter) for one in new] == [(0.5, 0.04), (0.4, 0.05)]
    assert window.status.news.text() == "left out, as this table has no such column: “Note”"
    assert window.document.undo_name == "Paste"
    window.document.undo()
    assert window.document.project == before


def test_a_headed_block_goes_to_its_columns_wherever_the_cell_is(window, table):
    paste(table, "Length (m)\n0.7\nlong\n0.9", 1, "section")
    assert [text_at(table, row, "length") for row in (1, 2, 3)] == ["700", "long", "900"]
    assert [draft.text for draft in window.document.snapshot.drafts.values()] == ["long"]


def test_a_wrong_heading_changes_nothing_and_says_so(window, table):
    paste(table, "Length (kN)\n0.7")
    assert window.document.undo_name is None
    assert "nothing was pasted" in window.status.news.text()


def test_the_first_data_row_is_the_first_segment_also_from_the_row_before_it(window, table):
    paste(table, "Mark\tLength\nQ\t700", 0)
    assert window.document.project.segments[0].mark == "Q"


@pytest.mark.parametrize(
    "key", ["segments", "joints", "materials", "combinations", "load_cases", "segment_loads"]
)
def test_what_is_copied_with_headings_can_be_pasted_back(window, key):
    before, view = window.document.project, window.tables.views[key]
    window.tables.tabs.setCurrentIndex(
        ["segments", "joints", "load_cases", "combinations", "materials"].index(
            {"segment_loads": "load_cases"}.get(key, key)
        )
    )
    view.setFocus()
    view.selectAll()
    chord(view, Qt.Key.Key_C, CTRL | SHIFT)
    copied = QGuiApplication.clipboard().text()
    assert copied.startswith(view.table_model.titled(0))
    view.setCurrentIndex(view.table_model.index(0, 0))
    chord(view, Qt.Key.Key_V)
    assert window.document.project == before
    assert not window.document.snapshot.drafts


def test_what_is_copied_with_headings_is_the_same_member_in_other_units(window, table):
    def copied():
        table.selectAll()
        chord(table, Qt.Key.Key_C, CTRL | SHIFT)
        return QGuiApplication.clipboard().text()

    before, system = copied(), window.document.project.display.unit_system
    window.on_units_picked("in-kip-ksi")
    table.setCurrentIndex(table.table_model.index(0, 0))
    chord(table, Qt.Key.Key_V)
    assert not window.document.snapshot.drafts
    window.on_units_picked(system)
    assert copied() == before


def test_a_rounded_area_beside_a_section_does_not_replace_it(window, table):
    paste(table, "Section\tArea\tMark\nd40\t1257\tQ\n\t1234\tR")
    first, second = window.document.project.segments[:2]
    assert (first.mark, first.section) == ("Q", RoundSection(diameter=0.04))
    assert [draft.text for draft in window.document.snapshot.drafts.values()] == [""]
    assert second.section == AreaSection(area=0.001234)


def test_a_blank_row_empties_what_may_be_empty_and_leaves_the_rest(window, table):
    before = window.document.project.segments[1]
    paste(table, "300\td40\n\t\n500\td50", 1, "length")
    assert window.document.project.segments[1] == before
    assert not window.document.snapshot.drafts


def test_a_text_beyond_all_measure_is_a_block_all_the_same():
    from app.gui.tables.clipboard import block_of

    assert block_of('"' + "1\t2\n" * 60_000)[1] == ["1", "2"]


@pytest.mark.parametrize(
    "above",
    ["\ufeff", "\t\t\n\n", "Rods of the gate\t\t\n", "\n\tRods\t\n\t\t\n"],
    ids=["mark of order", "blank", "title", "both"],
)
def test_blank_rows_and_a_title_above_the_headings_are_passed_over(window, table, above):
    paste(table, f"{above}Mark\tLength (cm)\tMaterial\r\nQ\t35\tForged steel\r\n")
    first, second = window.document.project.segments[:2]
    assert (first.mark, first.length, second.mark) == ("Q", 0.35, "B")
    assert not window.document.snapshot.drafts


def test_headings_alone_are_typed_nowhere(window, table):
    paste(table, "Mark\tLength (mm)\tSection\n\t\t\n")
    assert window.document.undo_name is None
    assert window.status.news.text() == "nothing was pasted: there is nothing below the headings"


def test_german_headings_are_known_in_an_english_window():
    german = words.in_every_language("Length")[1]
    assert german != "Length"
    assert only(f"{german} [cm]\n35") == "35 cm"


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("Length\n1,500", "“1,500” was read as 1.5"),
        ("Length\n12,345 mm", "“12,345 mm” was read as 12.345"),
        ("Length\n1.500\n0,25", "“1.500” was read as 1.5"),
        ("Length\n1.500\n0.25", ""),
        ("Length\n1,5", ""),
        ("Length\n0,250", ""),
    ],
)
def test_what_may_be_meant_as_thousands_is_said(window, table, text, said):
    paste(table, text)
    news = window.status.news.text()
    assert news.startswith(said)
    assert bool(news) == bool(said)


def test_columns_past_the_end_are_counted(window, table):
    paste(table, "0.5\tx\ty", 1, "utilisation")
    assert window.status.news.text() == "2 columns were left out: the table ends there"


# Rows that lie apart


def choose_apart(table, *rows, key="length"):
    go_to(table, rows[0], key)
    for row in rows[1:]:
        spot = table.visualRect(cell(table, row, key)).center()
        QTest.mouseClick(table.viewport(), Qt.MouseButton.LeftButton, CTRL, spot)


def lengths(window):
    return [round(1e3 * segment.length, 6) for segment in window.document.project.segments[:5]]


def test_a_cell_goes_into_chosen_rows_only(window, table):
    between = lengths(window)[1:3]
    choose_apart(table, 1, 4)
    QGuiApplication.clipboard().setText("777")
    chord(table, Qt.Key.Key_V)
    assert lengths(window)[:4] == [777, *between, 777]


def test_as_many_rows_as_are_chosen_go_into_these_and_others_nowhere(window, table):
    before = lengths(window)
    choose_apart(table, 1, 4)
    QGuiApplication.clipboard().setText("1\n2\n3")
    chord(table, Qt.Key.Key_V)
    assert lengths(window) == before
    assert "lie apart" in window.status.news.text()
    QGuiApplication.clipboard().setText("701\n702")
    chord(table, Qt.Key.Key_V)
    assert lengths(window) == [701, *before[1:3], 702, before[4]]


def test_chosen_rows_are_copied_and_filled_without_those_between(window, table):
    before = lengths(window)
    choose_apart(table, 1, 4)
    chord(table, Qt.Key.Key_C)
    assert QGuiApplication.clipboard().text() == f"{before[0]:g}\n{before[3]:g}"
    chord(table, Qt.Key.Key_D)
    assert lengths(window) == [before[0], *before[1:3], before[0], before[4]]


def test_cells_that_make_no_block_are_not_copied(window, table):
    choose_apart(table, 1)
    choose = table.visualRect(cell(table, 2, "section")).center()
    QTest.mouseClick(table.viewport(), Qt.MouseButton.LeftButton, CTRL, choose)
    QGuiApplication.clipboard().setText("as before")
    chord(table, Qt.Key.Key_C)
    assert QGuiApplication.clipboard().text() == "as before"
    assert window.status.news.text() == "choose the same columns in every row"


def test_more_rows_than_anyone_waits_for_are_refused_in_words(window, table):
    paste(table, "\n".join(["Length", *["1"] * 5000]))
    assert window.document.undo_name is None
    assert window.status.news.text() == "nothing was pasted: 5001 rows are too many at once, paste up to 2000"


def test_a_pasted_row_costs_no_look_at_all_records(window, table, monkeypatch):
    """Thousands of rows would take minutes if each record were read anew for every cell."""
    from app.edits import checking

    read, real = [], checking.convert

    def counted(value, described, place, faults):
        read.append(place)
        return real(value, described, place, faults)

    monkeypatch.setattr(checking, "convert", counted)
    paste(table, "Mark\tLength\tSection\n" + "\n".join(f"X{i}\t100\td40" for i in range(40)))
    assert len(window.document.project.segments) == 40
    assert () not in read, "the whole project"
    assert len(read) < 40 * 4
