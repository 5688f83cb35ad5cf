"""What reaches paper: every character either has a glyph in the embedded fonts or is shown as its number."""

from __future__ import annotations

import json
import re

import hypothesis.strategies as st
import pytest
import typst
from hypothesis import given

from app.sheet.printable import (
    FIGURE_TABLE,
    TABLE,
    breakable,
    printable,
    printable_in_figure,
    shortened,
)

_BLOCKS = [*range(0x20, 0x3000), *range(0xFB00, 0xFFFE)]
_MARK = "#ff4136"
_MISSING = 0x1F600


def glyphs(characters: list[str], style: str) -> dict[str, str]:
    """For each character the glyph that Typst's fonts draw, as a fingerprint of its outline."""
    source = (
        "#set page(width: 3000pt, height: auto)\n"
        f'#set text(font: ("Libertinus Serif", "DejaVu Sans Mono"), {style})\n'
        '#for c in json("d.json") [#box(rect(width: 1pt, height: 1pt, fill: red)) #box(str.from-unicode(c)) ]'
    )
    codes = [_MISSING, *map(ord, characters)]
    files = {"main.typ": source.encode(), "d.json": json.dumps(codes).encode()}
    svg = typst.compile(files, format="svg", ignore_system_fonts=True).decode()
    parts = re.split(f'fill="{_MARK}"', svg.partition("<defs>")[0])[1:]
    found = ["".join(re.findall(r'href="#(g[0-9A-F]+)"', part)) for part in parts]
    return dict(zip([chr(_MISSING), *characters], found, strict=True))


@pytest.mark.parametrize("style", ["size: 9pt", 'weight: "bold"'])  # the styles that users' texts are set in
def test_every_character_of_the_table_has_a_glyph(style: str) -> None:
    characters = [chr(code) for code in _BLOCKS if chr(code) in TABLE and chr(code).strip()]
    assert len(characters) > 3000
    drawn = glyphs(characters, style)
    missing = drawn.pop(chr(_MISSING))
    assert [c for c, glyph in drawn.items() if not glyph or glyph == missing] == []


def test_what_figures_may_hold_is_in_the_table_too() -> None:
    assert [code for code in _BLOCKS if chr(code) in FIGURE_TABLE and chr(code) not in TABLE] == []


@pytest.mark.parametrize(
    ("text", "shown"),
    [
        ("Gate 7 #b *x* <y> $z$ \\ \"'", "Gate 7 #b *x* <y> $z$ \\ \"'"),
        ("⌀75→⌀52 ▭20×30 σ ≤ 1·10⁻⁹", "⌀75→⌀52 ▭20×30 σ ≤ 1·10⁻⁹"),
        ("\U0001f600", "[U+1F600]"),
        ("a\x00b\x1b", "a[U+0000]b[U+001B]"),
        ("a\u202eb", "a[U+202E]b"),
        ("e\u0301", "é"),
        ("x\u0301", "x[U+0301]"),
        ("漢", "[U+6F22]"),
        ("line\nbreak\ttab", "line\nbreak tab"),
    ],
)
def test_what_cannot_be_shown_is_shown_as_its_number(text: str, shown: str) -> None:
    assert printable(text) == shown


def test_drafting_signs_stay_in_figures_and_give_way_to_accents() -> None:
    assert printable_in_figure("⌀75→⌀52 ▭20×30") == "⌀75→⌀52 ▭20×30"
    assert printable_in_figure("⌀75 Träger") == "ø75 Träger"
    assert printable_in_figure("אב") == "[U+05D0][U+05D1]"


def test_a_number_behind_right_to_left_letters_keeps_its_place() -> None:
    assert printable("אב: −129 MPa") == "אב\u200e: −129 MPa"


@given(st.text())
def test_nothing_is_dropped(text: str) -> None:
    seen = re.sub(r"\[U\+[0-9A-F]{4,6}\]", "#", printable(text.replace("[", "(")))
    assert len(seen.replace("\u200e", "")) >= len(set(seen) - {"\u200e"})
    assert all(c in TABLE or c in "\n\u200e" for c in printable(text))
    assert all(c in FIGURE_TABLE or c in "⌀▭" for c in printable_in_figure(text))


@given(st.text(alphabet="ab c", max_size=80), st.integers(6, 40))
def test_breaks_leave_the_text_and_no_long_run(text: str, longest: int) -> None:
    broken = breakable(text, longest)
    assert broken.replace("\u200b", "") == text
    assert max(map(len, re.split(r"[\s\u200b]", broken))) <= longest


def test_a_long_text_is_cut_with_an_ellipsis() -> None:
    assert shortened("a  b\nc", 5) == "a b c"
    assert shortened("abcdef", 5) == "abcd…"
