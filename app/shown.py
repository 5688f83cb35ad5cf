"""Which state is shown: what the strips draw and whose loads the drawing shows."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

ShownKind = Literal["combination", "case", "unloaded", "envelope"]


@dataclass(frozen=True, slots=True)
class Shown:
    """One state by kind and name, or the envelope (its name is then empty)."""

    kind: ShownKind
    name: str = ""
