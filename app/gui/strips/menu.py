"""What can be done with strips, as menus: of one strip under the mouse, and of all of them under View.

Both are filled when they open, so that they say what holds now.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from typing import Protocol

from PySide6.QtCore import QPoint
from PySide6.QtGui import QAction
from PySide6.QtWidgets import QMenu, QWidget

from app.gui.view import View
from app.strip_choice import KINDS, Kind, StripChoice, kind_names
from app.words import tr


class Taking(Protocol):
    """Takes strips elsewhere."""

    def copy_numbers(self, kinds: tuple[Kind, ...]) -> None:
        """To the clipboard."""

    def save_numbers(self, kinds: tuple[Kind, ...]) -> None:
        """To a file."""

    def copy_picture(self, kinds: tuple[Kind, ...]) -> None:
        """To the clipboard."""

    def save_picture(self, kinds: tuple[Kind, ...]) -> None:
        """To a file."""


class StripMenu(QMenu):
    """Of one strip."""

    def __init__(self, view: View, is_upright: Callable[[], bool], taking: Taking, parent: QWidget) -> None:
        super().__init__(parent)
        self._view, self._is_upright, self._taking = view, is_upright, taking

    def open_for(self, kind: Kind, place: QPoint) -> None:
        """Offer what holds for this strip."""
        self.clear()
        self.add_moves(self, kind)
        hide = self.addAction(tr("&Hide {strip}").format(strip=kind_names()[kind]))
        hide.triggered.connect(lambda: self._choose(self._view.strips.without(kind)))
        hide.setEnabled(len(self._view.strips.shown) > 1)
        for other in self._view.strips.hidden:
            show = self.addAction(tr("Show {strip}").format(strip=kind_names()[other]))
            show.triggered.connect(lambda _on=False, o=other: self._choose(self._view.strips.with_added(o)))
        self.addSeparator()
        self._add_taking(kind)
        self.addSeparator()
        self.addAction(together_action(self._view, self))
        self.popup(place)

    def _add_taking(self, kind: Kind) -> None:
        """What takes this strip elsewhere."""
        taking = self._taking
        for text, take in (
            (tr("&Copy numbers"), taking.copy_numbers),
            (tr("Copy &picture"), taking.copy_picture),
            (tr("Save &numbers…"), taking.save_numbers),
            (tr("&Save picture…"), taking.save_picture),
        ):
            self.addAction(text, lambda take=take: take((kind,)))

    def add_moves(self, menu: QMenu, kind: Kind) -> None:
        """One place back and one on, as far as there is one."""
        words = (
            (tr("Move &left"), tr("Move &right"))
            if self._is_upright()
            else (tr("Move &up"), tr("Move &down"))
        )
        for text, by in zip(words, (-1, 1), strict=True):
            moved = self._view.strips.moved(kind, by)
            action = menu.addAction(text, lambda m=moved: self._choose(m))
            action.setEnabled(moved != self._view.strips)

    def _choose(self, choice: StripChoice) -> None:
        self._view.set_strips(choice)


class StripsMenu(QMenu):
    """Of all strips: which are shown, each one's moves, and what is drawn together."""

    def __init__(self, view: View, of_strip: StripMenu, parent: QWidget) -> None:
        super().__init__(parent)
        self._view, self._of_strip = view, of_strip
        self.aboutToShow.connect(self.fill)

    def fill(self) -> None:
        """List them anew, the shown ones in order."""
        self.clear()
        choice, names = self._view.strips, kind_names()
        for kind in (*choice.shown, *choice.hidden):
            self._add_toggle(kind, names)
        self.addSeparator()
        for kind in choice.shown:
            moves = self.addMenu(tr("Move {strip}").format(strip=names[kind]))
            self._of_strip.add_moves(moves, kind)
        self.addSeparator()
        self.addAction(together_action(self._view, self))
        usual = self.addAction(tr("The &usual strips in their usual order"))
        usual.setEnabled(choice != StripChoice())
        usual.triggered.connect(lambda: self._view.set_strips(StripChoice()))

    def _add_toggle(self, kind: Kind, names: Mapping[Kind, str]) -> None:
        """A strip that is shown or not; the last one stays."""
        choice = self._view.strips
        shown = kind in choice.shown
        toggle = self.addAction(f"&{KINDS.index(kind) + 1}  {names[kind]}")
        toggle.setCheckable(True)
        toggle.setChecked(shown)
        toggle.setEnabled(choice.shown != (kind,))
        after = choice.without(kind) if shown else choice.with_added(kind)
        toggle.triggered.connect(lambda: self._view.set_strips(after))


def together_action(view: View, parent: QWidget) -> QAction:
    """Single states with the envelope, the envelope with a single state."""
    action = QAction(tr("Single states and envelope &together"), parent)
    action.setCheckable(True)
    action.setChecked(view.together)
    action.toggled.connect(view.set_together)
    return action
