"""Numbers that a person or another program may have meant as thousands: "1,500" is read as 1.5.

One sign is the decimal sign and none groups thousands, in whatever is typed. A spreadsheet may write it
otherwise, and a length would be a thousandth of what it was; so it is said where that may be so.
"""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence
from typing import Final

from app.numerals import localised
from app.units import Quantity, symbol
from app.words import decimal_sign, tr
from solver.model import UnitSystemName

_TYPED: Final = re.compile(r"(?<![0-9.,])([1-9][0-9]{0,2})[.,]([0-9]{3})(?![0-9.,eE])\s*([^\W\d_]*)")
_FIRST_NAME: Final = re.compile(r"[^\W\d_]*")
_GROUPED: Final = re.compile(r"[-+−]?[1-9][0-9]{0,2}([.,])[0-9]{3}(?![0-9.,])(?:\s*[^\W\d_]\S*)?")
_SIGNS: Final = re.compile(r"[0-9]([.,])[0-9]")


def thousands_note(block: Sequence[Sequence[str]]) -> str:
    """A line on the first number that looks like thousands; empty where none does.

    That is one with three digits behind a sign that is not the decimal sign of the language in use, or while
    the block holds numbers with the other sign.
    """
    mixed = len({sign for row in block for text in row for sign in _SIGNS.findall(text)}) > 1
    found = next((text for text, sign in _grouped(block) if mixed or sign != decimal_sign()), None)
    if found is None:
        return ""
    digits = re.sub(r"[^0-9.,]", "", found).replace(",", ".")
    said = tr("“{text}” was read as {number}: no sign groups thousands; check the pasted numbers")
    return said.format(text=found, number=localised(f"{float(digits):g}"))


def typed_note(text: str, quantity: Quantity, system: UnitSystemName) -> str:
    """A line on a typed number that may have been meant as thousands; empty where there is none.

    A unit of its own, other than the cell's, tells that the number was thought of in that unit.
    """
    unit = symbol(quantity, system)
    for match in _TYPED.finditer(text):
        whole, part, named = match.groups()
        if not named or named == _FIRST_NAME.match(unit)[0]:  # type: ignore[index]  # it matches anything
            said = tr("“{text}” is read as {number}; if thousands are meant, type {thousands}")
            number = localised(f"{float(f'{whole}.{part}'):g}")
            found = match[0].removesuffix(named).strip()
            return said.format(text=found, number=f"{number} {unit}".strip(), thousands=whole + part)
    return ""


def _grouped(block: Sequence[Sequence[str]]) -> Iterator[tuple[str, str]]:
    for row in block:
        for text in row:
            if match := _GROUPED.fullmatch(text.strip()):
                yield text.strip(), match[1]
