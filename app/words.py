"""Words in the user's language: gettext for window, terminal and sheet alike, without Qt.

English is the language of the sources; catalogues of other languages lie in `app/locale`.
"""

from __future__ import annotations

import gettext as _gettext
from pathlib import Path

_DOMAIN = "barwright"
_LOCALE = Path(__file__).parent / "locale"
_catalogue: _gettext.NullTranslations = _gettext.NullTranslations()


def use_language(language: str) -> None:
    """Take words from the catalogue of `language` (such as "de"); English where there is none."""
    global _catalogue  # noqa: PLW0603 - one language for the process, as gettext has it
    _catalogue = _gettext.translation(_DOMAIN, _LOCALE, languages=[language], fallback=True)


def tr(message: str) -> str:
    """The message in the user's language."""
    return _catalogue.gettext(message)


def trn(one: str, many: str, count: int) -> str:
    """The message for `count` things, with {count} filled in."""
    return _catalogue.ngettext(one, many, count).format(count=count)


def later(message: str) -> str:
    """Mark a message in a table for the catalogues; `tr` turns it where it is shown."""
    return message
