"""Bonded parts in the real window: the column, names offered, the symbol, the label, the cursor."""

from __future__ import annotations

import pytest
from msgspec.structs import replace
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest

from app.drawing.shapes import Part
from app.gui.strips.readout import envelope_readout, state_readout
from app.gui.tables.materials import MATERIALS
from app.gui.tables.reasons import NotTaken
from app.gui.view import Selection
from solver.model import AreaSection, BondedPart, RoundSection
from tests.app.test_edits_bonded import two_segments
from tests.gui.hand import begin, cell, editor, enter, go_to
from tests.gui.test_in_place import LEFT, centre_of, double_click, replace_text
from tests.gui.windows import solved

KEY = Qt.Key


@pytest.fixture
def table(window):
    """The table of segments with the column of bonded parts chosen."""
    view = window.tables.views["segments"]
    view.columns_choice.turn("bonded")
    return view


def bonded(window, index=0):
    return window.document.project.segments[index].bonded


def first_material(window):
    return window.document.project.materials[0].name


def column(view):
    return next(i for i, c in enumerate(view.table_model.columns) if c.key == "bonded")


def test_the_column_is_hidden_until_chosen_or_filled(window):
    view = window.tables.views["segments"]
    assert view.isColumnHidden(column(view))
    part = BondedPart(first_material(window), RoundSection(diameter=0.02))
    own = window.document.project.segments[0]
    filled = (replace(own, bonded=(part,)), *window.document.project.segments[1:])
    window.document.commit(replace(window.document.project, segments=filled), "Bond")
    assert not view.isColumnHidden(column(view))
    window.on_undo()
    assert view.isColumnHidden(column(view))


def test_parts_are_typed_and_an_emptied_cell_has_none(window, table):
    name = first_material(window)
    enter(table, 1, "bonded", f"{name} A 1200; brass d20")
    assert [part.material for part in bonded(window)] == [name, "Brass"]
    assert bonded(window)[0].section == AreaSection(area=1.2e-3)
    assert window.document.project.materials[-1].name == "Brass"
    go_to(table, 1, "bonded")
    QTest.keyClick(table, KEY.Key_Delete)
    assert bonded(window) == ()
    assert "bonded" not in str(window.document.project.segments[0]).split("bonded=()")[0]


def test_what_cannot_be_read_stays_with_its_reason(window, table):
    enter(table, 1, "bonded", "Stel d20")
    (draft,) = window.document.snapshot.drafts.values()
    assert "Stel" in draft.text
    assert "is no material" in draft.reason
    assert bonded(window) == ()


def test_names_are_offered_for_each_part(window, table):
    name = first_material(window)
    go_to(table, 1, "bonded")
    line = begin(table, f"{name} d20; Alu")
    assert [offer.name for offer in line.offer_list.offers] == ["Aluminium alloy"]
    QTest.keyClick(line, KEY.Key_Down)
    assert line.text() == f"{name} d20; Aluminium alloy "
    QTest.keyClicks(line, "A 500")
    QTest.keyClick(line, KEY.Key_Return)
    assert [part.material for part in bonded(window)] == [name, "Aluminium alloy"]


def test_the_letter_puts_a_part_on_and_its_value_is_typed_in_place(qtbot, window):
    window.view.set_selection(Selection(segments=frozenset((1,))))
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, KEY.Key_M)
    (part,) = bonded(window, 1)
    assert part.material != window.document.project.segments[1].material
    line = window.in_place.editor
    assert line is not None
    assert "Bonded parts" in window.in_place.caption
    replace_text(line, f"{first_material(window)} d20")
    QTest.keyClick(line, KEY.Key_Return)
    assert bonded(window, 1) == (BondedPart(first_material(window), RoundSection(diameter=0.02)),)
    solved(qtbot, window)
    text = next(t for t in window.sheet.drawing.picture.texts if t.part == Part("bonded", 1))
    assert text.text == f"bonded: {first_material(window)} ⌀20"


def test_its_label_opens_the_cell_and_delete_takes_it_off(qtbot, window):
    window.view.set_selection(Selection(segments=frozenset((1,))))
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, KEY.Key_M)
    QTest.keyClick(window.in_place.editor, KEY.Key_Return)
    solved(qtbot, window)
    line = double_click(window, Part("bonded", 1))
    assert line.text().endswith("A 1000")
    QTest.keyClick(line, KEY.Key_Escape)
    QTest.mouseClick(window.sheet.viewport(), LEFT, pos=centre_of(window, Part("bonded", 1)))
    assert window.view.thing == Part("bonded", 1)
    QTest.keyClick(window.sheet, KEY.Key_Delete)
    assert bonded(window, 1) == ()


def test_the_cursor_reads_the_stress_of_each_part(qtbot, window, table):
    name = first_material(window)
    enter(table, 1, "bonded", f"{name} A 1200; brass d20")
    solved(qtbot, window)
    results = window.showing.outcome.results
    own, mark = window.document.project.segments[0].material, window.document.project.segments[0].mark
    x = float(results.position[1]) / 2
    line = state_readout(results, 0, x)
    assert f"{mark}: {own} " in line
    assert "Brass " in line
    assert "Brass " in envelope_readout(results, x)
    assert "Brass" not in state_readout(results, 0, float(results.position[-1]))


def test_a_material_that_a_part_is_made_of_is_not_deleted(window):
    sight = window.tables.sight
    with pytest.raises(NotTaken, match="A has a bonded part of of B"):
        MATERIALS.delete(two_segments(), (1,), sight)
    assert len(MATERIALS.delete(two_segments(), (2,), sight).materials) == 2


def test_the_editor_is_closed_by_nothing_typed(window, table):
    go_to(table, 1, "bonded")
    before = window.document.project
    begin(table, "x")
    QTest.keyClick(editor(table), KEY.Key_Escape)
    assert window.document.project is before
    assert cell(table, 1, "bonded").data() == ""
