"""A number in the hand, from the moment it is taken until something else is done."""

from __future__ import annotations

from dataclasses import dataclass, field, replace

from app.drawing.handles import Handle
from app.drawing.ruler import Ruler
from app.drawing.sketch import Sketch
from app.hand.grip import Grip, Outcome, Refusal
from app.hand.lengths import length_at
from app.hand.taking import take
from app.shown import Shown
from app.words import tr


@dataclass(eq=False)
class Pull:
    """The handle, the member as it was, the grip of each way a joint can go, and what has come of it."""

    handle: Handle
    sketch: Sketch
    grips: tuple[Grip, Grip]  # what lies beyond moves along; the total stays. The same twice but at a joint
    total_stays: bool = False
    outcome: Outcome = field(init=False)

    def __post_init__(self) -> None:
        self.outcome = Outcome(self.grip.value, self.sketch.member.project)

    @property
    def grip(self) -> Grip:
        """The number, and how it goes."""
        return self.grips[self.total_stays]

    @property
    def has_two_ways(self) -> bool:
        """Whether a pull can go two ways, as at a joint with a segment beyond."""
        return self.grips[0] is not self.grips[1]

    @property
    def changed(self) -> bool:
        """Whether the number is another one than at the start."""
        return self.outcome.value != self.grip.value

    @property
    def is_of_end(self) -> bool:
        """Whether the end of the member is pulled."""
        return self.handle.kind == "joint" and not self.has_two_ways

    def go_on(self, ruler: Ruler) -> None:
        """Let the end of the member be pulled from where it is now, by another ruler."""
        if self.outcome.project is not None:
            at = length_at(self.outcome.project, self.handle.index, ruler)
            grip = replace(self.grip, at=at)
            self.grips = grip, grip

    def go(self, value: float, *, total_stays: bool) -> bool:
        """Take another value or way; False where nothing differs."""
        settled = self.outcome.project is not None
        if settled and (value, total_stays) == (self.outcome.value, self.total_stays):
            return False
        self.total_stays = total_stays
        self.outcome = self.grip.outcome(value)
        if not self.changed:
            self.outcome = Outcome(value, self.sketch.member.project)
        return True

    def lines(self, hint: str) -> tuple[str, ...]:
        """What the readout says: the value and what moves along, what it was, what else the hand can do."""
        if self.outcome.reason:
            return (self.outcome.reason, hint)
        told = self.grip.tell(self.outcome.value).split("\n")
        return (*told, self.grip.was(self.outcome.value), hint) if self.changed else (*told, hint)

    def hint(self) -> str:
        """While it is dragged."""
        if not self.has_two_ways:
            return tr("Ctrl: free of round steps. Type a number for the exact value.")
        if self.total_stays:
            return tr("Without Shift what lies beyond moves along. Type a number for the exact value.")
        return tr("Shift: the total stays. Type a number for the exact value.")


def taken(
    handle: Handle, sketch: Sketch, shown: Shown, case: str | None, *, total_stays: bool = False
) -> Pull | Refusal:
    """A handle taken in the hand, or why that cannot be."""
    first = take(handle, sketch, shown, case)
    if isinstance(first, Refusal):
        return first
    second = first
    if handle.kind == "joint" and handle.index < len(sketch.member.project.segments):
        kept = take(handle, sketch, shown, case, total_stays=True)
        second = first if isinstance(kept, Refusal) else kept
    return Pull(handle, sketch, (first, second), total_stays and second is not first)
