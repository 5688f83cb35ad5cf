"""Words in the user's language: gettext for window, terminal and sheet alike, without Qt.

English is the language of the sources; catalogues of other languages lie in `app/locale`. One language holds
for the whole process and is chosen at its start: the one asked for, else that of the system.
"""

from __future__ import annotations

import locale
import os
from collections.abc import Iterator, Mapping
from contextlib import contextmanager
from functools import cache
from pathlib import Path
from typing import Final

from app.catalogue import Catalogue, read_catalogue

SOURCE: Final = "en"
LANGUAGES: Final[Mapping[str, str]] = {SOURCE: "English", "de": "Deutsch"}  # each by its own name
_DECIMAL_SIGNS: Final[Mapping[str, str]] = {"de": ","}
_VARIABLES: Final = ("LANGUAGE", "LC_ALL", "LC_MESSAGES", "LANG")  # in gettext's order
_LOCALE: Final = Path(__file__).parent / "locale"

_language = SOURCE
_catalogue = Catalogue()


def use_language(language: str) -> None:
    """Take words and decimal sign from `language`, a key of LANGUAGES, from now on."""
    global _language, _catalogue  # noqa: PLW0603 - one language for the process, as gettext has it
    _catalogue = Catalogue() if language == SOURCE else _read_once(language)
    _language = language


@contextmanager
def in_source_language() -> Iterator[None]:
    """Words of the sources meanwhile, for what programs read."""
    spoken = _language
    use_language(SOURCE)
    try:
        yield
    finally:
        use_language(spoken)


def catalogue_path(language: str) -> Path:
    """The catalogue of a language other than that of the sources."""
    return _LOCALE / language / "LC_MESSAGES" / "barwright.po"


def language() -> str:
    """The language in use."""
    return _language


def decimal_sign() -> str:
    """The sign between units and tenths in the language in use."""
    return _DECIMAL_SIGNS.get(_language, ".")


def system_language(environment: Mapping[str, str] = os.environ) -> str:
    """The language that the system is set to, English where it is none of ours."""
    said = next((environment[name] for name in _VARIABLES if environment.get(name)), None)
    wanted = [locale.getlocale()[0] or ""] if said is None else said.split(":")
    return next((code for code in map(_code, wanted) if code in LANGUAGES), SOURCE)


def _code(name: str) -> str:
    """The code of a locale's name: "de" for de_AT.UTF-8, de-CH or Windows's German_Germany."""
    word = name.replace("-", "_").partition("_")[0].partition(".")[0].casefold()
    return {"german": "de", "english": "en"}.get(word, word)


def tr(message: str) -> str:
    """The message in the user's language."""
    return _catalogue.text(message)


def in_every_language(message: str) -> tuple[str, ...]:
    """The message as it may stand in what others wrote, that of the sources first."""
    others = (_read_once(code).text(message) for code in LANGUAGES if code != SOURCE)
    return tuple(dict.fromkeys((message, *others)))


@cache
def _read_once(language: str) -> Catalogue:
    return read_catalogue(catalogue_path(language))


def trc(context: str, message: str) -> str:
    """The message where one English word means several things; the context tells the translator which."""
    return _catalogue.text(message, context)


def trn(one: str, many: str, count: int) -> str:
    """The message for `count` things, with {count} filled in."""
    return _catalogue.counted(one, many, count).format(count=count)


def later(message: str) -> str:
    """Mark a message in a table for the catalogues; `tr` turns it where it is shown."""
    return message
