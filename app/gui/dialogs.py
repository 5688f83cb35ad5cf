"""The few dialogs: for files, and for what cannot be undone. None blocks; all end in a signal."""

from __future__ import annotations

from collections.abc import Callable
from typing import Literal

from PySide6.QtGui import QGuiApplication
from PySide6.QtWidgets import (
    QDialog,
    QDialogButtonBox,
    QLabel,
    QMessageBox,
    QPlainTextEdit,
    QVBoxLayout,
    QWidget,
)

from app.words import tr

Answer = Literal["save", "discard", "cancel"]
BUTTON = QMessageBox.StandardButton


def ask_unsaved(parent: QWidget, name: str, then: Callable[[Answer], None]) -> QMessageBox:
    """Save, discard or cancel; Escape cancels."""
    box = QMessageBox(parent)
    box.setIcon(QMessageBox.Icon.Question)
    box.setText(tr("Save the changes to {name}?").format(name=name))
    box.setInformativeText(tr("They are lost if they are not saved."))
    box.setStandardButtons(BUTTON.Save | BUTTON.Discard | BUTTON.Cancel)
    for button, words in (
        (BUTTON.Save, tr("Save")),
        (BUTTON.Discard, tr("Discard")),
        (BUTTON.Cancel, tr("Cancel")),
    ):
        box.button(button).setText(words)
    box.setDefaultButton(BUTTON.Save)
    box.setEscapeButton(BUTTON.Cancel)
    answers: dict[int, Answer] = {BUTTON.Save.value: "save", BUTTON.Discard.value: "discard"}
    box.finished.connect(lambda result: then(answers.get(result, "cancel")))
    box.finished.connect(box.deleteLater)
    box.open()
    return box


def ask_recover(parent: QWidget, name: str, then: Callable[[bool | None], None]) -> QMessageBox:
    """Whether to open work left behind: True opens, False throws it away, None leaves it for later."""
    box = QMessageBox(parent)
    box.setIcon(QMessageBox.Icon.Question)
    box.setText(tr("Unsaved work on {name} was found.").format(name=name))
    box.setInformativeText(tr("The program ended before it was saved."))
    opened = box.addButton(tr("Open it"), QMessageBox.ButtonRole.AcceptRole)
    discarded = box.addButton(tr("Discard it"), QMessageBox.ButtonRole.DestructiveRole)
    later = box.addButton(tr("Decide later"), QMessageBox.ButtonRole.RejectRole)
    box.setDefaultButton(opened)
    box.setEscapeButton(later)

    def on_finished(_result: int) -> None:
        chosen = box.clickedButton()
        then(True if chosen is opened else False if chosen is discarded else None)

    box.finished.connect(on_finished)
    box.finished.connect(box.deleteLater)
    box.open()
    return box


def ask_overwrite(parent: QWidget, name: str, then: Callable[[], None]) -> QMessageBox:
    """Whether to write over a file that another program has changed; goes on only with a yes."""
    box = QMessageBox(parent)
    box.setIcon(QMessageBox.Icon.Warning)
    box.setText(tr("{name} has been changed by another program since it was opened.").format(name=name))
    box.setInformativeText(tr("Writing over it loses those changes; Save as keeps both."))
    over = box.addButton(tr("Write over it"), QMessageBox.ButtonRole.DestructiveRole)
    cancel = box.addButton(tr("Cancel"), QMessageBox.ButtonRole.RejectRole)
    box.setDefaultButton(cancel)
    box.setEscapeButton(cancel)

    def on_finished(_result: int) -> None:
        if box.clickedButton() is over:
            then()

    box.finished.connect(on_finished)
    box.finished.connect(box.deleteLater)
    box.open()
    return box


class TextDialog(QDialog):
    """A headline over a text that can be read, selected and copied."""

    def __init__(self, parent: QWidget, title: str, headline: str, text: str) -> None:
        super().__init__(parent)
        self.setWindowTitle(title)
        words = QLabel(headline)
        words.setWordWrap(True)
        self.body = QPlainTextEdit(text)
        self.body.setReadOnly(True)
        firsts = [line.split("\t")[0] for line in text.splitlines() if "\t" in line]
        widest = max(map(self.body.fontMetrics().horizontalAdvance, firsts), default=0)
        self.body.setTabStopDistance(widest + 24)
        self.body.setAccessibleName(headline)
        self.body.setTabChangesFocus(True)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Close)
        buttons.button(QDialogButtonBox.StandardButton.Close).setText(tr("Close"))
        self.copy = buttons.addButton(tr("Copy"), QDialogButtonBox.ButtonRole.ActionRole)
        self.copy.clicked.connect(lambda: QGuiApplication.clipboard().setText(self.body.toPlainText()))
        buttons.rejected.connect(self.reject)
        rows = QVBoxLayout(self)
        for widget in (words, self.body, buttons):
            rows.addWidget(widget)
        self.resize(640, 360)
        self.finished.connect(self.deleteLater)


def show_text(parent: QWidget, title: str, headline: str, text: str) -> TextDialog:
    """Show a text to copy."""
    dialog = TextDialog(parent, title, headline, text)
    dialog.open()
    return dialog
