"""Names in a row, for the sentences that stand for many."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Final

from app.words import tr

_MOST: Final = 6


def listed(names: Sequence[str]) -> str:
    """Names one after the other; of more than six the first five and how many more there are."""
    if len(names) <= _MOST:
        return ", ".join(names)
    more = len(names) - (_MOST - 1)
    return tr("{names} and {count} more").format(names=", ".join(names[: _MOST - 1]), count=more)
