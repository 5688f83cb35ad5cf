"""A pasted block whose first row names the columns, in any order, with or without units.

Titles are known in every language of the program: "Length", "Length (mm)", "Length [mm]", "Length, mm",
"Length mm", or with the units in a row of their own. A unit goes to each number of its column that has none,
so that the cell reads it as if it had been typed. A unit of another quantity is refused: the numbers below
it would be taken for something else. Blank rows and a title above the headings are passed over.
"""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from typing import Final

from app.entry import EntryError, factor_of
from app.gui.tables.column import Column, Sight
from app.gui.tables.reasons import NotTaken
from app.unit_names import UnknownUnitError, unit_factor
from app.units import QUANTITIES, symbol
from app.words import in_every_language, tr

_NUMBER: Final = re.compile(r"[-+−]?(?:[0-9]+[.,]?[0-9]*|[.,][0-9]+)(?:\s*[^\W\d_]{1,3})?")
_BRACKETS: Final = re.compile(r"[\[(](.*)[\])]")
_ARROW: Final = re.compile(r"(->|→)")
MOST_ABOVE: Final = 10  # rows above the first data, blank ones and a title among them


@dataclass(frozen=True, slots=True)
class Heading:
    """A column that was named, and the unit of its numbers; empty where they are in the display unit."""

    column: int
    unit: str


@dataclass(frozen=True, slots=True)
class HeadedBlock:
    """The rows below the headings, each text by its column, and the headings that this table has not."""

    rows: tuple[Mapping[int, str], ...]
    unknown: tuple[str, ...]


def headed_block(
    block: Sequence[Sequence[str]], columns: Sequence[Column], sight: Sight
) -> HeadedBlock | None:
    """The block by its headings; None where it has none. NotTaken for a unit that cannot be, or no rows."""
    at = _row_of_headings(block, columns)
    if at is None:
        return None
    first, below = block[at], block[at + 1 :]
    alone = sum(map(bool, _headings(first, columns))) == 1
    if alone and not below:
        return None  # a single word may be an entry
    if not alone and not any(map(_is_filled, below)):
        raise NotTaken(tr("nothing was pasted: there is nothing below the headings"))
    found, unknown = _each_once(_headings(first, columns), first)
    units = _unit_row(below[0], found, columns)
    if units is not None:
        below = below[1:]
        found = [h and Heading(h.column, h.unit or unit) for h, unit in zip(found, units, strict=True)]
    for heading, text in zip(found, first, strict=True):
        _refuse_other_quantity(heading, text, columns, sight)
    return HeadedBlock(tuple(_row(texts, found, columns, sight) for texts in below), unknown)


def _row_of_headings(block: Sequence[Sequence[str]], columns: Sequence[Column]) -> int | None:
    """The first row that is filled, or below a title of the whole block the next one."""
    filled = [at for at, texts in enumerate(block[:MOST_ABOVE]) if _is_filled(texts)]
    for rank, at in enumerate(filled[:2]):
        count = sum(map(bool, _headings(block[at], columns)))
        if count > rank and not any(_NUMBER.fullmatch(text.strip()) for text in block[at]):
            return at
        if sum(map(bool, map(str.strip, block[at]))) > 1:
            return None
    return None


def _is_filled(texts: Sequence[str]) -> bool:
    return any(text.strip() for text in texts)


def _headings(texts: Sequence[str], columns: Sequence[Column]) -> list[Heading | None]:
    return [_heading(text, columns) for text in texts]


def _heading(text: str, columns: Sequence[Column]) -> Heading | None:
    """The column with the longest title that the text begins with, where the rest is nothing or a unit."""
    words = " ".join(text.split())
    titles = ((t, i) for i, column in enumerate(columns) for t in _titles(column))
    for title, place in sorted(titles, key=lambda pair: -len(pair[0])):
        if words.lower().startswith(title.lower()):
            unit = _unit_behind(words[len(title) :])
            return None if unit is None else Heading(place, unit)
    return None


def _titles(column: Column) -> tuple[str, ...]:
    """A column's title in every language; the user's own word is in none."""
    return (column.title,) if column.named_by_user else in_every_language(column.title)


def _unit_behind(rest: str) -> str | None:
    """The unit behind a title, "" for none; None where the text goes on with other words."""
    if not rest.strip(" -–"):
        return ""
    if rest[0] not in " ,:/([":
        return None
    plain = rest.strip(" ,:/").removeprefix("in ")
    if bracketed := _BRACKETS.fullmatch(plain):
        return bracketed[1].strip(" -–")
    return plain if _is_unit(plain) else None


def _is_unit(text: str) -> bool:
    """Whether it is a unit of anything."""
    for quantity in QUANTITIES:
        try:
            unit_factor(text, quantity)
        except UnknownUnitError:
            continue
        return True
    return False


def _each_once(
    found: list[Heading | None], texts: Sequence[str]
) -> tuple[list[Heading | None], tuple[str, ...]]:
    """The first heading of each column, and the texts that name none or one that was named before."""
    kept: list[Heading | None] = []
    unknown: list[str] = []
    for heading, text in zip(found, texts, strict=True):
        again = heading is not None and heading.column in {h.column for h in kept if h is not None}
        kept.append(None if again else heading)
        if text.strip() and kept[-1] is None:
            unknown.append(" ".join(text.split()))
    return kept, tuple(unknown)


def _unit_row(
    texts: Sequence[str], found: Sequence[Heading | None], columns: Sequence[Column]
) -> list[str] | None:
    """The units of the columns where the row holds units and nothing else."""
    full = [*texts, *[""] * (len(found) - len(texts))][: len(found)]
    units = []
    for text, heading in zip(full, found, strict=True):
        plain = text.strip()
        plain = (bracketed[1] if (bracketed := _BRACKETS.fullmatch(plain)) else plain).strip(" -–")
        measured = heading is not None and columns[heading.column].quantity is not None
        if plain and (not _is_unit(plain) if measured else heading is not None):
            return None
        units.append(plain if measured else "")
    return units if any(units) else None


def _refuse_other_quantity(
    heading: Heading | None, text: str, columns: Sequence[Column], sight: Sight
) -> None:
    quantity = columns[heading.column].quantity if heading is not None else None
    if heading is None or quantity is None or not heading.unit:
        return
    try:
        factor_of(heading.unit, quantity, sight.system)
    except EntryError as error:
        said = tr("nothing was pasted, because of the heading “{heading}”: {reason}")
        raise NotTaken(said.format(heading=" ".join(text.split()), reason=error.sentence)) from None


def _row(
    texts: Sequence[str], found: Sequence[Heading | None], columns: Sequence[Column], sight: Sight
) -> Mapping[int, str]:
    """The texts of a row by column, with the headings' units."""
    pairs = zip(found, texts, strict=False)
    return {h.column: _with_unit(text, h, columns[h.column], sight) for h, text in pairs if h is not None}


def _with_unit(text: str, heading: Heading, column: Column, sight: Sight) -> str:
    """The text with the unit behind each number that has none; that of an area is the unit's square."""
    quantity, plain = column.quantity, text.strip()
    if quantity is None or heading.unit in ("", symbol(quantity, sight.system)):
        return text
    if quantity == "size":  # a section: one unit at its end counts for all dimensions
        return _ended(plain, f"{heading.unit}²" if plain[:1] in "aA" else heading.unit)
    return "".join(p if _ARROW.fullmatch(p) else _ended(p.strip(), heading.unit) for p in _ARROW.split(plain))


def _ended(text: str, unit: str) -> str:
    return f"{text} {unit}" if text and (text[-1].isdigit() or text[-1] in ".,)") else text
