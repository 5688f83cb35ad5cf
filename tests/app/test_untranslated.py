"""No word of terminal and calc sheet reaches the user past the catalogues."""

from __future__ import annotations

import re
from collections.abc import Iterator
from typing import Any

import pytest

from app import samples
from app.sheet.content import sheet_content
from app.sheet.title import Origin
from app.terminal import report
from solver.solve import solve
from tests.pseudo import bare, brackets, words_of

FOR_LAYOUT = ("kind", "weight", "align", "name")  # read by the layout, not by people
UNITS = frozenset(("mpa", "rad"))
OF_FIGURE = re.compile(r">([^<>]+)<")
PLACE = re.compile(r"\{\w+\}")  # filled in by the layout


def texts(value: Any, key: str = "") -> Iterator[str]:
    """What people read of a sheet's content."""
    if isinstance(value, dict):
        for own, part in value.items():
            yield from texts(part, own)
    elif isinstance(value, list | tuple):
        for part in value:
            yield from texts(part, key)
    elif isinstance(value, str) and key not in FOR_LAYOUT:
        yield from OF_FIGURE.findall(value) if key == "svg" else (PLACE.sub(" ", value),)


@pytest.mark.parametrize("name", samples.names())
def test_every_word_went_through_the_catalogue(name: str) -> None:
    project = samples.read_sample(name)
    results = solve(project)
    with brackets():
        content = sheet_content(project, results, Origin("f", "2026-03-14", "p", "0" * 64))
        found = [*report(project, results, "f").splitlines(), *texts(content)]
    assert len(found) > 200
    known = UNITS | words_of(project)
    assert {text: words for text in found if (words := bare(text, known))} == {}
