"""Blocks of cells as tab-separated text, to and from spreadsheets; what is copied can be pasted again."""

from __future__ import annotations

import csv
import io
from collections.abc import Sequence


def block_text(rows: Sequence[Sequence[str]]) -> str:
    """The block as spreadsheets exchange it."""
    out = io.StringIO()
    csv.writer(out, "excel-tab", lineterminator="\n").writerows(rows)
    return out.getvalue().removesuffix("\n")


def block_of(text: str) -> list[list[str]]:
    """The block in a copied text; empty where there is none."""
    plain = text.removeprefix("\ufeff").replace("\r\n", "\n").replace("\r", "\n").removesuffix("\n")
    try:
        return [row or [""] for row in csv.reader(io.StringIO(plain), "excel-tab")] if plain else []
    except csv.Error:  # a cell beyond all measure, as an unclosed quote makes of the rest of a long text
        return [line.split("\t") for line in plain.split("\n")]


def tiled(block: Sequence[Sequence[str]], rows: int, columns: int) -> list[list[str]]:
    """The block repeated over the selection where that is a multiple of it, else once."""
    height, width = len(block), max(len(row) for row in block)
    down = rows if rows % height == 0 else height
    across = columns if columns % width == 0 else width
    full = [[*row, *[""] * (width - len(row))] for row in block]
    return [[full[r % height][c % width] for c in range(across)] for r in range(down)]
