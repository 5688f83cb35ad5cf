"""The check as text: each cell the worst of its checks, what was not made marked, the sums of the books."""

from __future__ import annotations

from pathlib import Path

import pytest

from app.samples import read_sample
from app.terminal import cell, report
from solver.checks import Check, Status
from solver.solve import solve


def check(utilisation: float | None, status: Status) -> Check:
    return Check(check="tension", combination="c", status=status, segment="A", utilisation=utilisation)


@pytest.mark.parametrize(
    ("checks", "text"),
    [
        ([check(0.2, "pass"), check(0.5, "pass")], "0.50"),
        ([check(1.2, "fail"), check(0.5, "pass")], "1.20"),
        ([check(1.0004, "fail")], "1.0004"),
        ([check(0.2, "pass"), check(None, "not_made")], "0.20 ?"),
        ([check(None, "not_made")], "?"),
        ([check(None, "waived")], "waived"),
        ([], "–"),
    ],
)
def test_a_cell_shows_the_worst_and_what_was_not_made(checks: list[Check], text: str) -> None:
    assert cell(checks) == text


def lines_of(sample: str) -> dict[str, list[str]]:
    """The rows of a sample's report by their first cell."""
    project = read_sample(sample)
    text = report(project, solve(project, cases=False), str(Path("folder", "file.json")))
    return {line.split("  ")[0]: line.split("  ")[1:] for line in text.splitlines() if line}


def cells(row: list[str]) -> list[str]:
    return [part.strip() for part in row if part.strip()]


def test_a_segment_that_is_pulled_and_pushed_shows_the_worse() -> None:
    """F of the shaft, cold: 14.8 of 140 MPa in compression, 10.3 of 160 in tension."""
    assert cells(lines_of("hoist_shaft")["F"])[0] == "0.11"


def test_the_books_close() -> None:
    rows = lines_of("quay_pile")
    assert {"Joint toe", "Loads", "Bedding", "Sum"} <= set(rows)
    assert [float(text.removesuffix(" kN")) for text in cells(rows["Sum"])] == [0.0, 0.0, 0.0]
    assert "Bedding" not in lines_of("tie_rod")
