"""Bonded parts as typed text: "Steel A 1200; Copper r20x3", each its material and then its section.

A part names one of the project's materials or a typical one, then a section that says its shape, since a bare
number could belong to the name: "Steel A 1200" is 1200 of steel, also beside a material called "Steel A".
"""

from __future__ import annotations

import re
from collections.abc import Callable, Iterable, Sequence
from typing import Final

from app.entry import refusal
from app.section_entry import parse_section, section_label, section_text
from solver.model import AnySection, BondedPart, UnitSystemName
from solver.nearest import nearest

SEPARATOR: Final = ";"
_SHAPED: Final = re.compile(r"\s*[⌀øØ∅dD▭rRaA]")
_NAME: Final = re.compile(r"[^;]*?(?=\s+(?:[⌀øØ∅dD▭rRaA]\s*)?[\d.,(]|;|$)")


def parse_bonded(
    text: str, system: UnitSystemName, names: Sequence[str], old: Sequence[BondedPart] = ()
) -> tuple[BondedPart, ...]:
    """The parts that a text names, none for an empty one; EntryError where it cannot be read.

    `names` are the materials there are; `old` is what the text replaces: a part of the same material keeps
    what no text says of its section.
    """
    found: list[BondedPart] = []
    rest = text.strip().removesuffix(SEPARATOR)
    while rest.strip():
        name, rest = _material(rest.lstrip(), names)
        own, _, rest = rest.partition(SEPARATOR)
        found.append(BondedPart(name, _section(own, name, system, _like(old, len(found), name))))
    return tuple(found)


def _material(text: str, names: Sequence[str]) -> tuple[str, str]:
    """The name that the text begins with, the longest behind which a section can stand, and what follows."""
    begun = [name for name in sorted(names, key=len, reverse=True) if _begins(text, name)]
    for name in begun:
        if _SHAPED.match(text[len(name) :]):
            return name, text[len(name) :]
    if begun:
        return begun[0], text[len(begun[0]) :]
    found = _NAME.match(text)
    given = (found[0] if found else text).strip()
    close = nearest(given, names)
    if close is None:
        raise refusal("part_unknown", found=given[:30])
    raise refusal("part_near", found=given[:30], nearest=close)


def _begins(text: str, name: str) -> bool:
    """Whether the text begins with the name as a whole word, in small or capital letters."""
    after = text[len(name) : len(name) + 1]
    return text[: len(name)].casefold() == name.casefold() and (not after or after in f" \t\u00a0{SEPARATOR}")


def _section(text: str, name: str, system: UnitSystemName, old: AnySection | None) -> AnySection:
    if not text.strip():
        raise refusal("part_section", name=name)
    if not _SHAPED.match(text):
        raise refusal("part_shape", found=text.strip()[:30])
    return parse_section(text.strip(), system, old)


def _like(old: Sequence[BondedPart], number: int, name: str) -> AnySection | None:
    """The section that a part replaces: the one in its place, if of the same material."""
    same = number < len(old) and old[number].material == name
    return old[number].section if same else None


def bonded_text(parts: Iterable[BondedPart], system: UnitSystemName) -> str:
    """The text that `parse_bonded` reads back to the same parts, to the last digit."""
    return _worded(parts, lambda section: section_text(section, system))


def bonded_label(parts: Iterable[BondedPart], system: UnitSystemName) -> str:
    """The same for reading: long numbers rounded."""
    return _worded(parts, lambda section: section_label(section, system))


def _worded(parts: Iterable[BondedPart], section: Callable[[AnySection], str]) -> str:
    return f"{SEPARATOR} ".join(f"{part.material} {section(part.section)}" for part in parts)
