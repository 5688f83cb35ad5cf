"""The form for the title and the calc sheet's title block: one undo step when it is accepted."""

from __future__ import annotations

from msgspec.structs import replace
from PySide6.QtWidgets import (
    QDialog,
    QDialogButtonBox,
    QFormLayout,
    QLineEdit,
    QPlainTextEdit,
    QVBoxLayout,
    QWidget,
)

from app.gui.document import Document
from app.title_fields import TITLE_FIELDS
from app.words import tr
from solver.model import Project, SheetTexts


class TitleBlockDialog(QDialog):
    """Title, notes and who, when, which job."""

    def __init__(self, parent: QWidget, document: Document) -> None:
        super().__init__(parent)
        self.setWindowTitle(tr("Title block"))
        self._document = document
        project = document.project
        self.title = QLineEdit(project.title)
        self.notes = QPlainTextEdit(project.notes)
        self.notes.setTabChangesFocus(True)
        self.fields = {key: QLineEdit(getattr(project.sheet, key)) for key, _words in TITLE_FIELDS}
        form = QFormLayout()
        self._add_row(form, tr("Title"), self.title)
        for key, words in TITLE_FIELDS:
            self._add_row(form, tr(words), self.fields[key])
        self._add_row(form, tr("Notes"), self.notes)
        buttons = QDialogButtonBox(
            QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Cancel
        )
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        rows = QVBoxLayout(self)
        rows.addLayout(form)
        rows.addWidget(buttons)
        self.resize(520, 420)
        self.accepted.connect(self.commit)
        self.finished.connect(self.deleteLater)

    @staticmethod
    def _add_row(form: QFormLayout, words: str, field: QWidget) -> None:
        field.setAccessibleName(words)
        form.addRow(words, field)

    def commit(self) -> None:
        """One undo step with what was changed."""
        self._document.commit(self.edited(self._document.project), tr("Title block"))

    def edited(self, project: Project) -> Project:
        """The project with the form's texts; texts left alone stay as they were, written or absent."""
        sheet = {
            key: field.text()
            for key, field in self.fields.items()
            if field.text() != getattr(project.sheet, key)
        }
        own = {"title": self.title.text(), "notes": self.notes.toPlainText()}
        changed: dict[str, object] = {key: text for key, text in own.items() if text != getattr(project, key)}
        if sheet:
            changed["sheet"] = SheetTexts(
                **{key: sheet.get(key, getattr(project.sheet, key)) for key, _ in TITLE_FIELDS}
            )
        return replace(project, **changed) if changed else project
