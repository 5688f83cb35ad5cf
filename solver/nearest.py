"""The valid name most like a given one, for messages that suggest what was meant."""

from __future__ import annotations

from collections.abc import Iterable
from difflib import get_close_matches

_MOST_NAMES = 200  # comparing is slow; a list longer than this gets no suggestion
_LONGEST = 100


def nearest(given: str, names: Iterable[str]) -> str | None:
    """The name that `given` was most likely meant to be, or None where none is like it."""
    known = [name for name in names if isinstance(name, str)]
    if len(known) > _MOST_NAMES or len(given) > _LONGEST:
        return None
    by_fold = {name.casefold().strip(): name for name in reversed(known)}
    close = get_close_matches(given.casefold().strip(), by_fold, n=1)
    return by_fold[close[0]] if close else None
