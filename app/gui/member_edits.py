"""The commands that change the member as a whole: insert, move, delete, split, join, reverse; rows of tables.

Each is one undo step on the records chosen in the tables; what cannot be done is said in the status line.
"""

from __future__ import annotations

from collections.abc import Callable

from PySide6.QtCore import QObject, Signal

from app import edits
from app.gui.document import Document
from app.gui.tables.pane import TablesPane
from app.gui.tables.reasons import TypingError, reason_of
from app.typical_materials import with_typical
from app.words import tr, trn
from solver.model import Material, Project, supports_of


class MemberEdits(QObject):
    """Commands on the chosen segments and rows."""

    told = Signal(str)
    inserted = Signal(int)  # a segment by its index, chosen by now

    def __init__(self, document: Document, tables: TablesPane, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self._tables = tables

    def _chosen(self) -> tuple[int, ...]:
        """The chosen segments, with what was being typed taken in; empty where none is."""
        self._tables.commit_open_editor()
        return self._tables.views["segments"].chosen_records()

    def _do(self, name: str, edit: Callable[[Project], Project]) -> None:
        try:
            project = edit(self._document.project)
        except TypingError as error:
            self.told.emit(reason_of(error, self._document.project.display.unit_system))
        else:
            self._document.commit(project, name)

    def _insert(self, index: int) -> None:
        self._do(tr("Insert segment"), lambda project: edits.insert_segment(project, index))
        self._choose(index)
        self.inserted.emit(index)

    def _choose(self, segment: int) -> None:
        self._tables.views["segments"].choose_record(segment)

    def insert_before(self) -> None:
        """A segment before the first chosen one."""
        self._insert(min(self._chosen(), default=0))

    def insert_after(self) -> None:
        """A segment behind the last chosen one; behind the start, or where none is chosen at the end."""
        chosen, start = self._chosen(), self._tables.views["segments"].lead_is_chosen
        last = -1 if start else len(self._document.project.segments) - 1
        self._insert(max(chosen, default=last) + 1)

    def move_up(self) -> None:
        """The chosen segments one place towards the start."""
        chosen = self._chosen()
        self.move_before(min(chosen, default=0) - 1)

    def move_down(self) -> None:
        """The chosen segments one place towards the end."""
        chosen = self._chosen()
        self.move_before(max(chosen, default=-1) + 2)

    def move_before(self, place: int) -> None:
        """The chosen segments before the one at `place`; the joints stay, which is said where it matters."""
        chosen, before = self._chosen(), self._document.project
        if not chosen:
            self.told.emit(tr("choose segments to move in the table first"))
        elif not 0 <= place <= len(before.segments):
            at_start = tr("nothing lies before it")
            self.told.emit(at_start if place < 0 else tr("nothing lies behind it"))
        else:
            self._do(tr("Move segments"), lambda project: edits.move_segments(project, chosen, place))
            first = place - sum(index < place for index in chosen)
            moved = frozenset(range(first, first + len(chosen)))
            self._tables.views["segments"].choose_records(moved)
            if self._document.project is not before and _joints_carry(before, {*chosen, *moved}):
                self.told.emit(
                    tr("supports and loads of joints stay at their joints, in the order of the chain")
                )

    def delete_segments(self) -> None:
        """The chosen segments, with their loads."""
        chosen = self._chosen()
        if not chosen:
            self.told.emit(tr("choose segments to delete in the table first"))
        elif len(chosen) == len(self._document.project.segments):
            self.told.emit(tr("a member has at least one segment"))
        else:
            before = self._document.project
            self._do(tr("Delete segments"), lambda project: edits.delete_segments(project, chosen))
            if gone := also_gone(before, self._document.project):
                self.told.emit(gone)

    def split(self) -> None:
        """The chosen segment in its middle."""
        chosen = self._chosen()
        if len(chosen) != 1:
            self.told.emit(tr("choose one segment to split"))
            return
        half = self._document.project.segments[chosen[0]].length / 2
        self._do(tr("Split segment"), lambda project: edits.split_segment(project, chosen[0], half))

    def join(self) -> None:
        """The chosen segments to one, or the chosen one with the next."""
        chosen = self._chosen()
        if not chosen:
            self.told.emit(tr("choose the segments to join"))
            return
        first, last = chosen[0], chosen[-1] if len(chosen) > 1 else chosen[0] + 1
        if len(chosen) > 1 and last - first >= len(chosen):
            self.told.emit(tr("choose segments that lie side by side to join"))
            return
        if last >= len(self._document.project.segments):
            self.told.emit(tr("there is no segment behind it to join"))
            return
        self._do(tr("Join segments"), lambda project: edits.join_segments(project, first, last))

    def reverse(self) -> None:
        """The member described from its other end."""
        self._tables.commit_open_editor()
        self._do(tr("Reverse member"), edits.reverse_member)
        if any(companion.action != "both" for companion in self._document.project.companions):
            self.told.emit(tr("companions that act one way only part at their other end now"))

    def fit_companions(self) -> None:
        """The last segment of every companion that does not fit as long as it must be."""
        self._tables.commit_open_editor()
        before = self._document.project
        unfit = [i for i, one in enumerate(before.companions) if edits.is_unfit(before, one)]
        if not unfit:
            self.told.emit(tr("every companion fits its span"))
            return
        project, refused = before, ""
        for at in unfit:  # one that cannot be made to fit keeps none of the others from it
            try:
                project = edits.fit_companion(project, at)
            except edits.EditError as error:
                refused = reason_of(error, before.display.unit_system)
        if project is not before:
            self._document.commit(project, tr("Make companions fit"))
        if refused:
            self.told.emit(refused)

    def number_joints(self) -> None:
        """Joints that are numbers in order along the chain; those with names keep them."""
        self._tables.commit_open_editor()
        before = self._document.project
        if edits.number_joints(before) is before:
            self.told.emit(tr("the joints are in order; marks that are not numbers stay as they are"))
            return
        self._do(tr("Number joints"), edits.number_joints)
        changed = sum(
            a.mark != b.mark for a, b in zip(before.joints, self._document.project.joints, strict=True)
        )
        words = trn("{count} joint has another number now", "{count} joints have another number now", changed)
        self.told.emit(words.format(count=changed))

    def add_typical(self, material: Material) -> None:
        """A typical material, with its row in front for the allowable stresses that it lacks."""
        self._tables.commit_open_editor()
        project, note = with_typical(self._document.project, material)
        self._document.commit(project, tr("Add material"))
        self._tables.show_record("materials", len(project.materials) - 1)
        self.told.emit(note)

    def delete_rows(self) -> None:
        """The records chosen in the table with the keyboard."""
        self._tables.commit_open_editor()
        view = self._tables.current_view()
        table, chosen = view.table_model.table, view.chosen_records()
        if table.key == "segments":
            self.delete_segments()
        elif table.delete is None or not chosen:
            self.told.emit(tr("choose rows to delete first"))
        else:
            delete, sight = table.delete, view.table_model.sight
            self._do(tr(table.delete_name), lambda project: delete(project, chosen, sight))


def _joints_carry(project: Project, segments: set[int]) -> bool:
    """Whether a joint between these segments is held or loaded."""
    between = project.joints[min(segments) + 1 : max(segments) + 1]
    loaded = {load.joint for case in project.load_cases for load in case.joint_loads}
    return any(joint.mark in loaded or supports_of(joint) for joint in between)


def also_gone(before: Project, after: Project) -> str:
    """What went with the segments that a person did not choose, in words; empty where nothing did."""
    kept = {joint.mark for joint in after.joints}
    held = [j.mark for j in before.joints if j.mark not in kept and supports_of(j)]
    loads, limits = (count(before) - count(after) for count in (_loads, _limits))
    parts = [tr("the support of joint {mark}").format(mark=mark) for mark in held]
    beside = {companion.mark for companion in after.companions}
    parts += [tr("companion {mark}").format(mark=c.mark) for c in before.companions if c.mark not in beside]
    parts += [trn("{count} load", "{count} loads", loads)] if loads else []
    parts += [trn("{count} limit", "{count} limits", limits)] if limits else []
    return tr("also gone: {things}").format(things=", ".join(parts)) if parts else ""


def _loads(project: Project) -> int:
    return sum(len(case.segment_loads) + len(case.joint_loads) for case in project.load_cases)


def _limits(project: Project) -> int:
    limits = project.limits
    return len(limits.displacement) + len(limits.relative) + len(limits.reaction)
