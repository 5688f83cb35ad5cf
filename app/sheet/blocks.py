"""The building blocks of a sheet as JSON-able values: what `sheet.typ` lays out, without knowing the contents.

Every string in them is data: Typst never reads it as markup. `content` composes them; a test can read them.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Literal, TypeAlias

from app.sheet.member_figure import Figure

Value: TypeAlias = "str | int | float | bool | None | list[Value] | dict[str, Value]"
Block: TypeAlias = dict[str, Value]
Align: TypeAlias = Literal["left", "right"]
Weight: TypeAlias = Literal["plain", "quiet", "strong", "caution"]


def heading(text: str, level: int = 1) -> Block:
    """A heading that stays with what follows; levels from 1."""
    return {"kind": "heading", "text": text, "level": level}


def paragraph(text: str, weight: Weight = "plain") -> Block:
    """A paragraph; line breaks in it are kept."""
    return {"kind": "paragraph", "text": text, "weight": weight}


def bullets(items: Sequence[str]) -> Block:
    """A list."""
    return {"kind": "bullets", "items": list(items)}


def facts(pairs: Sequence[tuple[str, str]]) -> Block:
    """Names and values in two columns."""
    return {"kind": "facts", "rows": [[name, value] for name, value in pairs]}


def column(head: str, unit: str = "", align: Align = "right", *, wide: bool = False) -> dict[str, Value]:
    """A column of a table; `wide` takes what room is left."""
    return {"head": head, "unit": unit, "align": align, "wide": wide}


def table(
    title: str,
    columns: Sequence[dict[str, Value]],
    rows: Sequence[Sequence[str]],
    *,
    strong: Sequence[int] = (),
) -> Block:
    """A table with a title; its head is repeated on every page; `strong` are rows to stress."""
    return {
        "kind": "table",
        "title": title,
        "columns": list(columns),
        "rows": [list(row) for row in rows],
        "strong": list(strong),
    }


def picture(figure: Figure, caption: str) -> Block:
    """A figure with its caption."""
    return {
        "kind": "figure",
        "svg": figure.svg,
        "width": round(figure.width, 2),
        "height": round(figure.height, 2),
        "alt": figure.alt,
        "caption": caption,
    }


def formula(name: str, alt: str, **parts: str) -> Block:
    """A formula that `sheet.typ` knows by name, with the numbers to put in, and the same read aloud."""
    return {"kind": "formula", "name": name, "alt": alt, "parts": dict(parts)}
