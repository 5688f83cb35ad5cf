"""How labels find their places: apart, inside, near, and dropped only where there is no room."""

from __future__ import annotations

from itertools import combinations

from hypothesis import example, given
from hypothesis import strategies as st

from app.drawing.placing import CLEAR, Wish, fits, place
from app.drawing.shapes import Part

LABELS = st.lists(
    st.tuples(st.floats(0, 500), st.floats(1, 80), st.integers(0, 3), st.floats(0, 60)), max_size=25
)


@given(LABELS, st.integers(1, 3))
def test_placed_labels_stay_apart_inside_and_near(labels, rows):
    wishes = [Wish("x", at, extent, 10.0, Part("note", 0), rank, slide) for at, extent, rank, slide in labels]
    placed = place(wishes, rows, (0.0, 500.0))
    for label in placed:
        middle = 0.5 * sum(label.span)
        assert abs(middle - label.wish.along) <= label.wish.slide + 1e-3
        assert label.span[0] >= -1e-3
        assert label.span[1] <= 500.0 + 1e-3
    for a, b in combinations(placed, 2):
        assert a.row != b.row or a.span[1] <= b.span[0] or b.span[1] <= a.span[0]


def has_room(wish: Wish, standing: list[tuple[float, float]]) -> bool:
    """Whether a gap between what stands in a row of 500 px is plainly (by 0.001 px) wide enough in reach."""
    half, at = 0.5 * wish.extent, max(wish.along - wish.slide, 0.5 * wish.extent)
    last = min(wish.along + wish.slide, 500.0 - half)
    for low, high in sorted(standing):
        if at + 1e-3 <= min(last, low - CLEAR - half):
            return True
        at = max(at, high + CLEAR + half)
    return at + 1e-3 <= last


@given(LABELS, st.integers(1, 3))
@example([(120.0, 40.0, 0, 0.0), (80.0, 40.0, 1, 15.0)], 1)  # the second gives way by less than its half
def test_a_label_is_dropped_only_where_no_row_has_room_for_it(labels, rows):
    wishes = [Wish("x", at, extent, 10.0, Part("note", 0), rank, slide) for at, extent, rank, slide in labels]
    placed = place(wishes, rows, (0.0, 500.0))
    standing = [[] for _ in range(rows)]
    for wish in sorted(wishes, key=lambda w: (w.rank, w.along)):
        label = next((label for label in placed if label.wish is wish), None)
        if label is not None:
            standing[label.row].append(label.span)
        else:
            assert not any(has_room(wish, row) for row in standing)


@given(LABELS, st.integers(1, 3))
def test_labels_fit_where_all_are_placed(labels, rows):
    wishes = [Wish("x", at, extent, 10.0, Part("note", 0), rank, slide) for at, extent, rank, slide in labels]
    assert fits(wishes, rows, (0.0, 500.0)) == (len(place(wishes, rows, (0.0, 500.0))) == len(wishes))


@given(st.lists(st.floats(1, 80), min_size=1, max_size=20))
def test_labels_that_just_fill_a_row_fit_and_no_more(extents):
    wishes, end = [], 0.0
    for extent in extents:
        wishes.append(Wish("x", end + 0.5 * extent, extent, 10.0, Part("note", 0)))
        end += extent + CLEAR
    room = (0.0, end - CLEAR)
    assert fits(wishes, 1, room)
    assert not fits([*wishes, Wish("x", 0.0, 1.0, 10.0, Part("note", 0), slide=end)], 1, room)
