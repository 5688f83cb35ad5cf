"""The walker's two hands: real mouse and key events, placed by what the drawing itself says is there."""

from __future__ import annotations

from collections.abc import Sequence

from PySide6.QtCore import QDeadlineTimer, QEvent, QEventLoop, QPoint, QPointF, Qt
from PySide6.QtGui import QAction, QContextMenuEvent, QWheelEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QComboBox, QMenu, QWidget

from app.catalogue import read_catalogue
from app.drawing.shapes import Part
from app.gui.window import Window
from app.words import SOURCE, catalogue_path, language, tr
from tests.gui.hand import cell
from tests.gui.pointer import CTRL, LEFT, PLAIN, SHIFT, Pointer
from tests.walk.steps import LONGEST_WAIT

KEY = Qt.Key


class Hands:
    """Works on the window as a person does; every method is one thing that a person does."""

    def __init__(self, window: Window) -> None:
        self.window = window
        self.sheet = window.sheet
        self.pointer = Pointer(window)

    def activate(self) -> None:
        """Bring the window in front; where there is no desktop, nobody else does after a dialog."""
        self.window.activateWindow()
        while not self.window.isActiveWindow():
            QApplication.processEvents(QEventLoop.ProcessEventsFlag.WaitForMoreEvents)

    # Keys

    @property
    def holder(self) -> QWidget:
        """What has the keyboard."""
        if QApplication.focusWidget() is None:
            QApplication.processEvents()  # a menu that closes gives the keyboard back
        holder = QApplication.focusWidget()
        assert holder is not None, "nothing has the keyboard"
        return holder

    def press(self, key: Qt.Key, modifiers: Qt.KeyboardModifier = PLAIN, times: int = 1) -> None:
        """Press a key and let it and its modifiers go."""
        for _ in range(times):
            QTest.keyClick(self.holder, key, modifiers)
            if modifiers & SHIFT:
                QTest.keyClick(self.holder, KEY.Key_Shift)  # QTest leaves modifiers down
            if modifiers & CTRL:
                QTest.keyClick(self.holder, KEY.Key_Control)

    def press_sheet(self, key: Qt.Key) -> None:
        """Press a key while the mouse holds something on the sheet."""
        QTest.keyClick(self.sheet, key)

    def type(self, text: str) -> None:
        """Type a text."""
        for letter in text:
            QTest.keyClicks(self.holder, letter)

    def type_over(self, text: str) -> None:
        """Type over what is selected, and Enter."""
        self.type(text)
        self.press(KEY.Key_Return)

    # Mouse on the drawing

    def look(self) -> None:
        """Wait until the drawing shows the member as it is now."""
        deadline = QDeadlineTimer(LONGEST_WAIT)
        document, drawing = self.window.document, self.sheet.drawing
        while drawing.member is None or drawing.member.project is not document.shown_project:
            assert not deadline.hasExpired(), "the drawing does not follow"
            QApplication.processEvents(QEventLoop.ProcessEventsFlag.WaitForMoreEvents)

    def box_at(self, part: Part) -> QPoint:
        """The middle of what the drawing shows of a part."""
        self.look()
        box = self.sheet.drawing.picture.box_of(part)
        assert box is not None, f"the drawing shows no {part}"
        return QPoint(*map(round, box.centre))

    def on_axis(self, x: float, beside: int = 0) -> QPoint:
        """The point on the member's axis at a position (m), or so many pixels beside it."""
        self.look()
        places = self.sheet.places
        sketch = self.sheet.drawing.sketch
        assert sketch is not None
        across = sketch.point(0.0, sketch.rows.axis)
        middle = across[0] if places.axes.upright else across[1]
        return places.axes.point(self.sheet.ruler.pixel(x), middle + beside).toPoint()

    def middle(self, segment: int, share: float = 0.5, beside: int = 4) -> QPoint:
        """A point on a segment."""
        self.look()
        start, end = self.sheet.positions[segment : segment + 2]
        return self.on_axis(start + share * (end - start), beside)

    def joint(self, joint: int) -> QPoint:
        """A joint, beside the middle where marks and arrows are."""
        self.look()
        return self.on_axis(self.sheet.positions[joint], 8)

    def section_label(self, segment: int) -> QPoint:
        """The label with a segment's section, which may stand at a neighbour alike."""
        self.look()
        for text in self.sheet.drawing.picture.texts:
            if text.part == Part("section", segment):
                return QPoint(*map(round, text.box.centre))
        raise AssertionError(f"no label shows the section of segment {segment}")

    def on_paper(self) -> QPoint:
        """A point of the drawing with nothing on it."""
        self.look()
        room = self.sheet.places.drawing
        along, across = range(1, 20), (0.02, 0.98, 0.05, 0.95)
        points = (
            QPointF(room.left() + a / 20 * room.width(), room.top() + b * room.height())
            for b in across
            for a in along
        )
        return next(p for p in points if self.sheet.drawing.part_at(p) is None).toPoint()

    def click(self, at: QPoint, modifiers: Qt.KeyboardModifier = PLAIN) -> None:
        """Click on the sheet."""
        self.hover(at)
        QTest.mouseClick(self.sheet.viewport(), LEFT, modifiers, at)

    def hover(self, at: QPoint) -> None:
        """Go there."""
        self.pointer.at = QPointF(at)
        self.pointer.send(QEvent.Type.MouseMove)

    def double_click(self, at: QPoint) -> None:
        """Double click on the sheet."""
        self.click(at)
        QTest.mouseDClick(self.sheet.viewport(), LEFT, PLAIN, at)

    def retype(self, part: Part, text: str) -> None:
        """Double click a label, type over it, Enter."""
        self.double_click(self.box_at(part))
        assert self.window.in_place.editor is not None, f"{part}: {self.window.status.news.text()}"
        self.type_over(text)

    def reshape(self, segment: int, section: str) -> None:
        """Double click a segment's body, beside its mark, and type its section."""
        self.double_click(self.middle(segment, 0.25, beside=22))
        assert self.window.in_place.caption.startswith(tr("Section"))
        self.type_over(section)

    def turn_wheel(self, at: QPoint, notches: int, modifiers: Qt.KeyboardModifier = PLAIN) -> None:
        """Turn the wheel over a point of the sheet."""
        viewport = self.sheet.viewport()
        self.hover(at)
        event = QWheelEvent(
            QPointF(at),
            QPointF(viewport.mapToGlobal(at)),
            QPoint(),
            QPoint(0, 120 * notches),
            Qt.MouseButton.NoButton,
            modifiers,
            Qt.ScrollPhase.NoScrollPhase,
            False,
        )
        QApplication.sendEvent(viewport, event)

    # Dragging

    def take(self, kind: str, index: int, where: str, pixels: float, modifiers=PLAIN) -> None:
        """Take a handle and pull it outward; it stays in hand."""
        self.look()
        self.pointer.grab(kind, index, where, modifiers)
        self.pointer.pull(pixels, modifiers)

    def exact(self, text: str) -> None:
        """Type the exact value of what is in hand, let go, and Enter."""
        QTest.keyClicks(self.sheet, text[0])
        QTest.keyClicks(self.window.hand.entry, text[1:])
        self.pointer.let_go()
        QTest.keyClick(self.window.hand.entry, KEY.Key_Return)

    def drag_to(self, kind: str, index: int, where: str, pixels: float, text: str) -> None:
        """Pull a handle, and type its exact value meanwhile."""
        self.take(kind, index, where, pixels)
        self.exact(text)

    # Menus, symbols, pickers

    def symbol(self, key: str) -> None:
        """Click a symbol of the strip."""
        QTest.mouseClick(self.window.symbols.buttons[key], LEFT)

    def open_menu(self, at: QPoint) -> QMenu:
        """The right mouse button on the sheet."""
        viewport = self.sheet.viewport()
        self.hover(at)
        event = QContextMenuEvent(QContextMenuEvent.Reason.Mouse, at, viewport.mapToGlobal(at))
        QApplication.sendEvent(viewport, event)
        menu = self.window.sheet_menu.menu
        assert menu is not None
        return menu

    def choose(self, menu: QMenu, *words: str) -> None:
        """Click through a menu and its submenus."""
        for word in words:
            action = _named(menu.actions(), word)
            place = menu.actionGeometry(action).center()
            QTest.mouseMove(menu, place)
            QTest.mouseClick(menu, LEFT, PLAIN, place)
            menu = action.menu() or menu

    def command(self, *words: str) -> None:
        """Click through the menus of the window."""
        bar = self.window.menuBar()
        action = _named(bar.actions(), words[0])
        QTest.mouseClick(bar, LEFT, PLAIN, bar.actionGeometry(action).center())
        self.choose(action.menu(), *words[1:])

    def pick(self, picker: QComboBox, text: str) -> None:
        """Go through a picker's list by keys, and take an entry."""
        text = said(text)
        picker.setFocus(Qt.FocusReason.MouseFocusReason)
        self.press(KEY.Key_Home)
        while picker.currentText() != text:
            before = picker.currentIndex()
            self.press(KEY.Key_Down)
            assert picker.currentIndex() != before, f"{text} is not offered"

    # Tables

    def cell(self, table: str, row: int, column: str) -> None:
        """Click a cell of the table in front."""
        view = self.window.tables.views[table]
        index = cell(view, row, column)
        view.scrollTo(index)
        QTest.mouseClick(view.viewport(), LEFT, PLAIN, view.visualRect(index).center())

    def enter(self, table: str, row: int, column: str, *texts: str) -> None:
        """Click a cell and type down from there, each with Enter."""
        self.cell(table, row, column)
        for text in texts:
            self.type_over(text)

    def tab(self, number: int) -> None:
        """The tables of a tab, by its key."""
        self.press(Qt.Key(KEY.Key_0 + number), CTRL)

    def edit_loads_of(self, name: str) -> None:
        """Choose the case whose loads are edited."""
        self.pick(self.window.tables.case_picker, name)
        self.press(KEY.Key_Return)


def said(word: str) -> str:
    """What a menu or a picker says for an English word, in the language of the window, without its key."""
    if language() == SOURCE:
        return word
    messages = read_catalogue(catalogue_path(language())).messages
    found = (texts[0] for (_context, message), texts in messages.items() if _plain(message) == word)
    return _plain(next(found, word))


def _plain(text: str) -> str:
    return text.replace("&", "").rstrip("…")


def _named(actions: Sequence[QAction], word: str) -> QAction:
    return next(action for action in actions if _plain(action.text()) == said(word))
