"""What the pages of help say through marks of their own, so that it cannot go stale.

`{key:undo}` is the key of a command, `{menu:undo}` where the command stands, `{word:Show}` a word of the
window in the user's language; `## Heading {#name}` names a heading for links such as `reading.md#extremes`.
"""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import Final

_MARK: Final = re.compile(r"\{(key|menu|word):([^{}]+)\}")
_HEADING: Final = re.compile(r"^(#+) (.*?)(?: \{#([a-z-]+)\})?$", re.MULTILINE)
LINK: Final = re.compile(r"(?<!!)\[[^\]]*\]\(([^)]*)\)")
PICTURE: Final = re.compile(r"!\[([^\]]*)\]\(([^)]*)\)")

Filler = Callable[[str], str]


@dataclass(frozen=True, slots=True)
class Marked:
    """A page ready to be shown: Markdown, and which heading (counted from 0) a link's name leads to."""

    text: str
    anchors: Mapping[str, int]


def filled(text: str, fillers: Mapping[str, Filler]) -> Marked:
    """The page with its marks filled in; KeyError for a mark that names nothing."""
    return _with_anchors(_MARK.sub(lambda found: fillers[found[1]](found[2]), text))


def _with_anchors(text: str) -> Marked:
    anchors = {name: place for place, (_level, name) in enumerate(headings(text)) if name}
    return Marked(_HEADING.sub(r"\1 \2", text), anchors)


def headings(text: str) -> tuple[tuple[int, str], ...]:
    """Level and name of each heading; an empty name where it has none."""
    return tuple((len(found[1]), found[3] or "") for found in _HEADING.finditer(text))


def marks(text: str) -> tuple[tuple[str, str], ...]:
    """Kind and argument of each mark."""
    return tuple((found[1], found[2]) for found in _MARK.finditer(text))
