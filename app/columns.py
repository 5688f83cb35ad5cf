"""Plain text in columns for the terminal: the first to the left, numbers to the right, wide tables split."""

from __future__ import annotations

import re
from collections.abc import Sequence

WIDTH = 100  # characters a line; a table that is wider goes on in a further part below
GAP = "  "
_BREAKS = re.compile(r"[\n\r\v\f\x1c-\x1e\x85\u2028\u2029]+")


def one_line(text: str) -> str:
    """The text without line breaks: words of a file must not look like lines of ours."""
    return _BREAKS.sub(" ", text).strip()


def table(head: Sequence[str], rows: Sequence[Sequence[str]], width: int = WIDTH) -> str:
    """A table as lines, each ended. Rows are as long as `head`; the first column recurs in every part."""
    columns = [list(map(one_line, column)) for column in zip(head, *rows, strict=True)]
    parts = _parts([max(map(len, column)) for column in columns], width)
    return "\n".join(_part([columns[0], *(columns[i] for i in part)]) for part in parts)


def _parts(widths: Sequence[int], width: int) -> list[list[int]]:
    """Which columns beside the first stand together; at least one in each part."""
    parts: list[list[int]] = [[]]
    used = widths[0]
    for index, needed in enumerate(widths[1:], 1):
        if parts[-1] and used + len(GAP) + needed > width:
            parts.append([])
            used = widths[0]
        parts[-1].append(index)
        used += len(GAP) + needed
    return parts


def _part(columns: Sequence[Sequence[str]]) -> str:
    """Columns of equal height as lines."""
    widths = [max(map(len, column)) for column in columns]
    return "".join(_line(row, widths) + "\n" for row in zip(*columns, strict=True))


def _line(row: Sequence[str], widths: Sequence[int]) -> str:
    first, *others = row
    cells = [first.ljust(widths[0]), *(cell.rjust(w) for cell, w in zip(others, widths[1:], strict=True))]
    return GAP.join(cells).rstrip()
