"""What is being looked at: the shown state and strips, the cursor, the selection; not part of the document.

The rooms of the window do not know each other; they share this one object, set its values, hear its signals.
Lives in the GUI thread.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Literal

from PySide6.QtCore import QObject, Signal

from app.drawing.shapes import Part
from app.looks import Looks
from app.shown import Shown
from app.strip_choice import StripChoice


@dataclass(frozen=True, slots=True)
class Cursor:
    """The cursor's place: x in m along the member; at a joint `side` says which side is read out first."""

    x: float
    side: Literal["left", "right"] = "right"


@dataclass(frozen=True, slots=True)
class Selection:
    """Selected segments and joints, by index along the chain, and segments of companions, among all."""

    segments: frozenset[int] = field(default_factory=frozenset)
    joints: frozenset[int] = field(default_factory=frozenset)
    companions: frozenset[int] = field(default_factory=frozenset)

    def holds(self, part: Selection) -> bool:
        """Whether these are all in it."""
        mine = (self.segments, self.joints, self.companions)
        theirs = (part.segments, part.joints, part.companions)
        return all(part <= whole for part, whole in zip(theirs, mine, strict=True))

    def toggled(self, part: Selection) -> Selection:
        """With these taken in, or out where they are in already."""
        return Selection(
            self.segments ^ part.segments, self.joints ^ part.joints, self.companions ^ part.companions
        )

    def joined(self, part: Selection) -> Selection:
        """With these as well."""
        return Selection(
            self.segments | part.segments, self.joints | part.joints, self.companions | part.companions
        )

    def extended(self, part: Selection) -> Selection:
        """With these as well, and all between them and the nearest of their kind."""
        return Selection(
            _up_to(self.segments, part.segments),
            _up_to(self.joints, part.joints),
            _up_to(self.companions, part.companions),
        )


def _up_to(chosen: frozenset[int], wanted: frozenset[int]) -> frozenset[int]:
    """The chosen and the wanted, and what lies between."""
    if not chosen or not wanted:
        return chosen | wanted
    (index, *_) = sorted(wanted)
    nearest = min(chosen, key=lambda other: abs(other - index))
    return chosen | wanted | frozenset(range(min(nearest, index), max(nearest, index) + 1))


class View(QObject):
    """Holds the values; a setter emits only when the value changes, so an echo ends by itself."""

    shown_changed = Signal(object)  # Shown
    cursor_changed = Signal(object)  # Cursor or None
    selection_changed = Signal(object)  # Selection
    thing_changed = Signal(object)  # Part or None
    strips_changed = Signal(object)  # StripChoice
    looks_changed = Signal(object)  # Looks
    together_changed = Signal(bool)

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._shown = Shown("envelope")
        self._cursor: Cursor | None = None
        self._selection = Selection()
        self._thing: Part | None = None
        self._strips = StripChoice()
        self._looks = Looks()
        self._together = False

    @property
    def shown(self) -> Shown:
        """The state the strips show."""
        return self._shown

    def set_shown(self, shown: Shown) -> None:
        """Show another state."""
        if shown != self._shown:
            self._shown = shown
            self.shown_changed.emit(shown)

    @property
    def cursor(self) -> Cursor | None:
        """The cursor, or None while it is nowhere."""
        return self._cursor

    def set_cursor(self, cursor: Cursor | None) -> None:
        """Move the cursor."""
        if cursor != self._cursor:
            self._cursor = cursor
            self.cursor_changed.emit(cursor)

    @property
    def selection(self) -> Selection:
        """What is selected."""
        return self._selection

    def set_selection(self, selection: Selection) -> None:
        """Select segments and joints, replacing what was selected; the thing in hand is put down."""
        self.set_thing(None)
        if selection != self._selection:
            self._selection = selection
            self.selection_changed.emit(selection)

    @property
    def thing(self) -> Part | None:
        """The load or support on the drawing that was clicked last and is meant by itself, or None."""
        return self._thing

    def set_thing(self, thing: Part | None) -> None:
        """Mean a load or a support by itself, or none."""
        if thing != self._thing:
            self._thing = thing
            self.thing_changed.emit(thing)

    @property
    def strips(self) -> StripChoice:
        """The strips that are shown."""
        return self._strips

    def set_strips(self, strips: StripChoice) -> None:
        """Show other strips, or in another order."""
        if strips != self._strips:
            self._strips = strips
            self.strips_changed.emit(strips)

    @property
    def together(self) -> bool:
        """Whether the single states are drawn with the envelope, and the envelope with a single state."""
        return self._together

    def set_together(self, together: bool) -> None:
        """Draw them together, or the shown one alone."""
        if together != self._together:
            self._together = together
            self.together_changed.emit(together)

    @property
    def looks(self) -> Looks:
        """What of the results is shown on the drawing."""
        return self._looks

    def set_looks(self, looks: Looks) -> None:
        """Show other results on the drawing."""
        if looks != self._looks:
            self._looks = looks
            self.looks_changed.emit(looks)
