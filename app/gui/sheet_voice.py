"""What the sheet says to those who hear it: the member, the verdict, what is selected, the readout.

A drawing has no parts that a screen reader knows, so the sheet carries a text of its own. It is kept up to
date and announced sparingly: the readout while the sheet has the keyboard, a verdict when it changes.
"""

from __future__ import annotations

from PySide6.QtCore import QObject
from PySide6.QtGui import QAccessible, QAccessibleAnnouncementEvent, QAccessibleEvent

from app.gui.document import Document
from app.gui.findings.panel import FindingsPanel
from app.gui.sheet_view import SheetView
from app.gui.show import Showing
from app.gui.top_bar import shown_text
from app.gui.view import Selection, View
from app.units import format_value
from app.words import tr, trn
from solver.model import Project, supports_of


class SheetVoice(QObject):
    """Describes one sheet."""

    def __init__(
        self, sheet: SheetView, findings: FindingsPanel, showing: Showing, document: Document, view: View
    ) -> None:
        super().__init__(sheet)
        self._sheet = sheet
        self._findings = findings
        self._showing = showing
        self._document = document
        self._view = view
        self._member: tuple[Project | None, str] = (None, "")
        self._verdict = ""
        showing.shown.connect(self.on_results)
        view.shown_changed.connect(lambda _shown: self.describe())
        view.selection_changed.connect(lambda _selection: self.describe())
        view.cursor_changed.connect(lambda _cursor: self.describe())
        self.describe()

    def on_results(self) -> None:
        """Other results, or results that are out of date by now; another verdict is announced."""
        self.describe()
        if self._showing.complete and self._findings.headline != self._verdict:
            changed, self._verdict = bool(self._verdict), self._findings.headline
            if changed:
                QAccessible.updateAccessibility(QAccessibleAnnouncementEvent(self._sheet, self._verdict))

    def describe(self) -> None:
        """Say what there is now."""
        parts = (self._member_line(), self._verdict_line(), self._selected(), self._sheet.readout)
        text = ". ".join(part for part in parts if part)
        if text != self._sheet.accessibleDescription():
            self._sheet.setAccessibleDescription(text)
            if self._sheet.hasFocus():
                event = QAccessibleEvent(self._sheet, QAccessible.Event.DescriptionChanged)
                QAccessible.updateAccessibility(event)

    def _member_line(self) -> str:
        """The member and the state that is shown."""
        project = self._document.shown_project
        if self._member[0] is not project:
            self._member = (project, member_line(project))
        return tr("{member}, shown: {state}").format(
            member=self._member[1], state=shown_text(self._view.shown)
        )

    def _verdict_line(self) -> str:
        headline = self._findings.headline
        if headline and not self._showing.complete:
            return tr("{verdict}, out of date").format(verdict=headline)
        return headline

    def _selected(self) -> str:
        names = selected_names(self._document.shown_project, self._view.selection)
        return tr("Selected: {names}").format(names=", ".join(names)) if names else ""


def member_line(project: Project) -> str:
    """How many segments, how long, and where it is held."""
    length = format_value(
        sum(segment.length for segment in project.segments),
        "length",
        project.display.unit_system,
        strip=True,
        with_unit=True,
    )
    held = [joint.mark for joint in project.joints if supports_of(joint)]
    segments = trn("Member of {count} segment", "Member of {count} segments", len(project.segments))
    if not held:
        return tr("{segments}, {length} long, held nowhere").format(segments=segments, length=length)
    return tr("{segments}, {length} long, held at joint {marks}").format(
        segments=segments, length=length, marks=", ".join(held)
    )


def selected_names(project: Project, selection: Selection) -> list[str]:
    """What is selected, by its marks; an index that the project does not have any more is passed over."""
    segments = [
        tr("segment {mark}").format(mark=project.segments[index].mark)
        for index in sorted(selection.segments)
        if index < len(project.segments)
    ]
    joints = [
        tr("joint {mark}").format(mark=project.joints[index].mark)
        for index in sorted(selection.joints)
        if index < len(project.joints)
    ]
    return [*segments, *joints]
