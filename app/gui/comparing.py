"""The references of a window: keeps the results that are shown, and says which are looked at.

They are no part of the document: undo does not take them back, and another project forgets them.
"""

from __future__ import annotations

from collections.abc import Callable

from PySide6.QtCore import QObject, Signal

from app.gui.against import AgainstBar
from app.gui.document import Document
from app.gui.show import Showing
from app.references import References
from app.words import tr
from solver.results import Results


class Comparing(QObject):
    """Between the commands, the top bar and what is shown."""

    told = Signal(str)

    def __init__(
        self,
        document: Document,
        showing: Showing,
        bar: AgainstBar,
        commit_open_editor: Callable[[], None],
        parent: QObject,
    ) -> None:
        super().__init__(parent)
        self._showing = showing
        self._bar = bar
        self._commit_open_editor = commit_open_editor
        self._references = References()
        self._asked: Results | None = None  # what is kept once it has its name
        bar.picked.connect(self.on_picked)
        bar.named.connect(self.on_named)
        bar.dropped.connect(self.on_dropped)
        document.opened.connect(self.on_opened)

    @property
    def references(self) -> References:
        """What is kept."""
        return self._references

    def keep(self) -> None:
        """Keep what is shown, if it is of everything that has been typed, once it has been given a name."""
        self._commit_open_editor()
        outcome = self._showing.outcome
        if outcome is None or outcome.results is None or not self._showing.current:
            self.told.emit(tr("Nothing kept: only results that are up to date can be kept as a reference"))
            return
        self._asked = outcome.results
        self._bar.ask(self._references.proposed)

    def on_named(self, name: str) -> None:
        """The results that were asked about have their name."""
        if self._asked is None:
            return
        asked, self._asked = self._asked, None
        self._set(self._references.kept_as(name, asked))
        told = tr(
            "Kept as “{name}” until another project is opened or the window is closed; no file holds it"
        )
        self.told.emit(told.format(name=self._references.chosen))

    def on_dropped(self) -> None:
        """No name was given."""
        self._asked = None
        self.told.emit(tr("Nothing kept"))

    def on_picked(self, name: str | None) -> None:
        """Another is looked at, or none."""
        self._set(self._references.looking_at(name))

    def forget(self) -> None:
        """Forget the one that is looked at."""
        name = self._references.chosen
        if name is None:
            self.told.emit(tr("No reference is looked at: choose one at Against to forget it"))
            return
        self._set(self._references.without_chosen())
        self.told.emit(tr("“{name}” forgotten").format(name=name))

    def on_opened(self) -> None:
        """Another project: nothing to hold against it."""
        self._asked = None
        self._bar.end()
        self._set(References())

    def _set(self, references: References) -> None:
        self._references = references
        self._bar.show_references(references.names, references.chosen)
        self._showing.set_reference(references.against)
