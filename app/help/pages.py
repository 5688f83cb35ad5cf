"""The pages of help in their order, and their texts as Markdown, a folder for each language.

A page is a file of its own so that it can be read and translated as a text. Where a language has none, the
English page is shown.
"""

from __future__ import annotations

from pathlib import Path
from typing import Final

from app.words import language, later

FALLBACK: Final = "en"
KEYS: Final = "keys"  # made from the table of commands, in every language
PAGES: Final[tuple[tuple[str, str], ...]] = (
    ("entering", later("Entering a member")),
    ("shaping", later("Shaping it on the drawing")),
    ("loads", later("Supports, loads and limits")),
    ("reading", later("Reading the results")),
    ("guarantee", later("What the solver guarantees")),
    ("limits", later("Limits of validity")),
    (KEYS, later("Keys")),
)
_FOLDER: Final = Path(__file__).parent


def languages() -> tuple[str, ...]:
    """The languages that have pages."""
    return tuple(sorted(path.name for path in _FOLDER.iterdir() if (path / "entering.md").is_file()))


def page_path(page: str, of_language: str) -> Path:
    """The file of a page."""
    return _FOLDER / of_language / f"{page}.md"


def read_page(page: str) -> str:
    """A written page in the user's language, else in English; KeyError for a page that is not written."""
    if page == KEYS or page not in dict(PAGES):
        raise KeyError(page)
    path = page_path(page, language())
    return (path if path.is_file() else page_path(page, FALLBACK)).read_text("utf-8")
