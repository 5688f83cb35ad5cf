"""Factors against a second road (pint), and the two ways of writing a number."""

from __future__ import annotations

import math
import struct
from fractions import Fraction

import numpy as np
import pytest
from hypothesis import example, given
from hypothesis import strategies as st

from app.numerals import GROUP, at_most, laid_out, reading, rounded, shortest_decimal
from app.units import (
    QUANTITIES,
    SYSTEM_NAMES,
    SYSTEMS,
    entry_text,
    format_value,
    from_display,
    input_text,
    rounds_to,
    symbol,
    to_display,
    unbroken,
    utilisation_text,
)
from solver.checks import PASS_MARGIN

# The table of the project file's contract, written out once more.
COLUMNS = (
    "length", "size", "displacement", "area", "force", "distributed",
    "stress", "modulus", "spring", "bedding", "temperature", "density",
)  # fmt: skip
CONTRACT = {
    "mm-N-MPa": "mm mm mm mm² N N/mm MPa MPa N/mm N/mm² K kg/m³",
    "mm-kN-MPa": "mm mm mm mm² kN kN/m MPa MPa kN/mm N/mm² K kg/m³",
    "m-kN-MPa": "m mm mm mm² kN kN/m MPa MPa kN/mm kN/m² K kg/m³",
    "in-lbf-psi": "in in in in² lbf lbf/in psi psi lbf/in lbf/in² °F lb/in³",
    "in-kip-ksi": "in in in in² kip kip/in ksi ksi kip/in kip/in² °F lb/in³",
}
DOUBLES = st.floats(allow_nan=False, allow_infinity=False)
SYSTEM = st.sampled_from(SYSTEM_NAMES)
QUANTITY = st.sampled_from(QUANTITIES)


def test_the_systems_are_those_of_the_contract() -> None:
    assert {name: " ".join(symbol(column, name) for column in COLUMNS) for name in SYSTEM_NAMES} == CONTRACT


@pytest.mark.parametrize("system", SYSTEM_NAMES)
def test_every_system_has_every_quantity(system: str) -> None:
    assert set(SYSTEMS[system]) == set(QUANTITIES)


@given(DOUBLES, QUANTITY, SYSTEM)
def test_a_display_value_comes_back_to_within_rounding(value: float, quantity: str, system: str) -> None:
    # Four roundings (two factors, two products), each half a unit in the last place, 1.1e-16.
    back = from_display(to_display(value, quantity, system), quantity, system)
    if 1e-280 < abs(value) < 1e280:
        assert math.isclose(back, value, rel_tol=4.5e-16)


def test_arrays_turn_like_numbers() -> None:
    values = np.array([0.0, 0.35, -1.2])
    turned = to_display(values, "length", "in-kip-ksi")
    assert turned.tolist() == [to_display(value, "length", "in-kip-ksi") for value in values.tolist()]


@given(DOUBLES, QUANTITY, SYSTEM)
@example(5e-324, "length", "mm-N-MPa")
@example(1.7976931348623157e308, "length", "in-kip-ksi")
@example(2.0**-1022, "area", "in-lbf-psi")
@example(0.5, "size", "in-lbf-psi")  # the gap below a power of two is half the gap above
def test_an_entry_text_means_the_same_double(value: float, quantity: str, system: str) -> None:
    exact = Fraction(entry_text(value, quantity, system)) * SYSTEMS[system][quantity].factor
    assert float(exact) == value


@given(st.floats(1e-12, 1e12), QUANTITY, SYSTEM)
def test_no_shorter_decimal_means_the_same_double(value: float, quantity: str, system: str) -> None:
    factor = SYSTEMS[system][quantity].factor
    digits = len(entry_text(value, quantity, system).partition("e")[0].replace(".", "").strip("0"))
    if digits == 1:
        return
    target = Fraction(value) / factor
    power = math.floor(math.log10(target)) - digits + 2
    below = math.floor(target / Fraction(10) ** power)
    for mantissa in range(below - 1, below + 3):
        assert not rounds_to(mantissa * Fraction(10) ** power * factor, value)


@given(st.integers(1, 10**6), st.integers(-6, 3), QUANTITY, SYSTEM)
def test_what_was_typed_short_is_seen_again(mantissa: int, power: int, quantity: str, system: str) -> None:
    typed = mantissa * Fraction(10) ** power
    value = float(typed * SYSTEMS[system][quantity].factor)
    assert Fraction(entry_text(value, quantity, system)) == typed


@pytest.mark.parametrize(
    ("value", "quantity", "system", "text"),
    [
        (0.04, "size", "mm-N-MPa", "40"),
        (-0.0381, "size", "in-lbf-psi", "-1.5"),
        (2.1e11, "modulus", "mm-N-MPa", "210000"),
        (1.2e-5, "expansion", "mm-N-MPa", "1.2e-5"),
        (-0.0, "force", "mm-N-MPa", "0"),
        (1e21, "force", "mm-N-MPa", "1e21"),
    ],
)
def test_entry_texts(value: float, quantity: str, system: str, text: str) -> None:
    assert entry_text(value, quantity, system) == text


def test_a_decimal_that_cannot_be_found_is_said() -> None:
    with pytest.raises(ValueError, match="1/3"):
        shortest_decimal(Fraction(1, 3), lambda decimal: decimal == Fraction(1, 3))


@pytest.mark.parametrize(
    ("value", "digits", "text"),
    [
        (0.0, 4, "0"),
        (-0.0, 4, "0"),
        (128.66, 4, "128.7"),
        (-139.04, 4, "−139.0"),
        (4418.4, 3, "4418"),
        (210000.4, 4, f"210{GROUP}000"),
        (99.996, 4, "100.0"),
        (0.36801, 3, "0.368"),
        (1.2e-5, 3, "1.20·10⁻⁵"),
        (-3.21e12, 2, "−3.2·10¹²"),
        (math.nan, 4, "–"),
        (-math.inf, 4, "−∞"),
    ],
)
def test_readings(value: float, digits: int, text: str) -> None:
    assert reading(value, digits) == text


@given(st.floats(-1e8, 1e8), st.integers(1, 12))
def test_a_reading_is_within_half_its_last_digit(value: float, digits: int) -> None:
    if value == 0 or abs(value) < 1e-4:
        return
    text = reading(value, digits).replace(GROUP, "").replace("−", "-")
    shown = float(text)
    # Significant digits, or the whole unit; the rest is the rounding of the doubles.
    allowed = min(0.5, 0.5 * 10.0 ** (math.floor(math.log10(abs(value))) - digits + 2))
    assert abs(shown - value) <= allowed + 1e-15 * abs(value)
    assert shown == rounded(value, digits)


@pytest.mark.parametrize(
    ("entry", "text"),
    [
        ("0", "0"),
        ("-0.04", "−0.04"),
        ("1500", "1500"),
        ("-210000", f"−210{GROUP}000"),
        ("1234567.891", f"1{GROUP}234{GROUP}567.891"),
        ("1.2e-5", "1.2·10⁻⁵"),
        ("-3e21", "−3·10²¹"),
    ],
)
def test_entries_are_laid_out_as_readings_are(entry: str, text: str) -> None:
    assert laid_out(entry) == text


@given(st.floats(allow_nan=False, allow_infinity=False))
def test_laying_out_keeps_every_digit(value: float) -> None:
    text = laid_out(entry_text(value, "factor", "mm-N-MPa")).replace(GROUP, "").replace("−", "-")
    powers = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-")
    assert float(text.replace("·10", "e").translate(powers)) == value


def test_stripping_takes_only_needless_zeros() -> None:
    assert reading(160.0, 6, strip=True) == "160"
    assert reading(100.5, 6, strip=True) == "100.5"
    assert reading(2.0e-5, 3, strip=True) == "2·10⁻⁵"


def test_format_value_turns_and_names_the_unit() -> None:
    assert format_value(1.6e8, "stress", "mm-N-MPa", 3, with_unit=True) == "160 MPa"
    assert format_value(0.75, "factor", "mm-N-MPa", 2, with_unit=True) == "0.75"


def test_an_input_is_read_as_typed_where_it_is_short() -> None:
    assert input_text(1.0625 * 0.0254, "size", "in-kip-ksi") == "1.0625"
    assert input_text(0.04, "size", "in-kip-ksi") == "1.5748"
    assert input_text(-2.1e11, "modulus", "mm-N-MPa") == f"−210{GROUP}000"


@pytest.mark.parametrize(
    ("value", "status", "text"),
    [
        (0.8, "pass", "0.80"),
        (0.99996, "pass", "1.00"),
        (1.0 + PASS_MARGIN, "pass", "1.00"),
        (1.0004, "fail", "1.0004"),
        (1.00049, "fail", "1.0005"),
        (1.0 + 1.2e-9, "fail", "1.000000001"),
        (1.05, "fail", "1.05"),
        (12345.6, "fail", f"12{GROUP}346"),
    ],
)
def test_utilisations(value: float, status: str, text: str) -> None:
    assert utilisation_text(value, status) == text


@given(st.floats(0.0, 99.0) | st.floats(1.0 - 1e-8, 1.0 + 1e-8))
def test_a_utilisation_never_contradicts_its_status(value: float) -> None:
    status = "pass" if value <= 1.0 + PASS_MARGIN else "fail"
    assert (float(utilisation_text(value, status)) > 1) == (status == "fail")


@given(st.floats(1e-300, 1e300))
def test_a_bound_is_never_rounded_down(bound: float) -> None:
    text = at_most(bound).replace(GROUP, "")
    mantissa, _, power = text.partition("·10")
    ascii_power = power.translate(str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-"))
    assert Fraction(mantissa) * Fraction(10) ** int(ascii_power or 0) >= Fraction(bound) * (
        1 - Fraction(1, 10**12)
    )


def test_all_bits_of_odd_doubles_survive() -> None:
    """The bit patterns themselves, not only equality."""
    for bits in (1, 2**52 - 1, 2**52, 0x3FF0000000000000, 0x7FEFFFFFFFFFFFFF):
        value = struct.unpack("<d", struct.pack("<Q", bits))[0]
        text = entry_text(value, "spring", "in-kip-ksi")
        back = float(Fraction(text) * SYSTEMS["in-kip-ksi"]["spring"].factor)
        assert struct.unpack("<Q", struct.pack("<d", back))[0] == bits


@pytest.mark.parametrize("system", SYSTEM_NAMES)
def test_no_line_ends_between_a_number_and_its_unit(system: str) -> None:
    for quantity in QUANTITIES:
        for value in (1.0, 3.2e-12, -4.5e15):
            text = format_value(value, quantity, system, with_unit=True)
            assert " " not in unbroken(text)
            assert unbroken(text).replace("\u00a0", " ") == text


def test_elsewhere_lines_end_as_before() -> None:
    sentence = "B: 80.0 of 100 MPa in compression, at 1000 mm, Case 2 inside"
    assert unbroken(sentence) == "B: 80.0 of 100\u00a0MPa in compression, at 1000\u00a0mm, Case 2 inside"
