"""The building blocks of a sheet as JSON-able values, which `sheet.typ` lays out whatever they say.

Every string in them is data: Typst never reads it as markup. `content` composes them; a test can read them.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Literal, TypeAlias

from app.sheet.member_figure import Figure

Value: TypeAlias = "str | int | float | bool | list[Value] | dict[str, Value] | None"
Block: TypeAlias = dict[str, Value]
Align: TypeAlias = Literal["left", "right"]
Weight: TypeAlias = Literal["plain", "lead", "quiet", "caution"]


def heading(text: str, level: int = 1) -> Block:
    """A heading that stays with what follows; levels from 1."""
    return {"kind": "heading", "text": text, "level": level}


def paragraph(text: str, weight: Weight = "plain") -> Block:
    """A paragraph; line breaks in it are kept; a `lead` stays with what follows."""
    return {"kind": "paragraph", "text": text, "weight": weight}


def bullets(items: Sequence[str]) -> Block:
    """A list."""
    return {"kind": "bullets", "items": list(items)}


def facts(pairs: Sequence[tuple[str, str]]) -> Block:
    """Names and values in two columns."""
    return {"kind": "facts", "rows": [[name, value] for name, value in pairs]}


def column(head: str, unit: str = "", align: Align = "right") -> dict[str, Value]:
    """A column of a table with its unit under its head."""
    return {"head": head, "unit": unit, "align": align}


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


def formula(label: str, name: str, alt: str, **parts: str) -> dict[str, Value]:
    """A formula that `sheet.typ` knows by name, with the numbers to put in; `alt` is the same read aloud."""
    return {"label": label, "name": name, "alt": alt, "parts": dict(parts)}


def formulas(items: Sequence[dict[str, Value]]) -> Block:
    """Formulas one below the other."""
    return {"kind": "formulas", "items": list(items)}
