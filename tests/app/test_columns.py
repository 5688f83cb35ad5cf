"""Text in columns: aligned, complete, and never wider than it may be while a split helps."""

from __future__ import annotations

from hypothesis import given
from hypothesis import strategies as st

from app.columns import table

CELL = st.text("abc0123456789", min_size=1, max_size=12)


def test_names_to_the_left_numbers_to_the_right() -> None:
    assert table(["joint", "Cold"], [["0", "−1.5"], ["12", "10"]]) == (
        "joint  Cold\n"
        "0      −1.5\n"
        "12       10\n"
    )  # fmt: skip


def test_a_wide_table_goes_on_below_with_its_first_column() -> None:
    assert table(["s", "aaaa", "bbbb"], [["1", "2", "3"]], width=10) == (
        "s  aaaa\n"
        "1     2\n"
        "\n"
        "s  bbbb\n"
        "1     3\n"
    )  # fmt: skip


@given(
    st.integers(1, 8).flatmap(
        lambda n: st.lists(st.lists(CELL, min_size=n, max_size=n), min_size=1, max_size=5)
    )
)
def test_every_cell_stands_somewhere_and_no_line_is_needlessly_wide(rows: list[list[str]]) -> None:
    lines = table(rows[0], rows[1:], width=30).splitlines()
    words = [word for line in lines for word in line.split()]
    assert all(cell in words for row in rows for cell in row)
    assert all(len(line) <= 30 or len(line.split()) == 2 for line in lines)
