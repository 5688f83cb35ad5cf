"""What holds a joint sideways, as typed text: "free", "fixed", or a stiffness such as "500 N/mm".

For the translation it is a force by displacement, for the rotation a moment by angle. Nothing typed is free.
"""

from __future__ import annotations

from typing import Final, Literal

from msgspec import UNSET, UnsetType

from app.entry import parse_entry
from app.units import Quantity, entry_text, format_value, symbol
from app.words import tr
from solver.model import Lateral, LateralHold, UnitSystemName

LateralKey = Literal["translation", "rotation"]
QUANTITIES: Final[dict[LateralKey, Quantity]] = {"translation": "spring", "rotation": "rotation_spring"}


class LateralError(ValueError):
    """The text says no lateral support; the message is the sentence to show beside it."""


def parse_hold(text: str, key: LateralKey, system: UnitSystemName) -> LateralHold | UnsetType:
    """What a text says; UNSET for free. Raises LateralError or EntryError."""
    said = text.strip().casefold()
    if not said or said in ("free", tr("free").casefold()):
        return UNSET
    if said in ("fixed", tr("fixed").casefold()):
        return "fixed"
    if said[0].isalpha():
        words = tr("what holds a joint sideways is free, fixed or a stiffness, such as {example}")
        raise LateralError(words.format(example=f"500 {symbol(QUANTITIES[key], system)}"))
    stiffness = parse_entry(text, QUANTITIES[key], system)
    if stiffness <= 0:
        raise LateralError(tr("a stiffness is greater than 0"))
    return stiffness


def hold_of(lateral: Lateral | UnsetType, key: LateralKey) -> LateralHold:
    """One of the two, free where nothing is said."""
    if isinstance(lateral, UnsetType):
        return "free"
    hold: LateralHold | UnsetType = getattr(lateral, key)
    return "free" if isinstance(hold, UnsetType) else hold


def hold_entry(lateral: Lateral | UnsetType, key: LateralKey, system: UnitSystemName) -> str:
    """The text an editor starts from, with all digits."""
    hold, quantity = hold_of(lateral, key), QUANTITIES[key]
    if isinstance(hold, float):
        return f"{entry_text(hold, quantity, system)} {symbol(quantity, system)}"
    return _word(hold)


def hold_text(lateral: Lateral | UnsetType, key: LateralKey, system: UnitSystemName) -> str:
    """The text for reading."""
    hold, quantity = hold_of(lateral, key), QUANTITIES[key]
    if isinstance(hold, float):
        return format_value(hold, quantity, system, strip=True, with_unit=True)
    return _word(hold)


def _word(hold: LateralHold) -> str:
    return tr("fixed") if hold == "fixed" else tr("free")
