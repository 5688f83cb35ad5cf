"""Delete on the sheet: takes off the thing that was clicked, never what lies beneath it.

A click on a load or a support makes it the thing in hand: it is lit by itself and the status line says so.
Where no thing is in hand, Delete is for what is selected: segments, or the supports of joints.
"""

from __future__ import annotations

from collections.abc import Callable

from PySide6.QtCore import QObject, Signal

from app import edits
from app.beside import beside
from app.drawing.shapes import LOADS, Part
from app.edits import EditError
from app.gui.document import Document
from app.gui.sheet_view import SheetView
from app.gui.tables.pane import TablesPane
from app.gui.tables.reasons import reason_of
from app.gui.view import View
from app.hand.cells import case_share, neighbours_alike
from app.hand.freeing import gone_with_supports
from app.hand.kinds import Kind
from app.hand.owners import is_there, kind_of, whole, why_not_here
from app.hand.putting import take_off
from app.support_entry import support_text
from app.words import tr
from solver.model import Project, supports_of


class TakingOff(QObject):
    """Knows what Delete is for."""

    told = Signal(str)
    segments_asked = Signal()  # to delete the selected ones

    def __init__(
        self, document: Document, view: View, sheet: SheetView, tables: TablesPane, parent: QObject
    ) -> None:
        super().__init__(parent)
        self._document = document
        self._view = view
        self._tables = tables
        view.thing_changed.connect(self._on_thing)
        view.thing_changed.connect(sheet.drawing.set_thing)
        document.changed.connect(lambda _snapshot: self._on_changed())

    # The thing in hand

    def _on_thing(self, part: Part | None) -> None:
        kind = None if part is None else kind_of(part)
        if part is None or kind is None:
            self.told.emit("")
        elif part.kind == "support":
            self.told.emit(_support_in_hand(self._document.project, part))
        else:
            self.told.emit(
                tr("{what}: Delete takes it off").format(what=_named(self._document.project, part))
            )

    def _on_changed(self) -> None:
        """A thing that is gone is in no hand."""
        thing, project = self._view.thing, self._document.project
        cases = (None, *range(len(project.load_cases)))
        if thing is not None and not any(is_there(thing, project, case) for case in cases):
            self._view.set_thing(None)

    # Delete

    def delete(self) -> None:
        """Take off the thing in hand; else delete the selected segments, or take supports off the joints."""
        chosen, thing = self._view.selection, self._view.thing
        if thing is not None:
            self._take_off_thing(thing)
        elif chosen.companions:
            self._take_companions_off(tuple(sorted(chosen.companions)))
        elif chosen.segments:
            self.segments_asked.emit()
        elif chosen.joints:
            self._take_supports_off(tuple(sorted(chosen.joints)))
        else:
            self.told.emit(tr("click a load or a support to take it off, or select segments to delete"))

    def _take_off_thing(self, thing: Part) -> None:
        self._tables.commit_open_editor()
        project, case = self._document.project, self._tables.sight.case
        if thing.kind == "support":
            self._take_support_off(thing)
            return
        kind, refused = kind_of(thing), self._why_not(thing, project, case)
        if refused or kind is None:
            self.told.emit(refused)
            return
        self.take_off(kind, tuple(neighbours_alike(thing, project, case)))

    def _why_not(self, thing: Part, project: Project, case: int | None) -> str:
        """Why the edited case has nothing to take off there."""
        if is_there(thing, project, case):
            share = thing.kind not in LOADS or case_share(project, self._view.shown, case)
            return "" if share else _elsewhere(project, case)
        return why_not_here(thing, project, self._view.shown, case) or _elsewhere(project, case)

    def _take_support_off(self, thing: Part) -> None:
        """The one in hand, which is in no hand any more; others at its joint stay."""
        self._view.set_thing(None)
        self._do(
            tr("Take the support off"),
            lambda project: edits.without_support(project, thing.index, thing.number),
        )

    def _take_companions_off(self, pieces: tuple[int, ...]) -> None:
        """These segments of companions; a companion goes with its last."""
        found = beside(self._document.project)
        places = [(found[index].at, found[index].number) for index in pieces if index < len(found)]
        name = tr("Delete companion segments")
        self._do(name, lambda project: edits.remove_companion_segments(project, places))

    def _take_supports_off(self, joints: tuple[int, ...]) -> None:
        project = self._document.project
        held = [joint for joint in joints if is_there(Part("support", joint), project, None)]
        if not held:
            self.told.emit(
                tr("no support there; to take a load off, click it and press Delete (menu: Take off)")
            )
            return
        self._do(tr("Take the support off"), lambda project: edits.free_joints(project, held))

    def take_off(self, kind: Kind, indexes: tuple[int, ...]) -> None:
        """Take one off each, as one undo step."""
        self._tables.commit_open_editor()
        name = tr("Take off: {what}").format(what=tr(kind.name))
        self._do(name, lambda project: take_off(kind, project, indexes, self._tables.sight.case))

    def _do(self, name: str, edit: Callable[[Project], Project]) -> None:
        old = self._document.project
        try:
            project = edit(old)
        except EditError as error:
            self.told.emit(reason_of(error, old.display.unit_system))
        else:
            self._document.commit(project, name)
            if note := gone_with_supports(old, project):
                self.told.emit(note)


def _support_in_hand(project: Project, part: Part) -> str:
    """What Delete takes off: the support of a joint, or one of several by its words."""
    joint = project.joints[part.index]
    supports = supports_of(joint)
    if len(supports) < 2:
        return tr("Support of joint {mark}: Delete takes it off").format(mark=joint.mark)
    words = tr("{support} of joint {mark}: Delete takes it off, the other supports stay")
    return words.format(
        support=support_text(supports[part.number], project.display.unit_system), mark=joint.mark
    )


def _named(project: Project, part: Part) -> str:
    """A load by its kind and where it is."""
    kind = kind_of(part)
    if kind is None or kind.on == "member":
        return "" if kind is None else tr(kind.name)
    records = project.joints if kind.on == "joint" else project.segments
    return tr("{what}, {mark}").format(what=tr(kind.name), mark=records[whole(part).index].mark)


def _elsewhere(project: Project, case: int | None) -> str:
    if case is None:
        return tr("add a load case in the Loads table first")
    words = tr("{case} takes no part in what is shown: choose at “Edit loads of” or “Show” one that does")
    return words.format(case=project.load_cases[case].name)
