"""Running a number in a text up and down: which number, which step, and the same text on the way back."""

from __future__ import annotations

from fractions import Fraction

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.entry import EntryError, parse_entry, parse_exact
from app.section_entry import parse_section
from app.sweep import numbers_in, place_in_entry, sweep_of


@pytest.mark.parametrize(
    ("text", "steps", "swept"),
    [
        ("400", 2, "420"),
        ("400", -1, "390"),
        ("357", 1, "358"),
        ("350", 1, "360"),
        ("40", 1, "41"),
        ("5", 1, "6"),
        ("0", 1, "1"),
        ("0", -2, "-2"),
        ("12.5", 1, "12.6"),
        ("12,5", 1, "12,6"),
        ("0.05", 1, "0.06"),
        ("1.00", -1, "0.99"),
        (".5", 1, "0.6"),
        ("9.9", 1, "10.0"),
        ("210000", 1, "220000"),
        ("205000", 1, "206000"),
        ("333.333333333", 1, "333.433333333"),
        ("-30", 1, "-29"),
        ("−30", -1, "−31"),
        ("-1", 1, "0"),
        ("-1", 2, "1"),
        ("1.2e-5", 1, "1.3e-5"),
        ("350 mm", 1, "360 mm"),
        ("3/8 in", 1, "4/8 in"),
        ("3/8", 5, "1"),
        ("1 1/2 in", 1, "2 in"),
        ("1 1/2", 2, "2 1/2"),
        ("1/8", -2, "-1/8"),
        ("10/4", 1, "11/4"),
        ("2*(350+20)", 1, "3*(350+20)"),
        ("d60x5", 1, "d61x5"),
        ("⌀60×5", 1, "⌀61×5"),
        ("A 1200", 1, "A 1210"),
        ("spring 600 kN/mm", 1, "spring 610 kN/mm"),
        ("12 N/mm2", 1, "13 N/mm2"),
        ("12e-6 1/K", -2, "10e-6 1/K"),
    ],
)
def test_a_step_is_a_round_one_and_the_rest_of_the_text_stays(text, steps, swept):
    assert sweep_of(text).text(steps) == swept


@pytest.mark.parametrize(
    ("text", "at", "swept"),
    [
        ("d60x5", 0, "d61x5"),
        ("d60x5", 4, "d60x6"),
        ("12->20", 5, "12->21"),
        ("12→-20", 4, "12→-19"),
        ("20-5", 4, "20-6"),
        ("350 mm", 5, "360 mm"),
        ("10/4", 4, "10/5"),
    ],
)
def test_the_number_under_the_pointer_else_the_first(text, at, swept):
    assert sweep_of(text, at).text(1) == swept


@pytest.mark.parametrize("text", ["", "fixed", "C45", "N/mm2", "m^2", "kN m**2", "1/K", 5000 * "9"])
def test_a_text_without_a_number_has_no_sweep(text):
    assert sweep_of(text) is None


def valid_length(text):
    try:
        return parse_entry(text, "length", "mm-N-MPa") > 0
    except EntryError:
        return False


@pytest.mark.parametrize(("goal", "reached"), [(3, 3), (-4, -4), (-5, -4), (-60, -4)])
def test_it_stops_before_what_is_invalid(goal, reached):
    assert sweep_of("5").reached(0, goal, valid_length) == reached


def test_it_never_passes_through_an_invalid_value():
    def away_from_zero(text):
        return parse_exact(text, "length", "mm-N-MPa") != 0

    assert sweep_of("3").reached(0, -10, away_from_zero) == -2


NUMBERS = st.one_of(
    st.integers(0, 10**7).map(str),
    st.decimals(0, 10**5, places=3).map(str),
    st.builds("{} {}/8".format, st.integers(0, 50), st.integers(1, 7)),
)


@given(NUMBERS, st.integers(-40, 40))
def test_what_is_swept_is_read_as_that_many_steps_more(text, steps):
    sweep = sweep_of(text)
    swept = parse_exact(sweep.text(steps), "length", "m-kN-MPa")
    assert swept == parse_exact(text, "length", "m-kN-MPa") + steps * sweep.number.step
    assert sweep.text(0) == text


@given(st.integers(1, 5000), st.integers(1, 50))
def test_a_swept_section_keeps_its_other_dimension(outer, wall):
    text = f"d{outer + 2 * wall}x{wall}"
    before = parse_section(text, "mm-N-MPa")
    after = parse_section(sweep_of(text).text(1), "mm-N-MPa")
    assert after.outer > before.outer
    assert after.outer - after.inner == pytest.approx(before.outer - before.inner, rel=1e-9)


@given(st.text("0123456789.,/ -−+*()eExdA→>mN^²", max_size=16), st.integers(-5, 5))
def test_any_text_can_be_swept_or_holds_no_number(text, steps):
    for number in numbers_in(text):
        swept = sweep_of(text, number.end)
        assert isinstance(swept.text(steps), str)
        assert swept.number.step > 0
        assert isinstance(swept.number.value, Fraction)


@pytest.mark.parametrize(
    ("shown", "at", "entry", "found"),
    [
        ("350", 1, "350", "350"),
        ("210\u202f000", 5, "210000", "210000"),
        ("⌀55→⌀80", 5, "⌀55→⌀80", "80"),
        ("1: spring 600 kN/mm", 11, "spring 600 kN/mm", "600"),
        ("1: spring 600 kN/mm", 0, "spring 600 kN/mm", None),
        ("333.3", 2, "333.333333", "333.333333"),
        ("1.2·10⁻⁵", 1, "1.2e-5", "1.2"),
        ("350", 3, "350", "350"),
        ("0: fixed", 5, "fixed", None),
    ],
)
def test_the_number_that_is_shown_is_found_in_the_cells_own_text(shown, at, entry, found):
    place = place_in_entry(shown, at, entry)
    named = next((entry[n.start : n.end] for n in numbers_in(entry) if n.end == place), None)
    assert named == found
