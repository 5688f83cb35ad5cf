"""One click for companions that do not fit their span: under the verdict that nothing can be solved."""

from __future__ import annotations

from PySide6.QtWidgets import QPushButton, QWidget

from app import edits
from app.edits import EditError
from app.gui.document import Document
from app.units import format_value
from app.words import tr
from solver.model import Companion, Project


class FitOffer(QPushButton):
    """Says what would make them fit; pressed it asks for it. Hidden while all fit."""

    def __init__(self, document: Document, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document = document
        document.changed.connect(lambda _snapshot: self._follow())
        self._follow()

    def _follow(self) -> None:
        words = offer_words(self._document.project)
        self.setText(words)
        self.setAccessibleName(words)
        self.setToolTip(tr("Make this change; Undo takes it back"))
        self.setVisible(bool(words))


def offer_words(project: Project) -> str:
    """What would be done; empty where every companion fits."""
    unfit = [at for at, companion in enumerate(project.companions) if edits.is_unfit(project, companion)]
    fitted = [fresh for at in unfit if (fresh := _fitted(project, at)) is not None]
    if not fitted:
        return ""
    if len(fitted) > 1:
        return tr("Make all companions fit")
    last, system = fitted[0].segments[-1], project.display.unit_system
    length = format_value(last.length, "length", system, 6, strip=True, with_unit=True)
    words = tr("Make {segment} {length} long: {companion} fits")
    return words.format(segment=last.mark, length=length, companion=fitted[0].mark)


def _fitted(project: Project, at: int) -> Companion | None:
    """The companion made to fit; None where its last segment alone cannot do that."""
    try:
        return edits.fit_companion(project, at).companions[at]
    except EditError:
        return None
