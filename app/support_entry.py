"""Supports as typed text: "free", "fixed", "spring 600 kN/mm" or "600 kN/mm", "stop + 0.5 mm, 600 kN/mm".

Numbers in it follow the grammar of every entry, with or without their unit; what is shown can be typed again.
A sign says the side of a stop; the English words are understood in every language, as the file's own.
"""

from __future__ import annotations

import re
from collections.abc import Callable
from typing import Final, Literal

from msgspec import UNSET, UnsetType

from app.entry import parse_entry, read_number
from app.units import Quantity, entry_text, format_value, symbol
from app.words import tr
from solver.model import AnySupport, FixedSupport, SpringSupport, StopSupport, UnitSystemName

_SIDES: Final[dict[str, Literal["plus", "minus"]]] = {"+": "plus", "-": "minus", "−": "minus"}
_WORD: Final = re.compile(r"\s*([^\W\d_]+)\s*(.*)", re.DOTALL)
_STOP: Final = re.compile(r"([+\-−])([^;,]*(?:[,.]\d[^;,]*)?)(?:[;,]\s+|;)?(.*)", re.DOTALL)


class SupportError(ValueError):
    """The text names no support; the message is the sentence to show beside it."""


Wording = Callable[[float, Quantity], str]


def parse_support(
    text: str, system: UnitSystemName, old: AnySupport | UnsetType = UNSET
) -> AnySupport | UnsetType:
    """The support a text names, UNSET for none; SupportError with a sentence where it names none.

    A number with its unit is a spring; a bare one is where `old`, what the cell holds, is a spring already.
    """
    if not text.strip():
        return UNSET
    found = _WORD.fullmatch(text)
    if found is None and (isinstance(old, SpringSupport) or read_number(text, "spring", system)[1]):
        return _spring(text, system)
    word, rest = (found[1].casefold(), found[2].strip()) if found else ("", "")
    kind = next((name for name in _WORDS for said in (name, tr(name)) if said.casefold() == word), None)
    if kind is None:
        raise SupportError(tr("a support is free, fixed or a spring, such as spring 600 kN/mm"))
    return _WORDS[kind](rest, system)


def _free(rest: str, _system: UnitSystemName) -> UnsetType:
    _nothing_behind(rest)
    return UNSET


def _fixed(rest: str, _system: UnitSystemName) -> FixedSupport:
    _nothing_behind(rest)
    return FixedSupport()


def _nothing_behind(rest: str) -> None:
    if rest:
        raise SupportError(tr("nothing stands behind free or fixed, here: {text}").format(text=rest))


def _spring(rest: str, system: UnitSystemName) -> SpringSupport:
    if not rest:
        raise SupportError(tr("a spring needs its stiffness, such as spring 600 kN/mm"))
    return SpringSupport(stiffness=_positive(rest, system))


def _stop(rest: str, system: UnitSystemName) -> StopSupport:
    found = _STOP.fullmatch(rest)
    if found is None:
        raise SupportError(tr("a stop needs its side and clearance, such as stop + 0.5 mm"))
    clearance = parse_entry(found[2].strip() or "0", "displacement", system)
    if clearance < 0:
        raise SupportError(tr("a clearance is at least 0"))
    stiffness = _positive(found[3], system) if found[3].strip() else UNSET
    return StopSupport(side=_SIDES[found[1]], clearance=clearance, stiffness=stiffness)


def _positive(text: str, system: UnitSystemName) -> float:
    stiffness = parse_entry(text.strip(), "spring", system)
    if stiffness <= 0:
        raise SupportError(tr("a stiffness is greater than 0"))
    return stiffness


_WORDS: Final[dict[str, Callable[[str, UnitSystemName], AnySupport | UnsetType]]] = {
    "free": _free,
    "fixed": _fixed,
    "spring": _spring,
    "stop": _stop,
}


def support_entry(support: AnySupport | UnsetType, system: UnitSystemName) -> str:
    """The text an editor starts from, with all digits; typed again it gives the same support."""
    return _worded(
        support, lambda value, quantity: f"{entry_text(value, quantity, system)} {symbol(quantity, system)}"
    )


def support_text(support: AnySupport | UnsetType, system: UnitSystemName) -> str:
    """The text for reading."""
    return _worded(
        support, lambda value, quantity: format_value(value, quantity, system, strip=True, with_unit=True)
    )


def _worded(support: AnySupport | UnsetType, number: Wording) -> str:
    match support:
        case FixedSupport():
            return tr("fixed")
        case SpringSupport(stiffness=stiffness):
            return f"{tr('spring')} {number(stiffness, 'spring')}"
        case StopSupport(side=side, clearance=clearance, stiffness=stiffness):
            sign = "+" if side == "plus" else "−"
            behind = "" if isinstance(stiffness, UnsetType) else f"; {number(stiffness, 'spring')}"
            return f"{tr('stop')} {sign} {number(clearance, 'displacement')}{behind}"
    return tr("free")
