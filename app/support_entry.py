"""Supports as typed text: "free", "fixed", "spring 600 kN/mm" or "600 kN/mm", "stop + 0.5 mm, 600 kN/mm".

Several at one joint stand one after the other: "spring 600 kN/mm and stop + 0.5 mm", and "stop ± 0.5 mm" are
two, one to either side. Numbers in it follow the grammar of every entry, with or without their unit; what is
shown can be typed again. A sign says the side of a stop; the English words are understood in every language,
as the file's own.
"""

from __future__ import annotations

import re
from collections.abc import Callable
from itertools import pairwise
from typing import Final, Literal, TypeAlias

from msgspec import UNSET, UnsetType
from msgspec.structs import replace

from app.entry import EntryError, factor_of, parse_entry, read_number
from app.units import Quantity, entry_text, format_value, symbol
from app.words import tr
from solver.model import AnySupport, FixedSupport, SpringSupport, StopSupport, UnitSystemName

Supports: TypeAlias = tuple[AnySupport, ...]  # of one joint; none where it is free

_SIDES: Final[dict[str, tuple[Literal["plus", "minus"], ...]]] = {
    "+": ("plus",),
    "-": ("minus",),
    "−": ("minus",),
    "±": ("plus", "minus"),
}
_WORD: Final = re.compile(r"\s*([^\W\d_]+)\s*(.*)", re.DOTALL)
_STOP: Final = re.compile(r"(\+[-−]|[+\-−±])([^;,]*(?:[,.]\d[^;,]*)?)(?:[;,]\s+|;)?(.*)", re.DOTALL)


class SupportError(ValueError):
    """The text names no support; the message is the sentence to show beside it."""


Wording = Callable[[float, Quantity], str]


def parse_supports(text: str, system: UnitSystemName, old: Supports = ()) -> Supports:
    """The supports that a text names, none for a free joint; SupportError where it names nothing of the kind.

    `old` is what the cell holds: where that is one spring or one stop, a bare number is its stiffness or its
    clearance. A number with its unit is a spring in any case.
    """
    parts = _parted(text)
    if len(parts) < 2:
        return _parse_one(text, system, old)
    found: list[AnySupport] = []
    for part in parts:
        named = _parse_one(part, system, ())
        if not named:
            raise SupportError(_NOT_WITH_OTHERS[bool(part.strip())]())
        found += named
    return tuple(found)


_NOT_WITH_OTHERS: Final[dict[bool, Callable[[], str]]] = {
    True: lambda: tr("a joint that is free has no other support"),
    False: lambda: tr("a support is missing beside “and”"),
}


def _parted(text: str) -> list[str]:
    """The text cut where another support begins: at "and", and at a semicolon or comma before its word."""
    words = "|".join(re.escape(said) for name in _WORDS for said in (name, tr(name)))
    ands = "|".join(re.escape(said) for said in ("and", tr("and")))
    cut = rf"\s+(?:{ands})(?:\s+|$)|^(?:{ands})\s+|\s*&\s*|\s*[;,]\s*(?=(?:{words})(?:[^\w]|$))"
    return re.split(cut, text, flags=re.IGNORECASE)


def _parse_one(text: str, system: UnitSystemName, old: Supports) -> Supports:
    """What is named without "and"."""
    if not text.strip():
        return ()
    found = _WORD.fullmatch(text)
    if found is None and len(old) == 1 and isinstance(old[0], StopSupport) and _is_length(text, system):
        return (replace(old[0], clearance=_clearance(text, system)),)
    if found is None and (_are_one_spring(old) or read_number(text, "spring", system)[1]):
        return _spring(text, system)
    word, rest = (found[1].casefold(), found[2].strip()) if found else ("", "")
    kind = next((name for name in _WORDS for said in (name, tr(name)) if said.casefold() == word), None)
    if kind is None:
        raise SupportError(_what_it_is())
    return _WORDS[kind](rest, system)


def _what_it_is() -> str:
    return tr("a support is free, fixed, a spring such as spring 600 kN/mm, or a stop such as stop + 0.5 mm")


def _are_one_spring(supports: Supports) -> bool:
    return len(supports) == 1 and isinstance(supports[0], SpringSupport)


def _is_length(text: str, system: UnitSystemName) -> bool:
    """Whether a number has the unit of a length, or none."""
    try:
        unit_text = read_number(text, "displacement", system)[1]
        return not unit_text or bool(factor_of(unit_text, "displacement", system))
    except EntryError:
        return False


def _free(rest: str, _system: UnitSystemName) -> Supports:
    _nothing_behind(rest)
    return ()


def _fixed(rest: str, _system: UnitSystemName) -> Supports:
    _nothing_behind(rest)
    return (FixedSupport(),)


def _nothing_behind(rest: str) -> None:
    if rest:
        raise SupportError(tr("nothing stands behind free or fixed, here: {text}").format(text=rest))


def _spring(rest: str, system: UnitSystemName) -> Supports:
    if not rest:
        raise SupportError(tr("a spring needs its stiffness, such as spring 600 kN/mm"))
    return (SpringSupport(stiffness=_positive(rest, system)),)


def _stop(rest: str, system: UnitSystemName) -> Supports:
    found = _STOP.fullmatch(rest)
    if found is None:
        raise SupportError(tr("a stop needs its side and clearance, such as stop + 0.5 mm"))
    clearance = _clearance(found[2].strip() or "0", system)
    stiffness = _positive(found[3], system) if found[3].strip() else UNSET
    sides = _SIDES["±" if len(found[1]) == 2 else found[1]]
    return tuple(StopSupport(side=side, clearance=clearance, stiffness=stiffness) for side in sides)


def _clearance(text: str, system: UnitSystemName) -> float:
    clearance = parse_entry(text, "displacement", system)
    if clearance < 0:
        raise SupportError(tr("a clearance is at least 0"))
    return clearance


def _positive(text: str, system: UnitSystemName) -> float:
    stiffness = parse_entry(text.strip(), "spring", system)
    if stiffness <= 0:
        raise SupportError(tr("a stiffness is greater than 0"))
    return stiffness


_WORDS: Final[dict[str, Callable[[str, UnitSystemName], Supports]]] = {
    "free": _free,
    "fixed": _fixed,
    "spring": _spring,
    "stop": _stop,
}


def supports_entry(supports: Supports, system: UnitSystemName) -> str:
    """The text an editor starts from, with all digits; typed again it gives the same supports."""
    return _worded(
        supports, lambda value, quantity: f"{entry_text(value, quantity, system)} {symbol(quantity, system)}"
    )


def supports_text(supports: Supports, system: UnitSystemName) -> str:
    """The text for reading."""
    return _worded(
        supports, lambda value, quantity: format_value(value, quantity, system, strip=True, with_unit=True)
    )


def support_text(support: AnySupport, system: UnitSystemName) -> str:
    """The text of one support for reading."""
    return supports_text((support,), system)


def support_name(support: AnySupport, system: UnitSystemName) -> str:
    """What one support is called beside what it does: a stop by its side and clearance alone."""
    is_stop = isinstance(support, StopSupport)
    return support_text(replace(support, stiffness=UNSET) if is_stop else support, system)


def _worded(supports: Supports, number: Wording) -> str:
    """All of them; two stops alike but for their side become one with both signs."""
    texts, taken = [], False
    for support, after in pairwise((*supports, None)):
        if taken or support is None:
            taken = False
            continue
        taken = are_opposite(support, after)
        texts.append(_one_worded(support, number, both=taken))
    return f" {tr('and')} ".join(texts) or tr("free")


def are_opposite(one: AnySupport, other: AnySupport | None) -> bool:
    """Whether these are a stop to the plus side and the like to the minus side."""
    return isinstance(one, StopSupport) and one.side == "plus" and replace(one, side="minus") == other


def _one_worded(support: AnySupport, number: Wording, *, both: bool = False) -> str:
    match support:
        case FixedSupport():
            return tr("fixed")
        case SpringSupport(stiffness=stiffness):
            return f"{tr('spring')} {number(stiffness, 'spring')}"
        case StopSupport(side=side, clearance=clearance, stiffness=stiffness):
            sign = "±" if both else "+" if side == "plus" else "−"
            behind = "" if isinstance(stiffness, UnsetType) else f"; {number(stiffness, 'spring')}"
            return f"{tr('stop')} {sign} {number(clearance, 'displacement')}{behind}"
