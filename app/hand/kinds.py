"""What can be put on the drawing by hand, as one table: strip of symbols, menus and keys walk it.

A new kind of support, load or companion is a line here: its symbol, what it goes on, the cell that holds it
and what it begins with. What it begins with is a text as typed into that cell, with its unit, one for metric
and one for inch systems.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Final, Literal

from app.drawing.shapes import PartKind
from app.hand import symbols
from app.hand.symbols import Symbol
from app.units import Quantity
from app.words import later
from solver.model import UnitSystemName

On = Literal["joint", "segment", "member"]


@dataclass(frozen=True, slots=True)
class Kind:
    """One kind of thing. `part` shows it; `keys` are the record's own, the first is what is put."""

    key: str
    name: str
    on: On
    letter: str  # alone, on the sheet
    symbol: Symbol
    part: PartKind
    begins: tuple[str, str]  # metric, inch
    quantity: Quantity
    keys: tuple[str, ...]
    of_case: bool = False
    typed_next: bool = True

    def begins_in(self, system: UnitSystemName) -> str:
        """What it begins with in a unit system."""
        return self.begins[1 if system.startswith("in") else 0]


KINDS: Final[tuple[Kind, ...]] = (
    Kind(
        "fixed",
        later("Fixed support"),
        "joint",
        "F",
        symbols.FIXED,
        "support",
        ("fixed", "fixed"),
        "spring",
        ("support",),
        typed_next=False,
    ),
    Kind(
        "spring",
        later("Spring support"),
        "joint",
        "S",
        symbols.SPRING,
        "support",
        ("spring 100 kN/mm", "spring 500 kip/in"),
        "spring",
        ("support",),
    ),
    Kind(
        "stop",
        later("Stop with a gap"),
        "joint",
        "P",
        symbols.STOP,
        "support",
        ("stop + 0.2 mm", "stop + 0.01 in"),
        "displacement",
        ("support",),
    ),
    Kind(
        "free",
        later("Free: take the support off"),
        "joint",
        "R",
        symbols.FREE,
        "support",
        ("", ""),
        "spring",
        ("support",),
        typed_next=False,
    ),
    Kind(
        "shoulder",
        later("Shoulder: fillet radius or factor"),
        "joint",
        "A",
        symbols.SHOULDER,
        "shoulder",
        ("r 1 mm", "r 1/32 in"),
        "size",
        ("shoulder",),
    ),
    Kind(
        "lateral",
        later("Held sideways"),
        "joint",
        "W",
        symbols.LATERAL,
        "lateral",
        ("fixed", "fixed"),
        "spring",
        ("translation",),
    ),
    Kind(
        "turning",
        later("Held against turning"),
        "joint",
        "N",
        symbols.TURNING,
        "turning",
        ("fixed", "fixed"),
        "rotation_spring",
        ("rotation",),
    ),
    Kind(
        "movement",
        later("Movement of a support"),
        "joint",
        "V",
        symbols.MOVEMENT,
        "movement",
        ("1 mm", "0.05 in"),
        "displacement",
        ("movement",),
        of_case=True,
    ),
    Kind(
        "force",
        later("Force at a joint"),
        "joint",
        "L",
        symbols.FORCE,
        "force",
        ("1 kN", "1 kip"),
        "force",
        ("force",),
        of_case=True,
    ),
    Kind(
        "distributed",
        later("Distributed load"),
        "segment",
        "D",
        symbols.DISTRIBUTED,
        "distributed",
        ("1 kN/m", "10 lbf/in"),
        "distributed",
        ("load_start", "load_end"),
        of_case=True,
    ),
    Kind(
        "warmth",
        later("Temperature rise"),
        "segment",
        "T",
        symbols.WARMTH,
        "warmth",
        ("20 K", "20 K"),
        "temperature",
        ("temperature_start", "temperature_end"),
        of_case=True,
    ),
    Kind(
        "fit",
        later("Lack of fit"),
        "segment",
        "K",
        symbols.FIT,
        "fit",
        ("0.1 mm", "0.005 in"),
        "displacement",
        ("lack_of_fit",),
        of_case=True,
    ),
    Kind(
        "bedding",
        later("Bedding"),
        "segment",
        "B",
        symbols.BEDDING,
        "bedding",
        ("1 N/mm²", "100 lbf/in²"),
        "bedding",
        ("bedding", "bedding_end"),
    ),
    Kind(
        "bonded",
        later("Bonded part: another material that shares the strain"),
        "segment",
        "M",
        symbols.BONDED,
        "bonded",
        ("A 1000 mm²", "A 1.5 in²"),
        "area",
        ("bonded",),
    ),
    Kind(
        "companion",
        later("Companion"),
        "segment",
        "C",
        symbols.COMPANION,
        "companion",
        ("", ""),
        "length",
        (),
    ),
    Kind(
        "weight",
        later("Self-weight"),
        "member",
        "G",
        symbols.WEIGHT,
        "gravity",
        ("9.80665 m/s²", "9.80665 m/s²"),
        "acceleration",
        ("gravity",),
        of_case=True,
    ),
)
