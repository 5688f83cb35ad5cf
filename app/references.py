"""References: results kept under a name, to hold what comes later against them.

They live as long as the project stays open in a window and are no part of the project file: its contract has
no key for them, and a result kept in a file could not be told from one of another version of the solver.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from itertools import count

from app.words import tr
from solver.results import Results


@dataclass(frozen=True, slots=True)
class Reference:
    """Results of an earlier state of the project, and what they are called."""

    name: str
    results: Results


@dataclass(frozen=True, slots=True)
class References:
    """All that are kept, in order, and which of them is looked at: its name, or None."""

    kept: tuple[Reference, ...] = ()
    chosen: str | None = None

    @property
    def names(self) -> tuple[str, ...]:
        """The names, each once."""
        return tuple(reference.name for reference in self.kept)

    @property
    def against(self) -> Reference | None:
        """The one that is looked at."""
        return next((reference for reference in self.kept if reference.name == self.chosen), None)

    @property
    def proposed(self) -> str:
        """A name for the next one: the first of Before 1, Before 2 … that is free."""
        numbered = (tr("Before {number}").format(number=number) for number in count(1))
        return next(name for name in numbered if name not in self.names)

    def kept_as(self, name: str, results: Results) -> References:
        """With one more, which is looked at from now on; no older one is lost to an equal name."""
        name = self._free(" ".join(name.split()) or self.proposed)
        return References((*self.kept, Reference(name, results)), name)

    def _free(self, name: str) -> str:
        numbered = (f"{name} ({number})" for number in count(2))
        return (
            name if name not in self.names else next(other for other in numbered if other not in self.names)
        )

    def looking_at(self, name: str | None) -> References:
        """With another looked at; with None none."""
        return replace(self, chosen=name)

    def without_chosen(self) -> References:
        """Without the one that is looked at."""
        return References(tuple(reference for reference in self.kept if reference.name != self.chosen))
