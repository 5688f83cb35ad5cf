"""The keyboard alone builds the first sample from a new project, on the real window, by real key events."""

from __future__ import annotations

from msgspec import UNSET
from msgspec.structs import replace
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication

from app import samples
from app.gui.tables.view import TableView
from app.gui.title_block import TitleBlockDialog
from app.title_fields import TITLE_FIELDS
from tests.gui.windows import dialog_of, solved

KEY = Qt.Key
CTRL = Qt.KeyboardModifier.ControlModifier
SHIFT = Qt.KeyboardModifier.ShiftModifier
NONE = Qt.KeyboardModifier.NoModifier
SIZES = (
    *("d40", "d45", "d55", "d55->80", "d80", "d96", "d80"),
    *("d80 bore 45", "d80 bore 45->60 bore 25", "d60", "d60->45", "d45"),
)
LENGTHS = (50, 85, 110, 50, 130, 380, 130, 290, 80, 150, 50, 95)
HEAT = ("8", "8->12", "12->20", "20->24", "24->34", "34->38")
COOL = ("38->30", "30->18", "18->16", "16->12", "12->11", "11->8")


class Keyboard:
    """Presses keys on whatever has the keyboard; knows no other way to change anything."""

    def press(self, key, modifier=NONE, times: int = 1) -> None:
        for _ in range(times):
            QTest.keyClick(self.holder, key, modifier)
            if modifier != NONE:
                QTest.keyClick(self.holder, KEY.Key_Control)  # QTest leaves modifiers down

    @property
    def holder(self):
        widget = QApplication.focusWidget()
        assert widget is not None, "nothing has the keyboard"
        return widget

    @property
    def table(self) -> TableView:
        assert isinstance(self.holder, TableView), f"the keyboard is in {self.holder}"
        return self.holder

    def type(self, text: str) -> None:
        for letter in text:
            QTest.keyClicks(self.holder, letter)

    def enter(self, *texts: object) -> None:
        """Each text into a cell and Enter, which goes one down."""
        for text in texts:
            self.type(str(text))
            self.press(KEY.Key_Return)

    def along(self, *texts: object) -> None:
        """Each text into a cell and Tab, which goes one on; an empty one leaves its cell."""
        for text in texts:
            self.type(str(text))
            self.press(KEY.Key_Tab)

    def to(self, column: str, row: int = 0) -> None:
        """To a cell of the table that has the keyboard."""
        table = self.table
        self.press(KEY.Key_Home, CTRL)
        self.press(KEY.Key_Down, times=row)
        keys = [table.table_model.columns[place].key for place in table.shown_columns()]
        self.press(KEY.Key_Right, times=keys.index(column) - table.currentIndex().column())
        current = table.currentIndex()
        assert (current.row(), table.table_model.columns[current.column()].key) == (row, column)


def choose(keys: Keyboard, text: str) -> None:
    """Go through the list of a picker; typing its first letters would hang on the clock."""
    keys.press(KEY.Key_Home)
    while keys.holder.currentText() != text:
        keys.press(KEY.Key_Down)


def units(keys: Keyboard) -> None:
    keys.press(KEY.Key_F6)  # from the tables to the pickers
    keys.press(KEY.Key_Tab)
    assert keys.holder.accessibleName() == "Units"
    choose(keys, "mm · kN · MPa")


def materials(keys: Keyboard) -> None:
    keys.press(KEY.Key_5, CTRL)
    keys.to("name")
    keys.along("C45", "", "", "", 160, 140)


def segments(keys: Keyboard) -> None:
    keys.press(KEY.Key_1, CTRL)
    keys.to("length", 1)
    keys.enter(*LENGTHS)
    keys.to("section", 1)
    keys.enter(*SIZES)
    keys.to("support", 0)
    keys.enter("free", "spring 600 kN/mm")
    keys.to("support", 12)
    keys.enter("spring 450 kN/mm")


def edit_loads_of(keys: Keyboard, name: str) -> None:
    keys.press(KEY.Key_L, CTRL)
    choose(keys, name)
    keys.press(KEY.Key_Return)


def loads(keys: Keyboard) -> None:
    keys.press(KEY.Key_3, CTRL)
    keys.to("name")
    keys.enter("Hoisting", "Warm", "Brake snatch", "Weight")
    keys.to("gravity", 3)
    keys.enter("0.8144")
    keys.press(KEY.Key_1, CTRL)
    for case, start, end in (("Hoisting", -560, -400), ("Brake snatch", 300, 420)):
        edit_loads_of(keys, case)
        keys.to("load_start", 6)
        keys.along(start, end)
    edit_loads_of(keys, "Warm")
    keys.to("heat", 1)
    keys.enter(*HEAT, *COOL)
    keys.press(KEY.Key_2, CTRL)
    keys.to("movement", 12)
    keys.enter("0.08")
    edit_loads_of(keys, "Hoisting")
    keys.to("force")
    keys.enter(-6)


def combinations(keys: Keyboard) -> None:
    keys.press(KEY.Key_4, CTRL)
    keys.to("name")
    keys.enter("Cold start", "Warm running", "Warm, brake snatch")
    keys.to("factor of Warm")
    keys.press(KEY.Key_Delete)
    keys.to("factor of Brake snatch")
    keys.press(KEY.Key_Down, SHIFT)
    keys.press(KEY.Key_Delete)
    keys.to("factor of Hoisting", 2)
    keys.along("-0.35", "", "1.2", "", "1.15")


def limits(keys: Keyboard) -> None:
    keys.press(KEY.Key_6, CTRL)
    keys.to("joint")
    keys.enter(6)
    keys.to("limit")
    keys.along("0.6")
    keys.press(KEY.Key_Tab)  # out of the row that adds, and of the table
    keys.to("start")
    keys.enter("5 -> 6")
    keys.to("limit")
    keys.enter("0.3")
    keys.press(KEY.Key_6, CTRL)  # once more: the next table of the tab
    keys.to("joint")
    keys.enter(1, 12)
    keys.to("limit")
    keys.enter(240, 220)
    keys.press(KEY.Key_6, CTRL)
    keys.to("stability_factor")
    keys.enter(3)
    keys.press(KEY.Key_2, CTRL)
    for joint in (1, 12):
        keys.to("lateral_translation", joint)
        keys.enter("fixed")


def title_block(keys: Keyboard, qtbot, window, sample) -> None:
    keys.press(KEY.Key_T, CTRL)
    dialog = dialog_of(window, TitleBlockDialog)
    qtbot.waitUntil(lambda: dialog.isAncestorOf(QApplication.focusWidget()))
    texts = (getattr(sample.sheet, key) for key, _words in TITLE_FIELDS)
    keys.along(sample.title, *texts, sample.notes)
    keys.press(KEY.Key_Return)
    assert not dialog.isVisible()


def test_the_keyboard_alone_builds_the_first_sample(qtbot, window):
    keys, sample = Keyboard(), samples.read_sample(samples.FIRST)
    keys.press(KEY.Key_N, CTRL)
    for chapter in (units, materials, segments, loads, combinations, limits):
        chapter(keys)
    title_block(keys, qtbot, window, sample)
    built = window.document.project
    assert window.document.snapshot.drafts == {}
    solved(qtbot, window)
    # The sample says that it lies across, which a new project does not have to say: it is so unless said.
    assert built.display.layout == sample.display.layout
    wanted = replace(sample, display=replace(sample.display, orientation=UNSET))
    for part in built.__struct_fields__:
        assert getattr(built, part) == getattr(wanted, part), part
    assert window.showing.outcome.findings.headline.startswith("Passes")
