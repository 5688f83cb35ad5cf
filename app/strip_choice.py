"""Which strips are looked at, and in what order; at least one always is. Remembered as a line of names.

The mode shape waits hidden: few members are checked for stability, and a fifth strip takes room from four.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Final, Literal, TypeAlias, get_args

from app.words import tr

Kind: TypeAlias = Literal["displacement", "force", "stress", "utilisation", "mode"]
KINDS: tuple[Kind, ...] = get_args(Kind)
USUAL: Final = KINDS[:4]  # shown unless chosen otherwise


def kind_names() -> dict[Kind, str]:
    """The strips in words, their symbols first."""
    return {
        "displacement": tr("u, displacement"),
        "force": tr("N, axial force"),
        "stress": tr("σ, stress"),
        "utilisation": tr("utilisation"),
        "mode": tr("w, mode shape"),
    }


def kind_symbols() -> dict[Kind, str]:
    """The strips' symbols, in their usual order."""
    return {
        "displacement": "u",
        "force": "N",
        "stress": "σ",
        "utilisation": tr("utilisation"),
        "mode": "w",
    }


@dataclass(frozen=True, slots=True)
class StripChoice:
    """The shown strips in order, each once and at least one."""

    shown: tuple[Kind, ...] = USUAL

    @property
    def hidden(self) -> tuple[Kind, ...]:
        """The others, in their usual order."""
        return tuple(kind for kind in KINDS if kind not in self.shown)

    def without(self, kind: Kind) -> StripChoice:
        """Without a strip; the last one stays."""
        kept = tuple(other for other in self.shown if other != kind)
        return StripChoice(kept) if kept else self

    def with_added(self, kind: Kind) -> StripChoice:
        """With a strip after those that usually come before it."""
        if kind in self.shown:
            return self
        usual = KINDS.index(kind)
        before = [i for i, other in enumerate(self.shown) if KINDS.index(other) < usual]
        place = before[-1] + 1 if before else 0
        return StripChoice((*self.shown[:place], kind, *self.shown[place:]))

    def moved(self, kind: Kind, by: int) -> StripChoice:
        """With a strip some places on, as far as there are places."""
        at = self.shown.index(kind)
        return self.put(kind, at + by + (by > 0))

    def put(self, kind: Kind, gap: int) -> StripChoice:
        """With a strip in the gap before the strip `gap`, counted with the strip still in its old place."""
        at = self.shown.index(kind)
        others = [other for other in self.shown if other != kind]
        others.insert(max(gap - (gap > at), 0), kind)
        return StripChoice(tuple(others))

    @property
    def text(self) -> str:
        """The line of names."""
        return " ".join(self.shown)

    @classmethod
    def of_text(cls, text: str) -> StripChoice:
        """The choice in a line of names; what is no strip is left out, nothing means the usual."""
        known: dict[str, Kind] = {kind: kind for kind in KINDS}
        shown = dict.fromkeys(known[name] for name in text.split() if name in known)
        return cls(tuple(shown) or USUAL)
