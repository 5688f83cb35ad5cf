"""Reads a gettext catalogue as translators write it, the .po file itself.

The usual compiled .mo was rejected: a clone would need a build step, or a binary file that nobody can merge
and that may be older than its source. Reading the text takes some milliseconds. Only what gettext's own tools
write is understood; messages marked fuzzy are left out, as they are everywhere.
"""

from __future__ import annotations

import re
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass, field
from gettext import c2py
from pathlib import Path
from typing import Final

_LINE: Final = re.compile(r'(?:(msgctxt|msgid|msgid_plural|msgstr)(?:\[(\d)\])? )?"(.*)"')
_ESCAPED: Final = re.compile(r"\\(.)")
_ESCAPES: Final[Mapping[str, str]] = {"n": "\n", "t": "\t", "r": "\r"}
_PLURAL: Final = re.compile(r"plural=([^;\n]+);")

_Entry = dict[str, str]  # the keyword, with its number where it has one → its text
Key = tuple[str, str]  # context (empty for none) and message


@dataclass(frozen=True)
class Catalogue:
    """The words of one language; a message that it does not hold stays as it is."""

    messages: Mapping[Key, tuple[str, ...]] = field(default_factory=dict)
    plural: Callable[[int], int] = field(default=lambda count: int(count != 1))

    def text(self, message: str, context: str = "") -> str:
        """The message in this language."""
        found = self.messages.get((context, message))
        return found[0] if found else message

    def counted(self, one: str, many: str, count: int) -> str:
        """The message for so many things."""
        found = self.messages.get(("", one))
        return found[self.plural(count)] if found else (one if count == 1 else many)


def read_catalogue(path: Path) -> Catalogue:
    """The catalogue of a .po file."""
    messages: dict[Key, tuple[str, ...]] = {}
    header = ""
    for entry in _entries(path.read_text("utf-8")):
        texts = tuple(text for keyword, text in sorted(entry.items()) if keyword.startswith("msgstr"))
        if not entry["msgid"]:
            header = texts[0]
        elif all(texts):
            messages[entry.get("msgctxt", ""), entry["msgid"]] = texts
    rule = _PLURAL.search(header)
    return Catalogue(messages, c2py(rule[1]) if rule else Catalogue().plural)


def _entries(text: str) -> Iterator[_Entry]:
    """The entries of a catalogue in their order; blank lines stand between them."""
    for block in re.split(r"\n{2,}", text):
        lines = block.splitlines()
        entry = _entry(lines)
        if "msgid" in entry and not any(line.startswith("#,") and "fuzzy" in line for line in lines):
            yield entry


def _entry(lines: list[str]) -> _Entry:
    """One entry; a line without a keyword goes on with the one before."""
    entry: _Entry = {}
    keyword = ""
    for line in lines:
        if not (found := _LINE.fullmatch(line)):
            continue  # a comment, an obsolete message
        keyword = f"{found[1]}{found[2] or ''}" if found[1] else keyword
        entry[keyword] = entry.get(keyword, "") + _ESCAPED.sub(_unescaped, found[3])
    return entry


def _unescaped(found: re.Match[str]) -> str:
    return _ESCAPES.get(found[1], found[1])
