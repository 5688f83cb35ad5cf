"""The menu on the drawing: what can be typed, put on, taken off and done at a part of it, or on the paper.

By the right mouse button, the menu key or Shift+F10. It walks the table of kinds and the window's commands,
and holds nothing that cannot be reached without it.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from functools import partial
from typing import Final

from PySide6.QtCore import QEvent, QObject, QPoint, QPointF, Qt
from PySide6.QtGui import QAction, QContextMenuEvent, QKeyEvent
from PySide6.QtWidgets import QMenu

from app import edits
from app.beside import beside_at
from app.drawing.shapes import OF_COMPANION, OF_JOINT, OF_SEGMENT, Part
from app.gui.document import Document
from app.gui.hand.in_place import InPlace
from app.gui.hand.placing import Placing
from app.gui.hand.selecting import Selecting
from app.gui.hand.shaping import Shaping
from app.gui.hand.symbol_icon import symbol_icon
from app.gui.hand.taking_off import TakingOff
from app.gui.sheet_view import SheetView
from app.gui.tables.pane import TablesPane
from app.gui.theme import theme_for
from app.gui.view import Selection, View
from app.hand.cells import ORDER, Cell
from app.hand.companions import companions_of
from app.hand.kinds import KINDS, Kind
from app.hand.putting import has
from app.words import tr
from solver.model import Project

ICON = 20
# Commands of the window, by what the menu is opened on; an empty key is a line between
ON_SEGMENT: Final = (
    "insert_before", "insert_after", "split", "join", "repeat", "", "delete_segments",
)  # fmt: skip
ON_PAPER: Final = ("undo", "redo", "", "select_all", "join_equal", "mirror", "reverse")


class SheetMenu(QObject):
    """Makes the menu for a place of the sheet and opens it there."""

    def __init__(
        self,
        document: Document,
        view: View,
        sheet: SheetView,
        tables: TablesPane,
        in_place: InPlace,
        placing: Placing,
        taking_off: TakingOff,
        shaping: Shaping,
        selecting: Selecting,
        actions: Mapping[str, QAction],
        parent: QObject,
    ) -> None:
        super().__init__(parent)
        self._document = document
        self._view = view
        self._sheet = sheet
        self._tables = tables
        self._in_place = in_place
        self._placing = placing
        self._taking_off = taking_off
        self._shaping = shaping
        self._selecting = selecting
        self._actions = actions
        self.menu: QMenu | None = None
        sheet.installEventFilter(self)
        sheet.viewport().installEventFilter(self)

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        """The right button and the keys that open menus."""
        if isinstance(event, QContextMenuEvent):
            return self._on_asked(watched, event)
        if watched is self._sheet and isinstance(event, QKeyEvent) and event.type() == QEvent.Type.KeyPress:
            shifted = event.modifiers() & Qt.KeyboardModifier.ShiftModifier
            if event.key() == Qt.Key.Key_Menu or (event.key() == Qt.Key.Key_F10 and shifted):
                self._open_by_key()
                return True
        return super().eventFilter(watched, event)

    def _on_asked(self, watched: QObject, event: QContextMenuEvent) -> bool:
        """By mouse on the drawing only: the strips have menus of their own. Not while a number is pulled."""
        if self._document.preview is not None and self._document.preview.moving:
            return True
        if event.reason() != QContextMenuEvent.Reason.Mouse:
            self._open_by_key()
            return True
        point = QPointF(event.pos())
        if watched is not self._sheet.viewport() or not self._sheet.places.drawing.contains(point):
            return False
        self._open_at(point)
        return True

    def _open_at(self, point: QPointF) -> None:
        """For what is under the pointer; on the paper beside the member, for the whole."""
        found = self._sheet.drawing.label_at(point)
        x = self._sheet.ruler.position_at(self._sheet.places.axes.along(point))
        self._open(None if found is None else found.part, x, point.toPoint())

    def _open_by_key(self) -> None:
        """For the selected part, or for the whole where none is."""
        chosen = self._view.selection
        parts = [Part("segment", i) for i in sorted(chosen.segments)]
        parts += [Part("joint", i) for i in sorted(chosen.joints)]
        parts += [Part("companion", i) for i in sorted(chosen.companions)]
        box = self._sheet.box_of(parts[0] if parts else Part("note", 0))
        x = self._view.cursor.x if self._view.cursor else 0.0
        self._open(parts[0] if parts else None, x, QPoint(*map(round, box.centre)))

    def _open(self, part: Part | None, x: float, point: QPoint) -> None:
        self._tables.commit_open_editor()
        self._placing.take(None)
        if part is not None and part.kind in OF_SEGMENT | OF_JOINT | OF_COMPANION:
            self._select(part)
        if self.menu is not None:
            self.menu.deleteLater()
        self.menu = menu = QMenu(self._sheet)
        self._fill(menu, part, x)
        menu.popup(self._sheet.viewport().mapToGlobal(point))

    def _select(self, part: Part) -> None:
        """A part that is not among the selected ones becomes the selected one."""
        chosen, one = self._view.selection, frozenset((part.index,))
        if part.kind in OF_SEGMENT and part.index not in chosen.segments:
            self._view.set_selection(Selection(segments=one))
        elif part.kind in OF_JOINT and part.index not in chosen.joints:
            self._view.set_selection(Selection(joints=one))
        elif part.kind in OF_COMPANION and part.index not in chosen.companions:
            self._view.set_selection(Selection(companions=one))

    # What is in it

    def _fill(self, menu: QMenu, part: Part | None, x: float) -> None:
        if part is not None and part.kind in OF_COMPANION:
            self._fill_for_companion(menu, part.index)
            return
        if part is None or part.kind not in OF_SEGMENT | OF_JOINT:
            self._add_type_label(menu, part)
            self._add_kinds(menu, ("member",), ())
            self._add_commands(menu, ON_PAPER)
            self._add(menu, tr("Show the whole member"), self._sheet.fit)
            return
        on_segment = part.kind in OF_SEGMENT
        chosen = self._view.selection
        indexes = tuple(sorted(chosen.segments if on_segment else chosen.joints))
        self._add_cells(menu, "segments" if on_segment else "joints", part.index, indexes)
        self._add_kinds(menu, ("segment",) if on_segment else ("joint",), indexes)
        if on_segment:
            menu.addSeparator()
            self._add(menu, tr("Insert joint here"), lambda: self._shaping.split_at(x))
            self._add_commands(menu, ON_SEGMENT)

    def _fill_for_companion(self, menu: QMenu, index: int) -> None:
        """Its cells, one more segment, what makes it fit, and what takes it off."""
        pieces = tuple(sorted(self._view.selection.companions)) or (index,)
        self._add_cells(menu, "companions", index, pieces)
        menu.addSeparator()
        at = beside_at(self._document.project, index).at
        self._add(
            menu,
            tr("Add companion segment"),
            lambda: self._change(tr("Add companion segment"), lambda p: edits.extend_companion(p, at)),
        )
        self._add_commands(menu, ("fit_companions",))
        menu.addSeparator()
        self._add(menu, tr("Delete companion segments"), self._taking_off.delete)
        whole = companions_of(self._document.project, pieces)
        self._add(
            menu,
            tr("Take the companion off"),
            lambda: self._change(tr("Take the companion off"), lambda p: edits.remove_companions(p, whole)),
        )

    def _change(self, name: str, edit: Callable[[Project], Project]) -> None:
        self._document.commit(edit(self._document.project), name)

    def _add(self, menu: QMenu, words: str, do: Callable[[], object]) -> QAction:
        action = menu.addAction(words)
        action.triggered.connect(lambda _on=False: do())
        return action

    def _add_type_label(self, menu: QMenu, part: Part | None) -> None:
        """A label of the whole member, such as that of its self-weight."""
        if part is not None and part.kind == "gravity":
            box = self._sheet.box_of(part)
            self._add(menu, tr("Type in place"), lambda: self._in_place.open_part(part, box))

    def _add_cells(self, menu: QMenu, table: str, record: int, records: tuple[int, ...]) -> None:
        """The cells of the segment or joint, to be typed in place for all that is selected."""
        cells = menu.addMenu(tr("Type in place"))
        model = self._tables.models[table]
        titles = {column.key: column.words for column in model.columns}
        for key in ORDER[table]:
            cell = Cell(table, record, key)
            if key in titles:
                self._add(cells, titles[key], partial(self._in_place.open_cell, cell, records))

    def _add_kinds(self, menu: QMenu, on: tuple[str, ...], indexes: tuple[int, ...]) -> None:
        """What can be put on, and what of it is there to be taken off."""
        project, case = self._document.project, self._tables.sight.case
        kinds = [kind for kind in KINDS if kind.on in on]
        put = menu.addMenu(tr("Put on"))
        for kind in kinds:
            self._add_kind(put, kind, lambda kind=kind: self._placing.put(kind, indexes))
        there = [kind for kind in kinds if any(has(kind, project, i, case) for i in indexes or (0,))]
        off = menu.addMenu(tr("Take off"))
        off.setEnabled(bool(there))
        for kind in there:
            self._add_kind(off, kind, lambda kind=kind: self._taking_off.take_off(kind, indexes))

    def _add_kind(self, menu: QMenu, kind: Kind, do: Callable[[], object]) -> None:
        action = self._add(menu, tr(kind.name), do)
        action.setIcon(symbol_icon(kind.symbol, theme_for(self._sheet.palette()), ICON))

    def _add_commands(self, menu: QMenu, keys: tuple[str, ...]) -> None:
        """Commands of the window; one that it has not is left out."""
        for key in keys:
            if not key:
                menu.addSeparator()
            elif key == "select_all":
                self._add(menu, tr("Select all"), self._selecting.select_all)
            elif key in self._actions:
                menu.addAction(self._actions[key])
