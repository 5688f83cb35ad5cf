"""The symbol in the hand: where it would go, and putting it there.

A symbol that is clicked stays in the hand, whatever is selected: the sheet lights where a click would put it,
and Escape puts it down. Its letter puts it on all that is selected at once, where something fitting is. What
was put on is typed in place at once.
"""

from __future__ import annotations

from PySide6.QtCore import QEvent, QObject, QPointF, Qt, Signal
from PySide6.QtGui import QKeyEvent, QMouseEvent

from app.drawing.shapes import Part
from app.edits import EditError
from app.gui.document import Document
from app.gui.hand.in_place import InPlace
from app.gui.hand.taking_off import TakingOff
from app.gui.sheet_view import SheetView
from app.gui.tables.pane import TablesPane
from app.gui.tables.reasons import reason_of
from app.gui.view import Shown, View
from app.hand.cells import case_share, part_of
from app.hand.kinds import KINDS, Kind
from app.hand.putting import NotPut, Put, put_on
from app.words import later, tr

LETTERS = {kind.letter: kind for kind in KINDS}
FREE = next(kind for kind in KINDS if kind.key == "free")
HINTS = {
    "joint": later("{name}: click a joint, Escape puts it down"),
    "segment": later("{name}: click a segment, Escape puts it down"),
}


class Placing(QObject):
    """Holds the symbol in the hand; hears the sheet's mouse and keys while there is one."""

    told = Signal(str)
    kind_changed = Signal(object)  # Kind or None

    def __init__(
        self,
        document: Document,
        view: View,
        sheet: SheetView,
        tables: TablesPane,
        in_place: InPlace,
        taking_off: TakingOff,
        parent: QObject,
    ) -> None:
        super().__init__(parent)
        self._document = document
        self._view = view
        self._sheet = sheet
        self._tables = tables
        self._in_place = in_place
        self._taking_off = taking_off
        self._kind: Kind | None = None
        sheet.installEventFilter(self)
        sheet.viewport().installEventFilter(self)

    @property
    def kind(self) -> Kind | None:
        """What is in the hand."""
        return self._kind

    def choose(self, kind: Kind) -> None:
        """Take it into the hand, or put it down again; what goes on the whole member is put there."""
        self._tables.commit_open_editor()
        if kind.on == "member":
            self.put(kind, ())
        else:
            self.take(None if kind is self._kind else kind)

    def _on_letter(self, kind: Kind) -> None:
        """Put it on what is selected; where nothing that fits is, as if its symbol were clicked."""
        chosen = self._selected(kind)
        if chosen and kind is not self._kind:
            self.put(kind, chosen)
        else:
            self.choose(kind)

    def _selected(self, kind: Kind) -> tuple[int, ...]:
        chosen = self._view.selection
        project = self._document.project
        there = len(project.joints) if kind.on == "joint" else len(project.segments)
        among = chosen.joints if kind.on == "joint" else chosen.segments
        return tuple(index for index in sorted(among) if index < there)

    def take(self, kind: Kind | None) -> None:
        """Another symbol in the hand, or none."""
        self._kind = kind
        self.kind_changed.emit(kind)
        self._light(None)
        if kind is None:
            self._sheet.viewport().unsetCursor()
            self.told.emit("")
        else:
            self._listen_first()
            self._sheet.viewport().setCursor(Qt.CursorShape.CrossCursor)
            self._sheet.setFocus(Qt.FocusReason.OtherFocusReason)
            self.told.emit(tr(HINTS[kind.on]).format(name=tr(kind.name)))

    def put_down(self) -> None:
        """Nothing in the hand any more, as for another project."""
        if self._kind is not None:
            self.take(None)

    def _listen_first(self) -> None:
        """Hear the mouse before whoever pulls and selects: the symbol in the hand comes first."""
        viewport = self._sheet.viewport()
        viewport.removeEventFilter(self)
        viewport.installEventFilter(self)

    # Putting on

    def put(self, kind: Kind, indexes: tuple[int, ...]) -> None:
        """Put one on each, as one undo step, and type its value at once."""
        self._tables.commit_open_editor()
        self.take(None)
        try:
            done = put_on(kind, self._document.project, indexes, self._tables.sight.case)
        except (EditError, NotPut) as error:
            self._refuse(error)
            return
        put = tr("Put on: {what}").format(what=tr(kind.name))
        self._document.commit(done.project, tr("Take the support off") if kind is FREE else put)
        self._tell(kind, done)
        self._type(kind, done)

    def _refuse(self, error: Exception) -> None:
        self.told.emit(reason_of(error, self._document.project.display.unit_system))

    def _tell(self, kind: Kind, done: Put) -> None:
        """The news; a load that what is shown would hide is shown by its own case."""
        lines = [done.note] if done.note else []
        if kind.of_case and done.case is not None:
            name = done.project.load_cases[done.case].name
            if case_share(done.project, self._view.shown, done.case) == 0.0:
                self._view.set_shown(Shown("case", name))
                lines.append(tr("shown is now load case {name}").format(name=name))
        if lines:
            self.told.emit("; ".join(lines))

    def _type(self, kind: Kind, done: Put) -> None:
        """The value of what was put on, selected in the editor on the drawing."""
        if not (kind.typed_next and done.cells):
            self._sheet.setFocus(Qt.FocusReason.OtherFocusReason)
            return
        part = part_of(done.cells[0], done.project, done.case) or Part(kind.part, 0)
        records = tuple(cell.record for cell in done.cells)
        self._in_place.open(done.cells[0], self._sheet.box_of(part), None, records)

    # Mouse and keys

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        """The mouse on the sheet while a symbol is in the hand; letters and Escape on the sheet."""
        if watched is self._sheet and event.type() == QEvent.Type.KeyPress and isinstance(event, QKeyEvent):
            return self._on_key(event)
        if self._kind is not None and isinstance(event, QMouseEvent):
            return self._on_mouse(event)
        return super().eventFilter(watched, event)

    def _on_key(self, event: QKeyEvent) -> bool:
        if event.key() == Qt.Key.Key_Escape and self._kind is not None:
            self.take(None)
            return True
        if event.key() in (Qt.Key.Key_Delete, Qt.Key.Key_Backspace) and not event.modifiers():
            self._taking_off.delete()
            return True
        kind = LETTERS.get(event.text().upper()) if event.text() else None
        held = Qt.KeyboardModifier.ControlModifier | Qt.KeyboardModifier.AltModifier
        if kind is None or event.modifiers() & held:
            return False
        self._on_letter(kind)
        return True

    def _on_mouse(self, event: QMouseEvent) -> bool:
        """A click puts it on; a move lights where that would be and lets the cursor follow."""
        where = self._target(event.position())
        if event.type() == QEvent.Type.MouseMove:
            self._light(where)
            return event.buttons() != Qt.MouseButton.NoButton
        if event.button() != Qt.MouseButton.LeftButton:
            return False
        if event.type() == QEvent.Type.MouseButtonRelease and where is not None and self._kind is not None:
            self.put(self._kind, (where.index,))
        return True

    def _light(self, where: Part | None) -> None:
        self._sheet.drawing.set_lit(where)

    def _target(self, point: QPointF) -> Part | None:
        """The joint or segment that a click at the point would put the symbol on."""
        kind, sheet = self._kind, self._sheet
        if kind is None or not sheet.places.drawing.contains(point):
            return None
        pixel = sheet.places.axes.along(point)
        if kind.on == "joint":
            return Part("joint", sheet.joint_near(pixel))
        return Part("segment", sheet.segment_at(sheet.ruler.position_at(pixel)))
