"""Typed numbers: what is read, what is refused and in which words, and that no text takes long."""

from __future__ import annotations

import math
import re
import subprocess
import sys
import time
from fractions import Fraction
from functools import cache

import pint
import pytest
from hypothesis import example, given
from hypothesis import strategies as st

from app.entry import EntryError, parse_entry
from app.phrases.entries import ENTRIES
from app.unit_names import ALLOWED, UnknownUnitError, nearest_unit, unit_factor
from app.units import QUANTITIES, SYSTEM_NAMES, SYSTEMS, entry_text

DOUBLES = st.floats(allow_nan=False, allow_infinity=False)
SYSTEM = st.sampled_from(SYSTEM_NAMES)
QUANTITY = st.sampled_from(QUANTITIES)


def millimetres(text: str) -> float:
    return parse_entry(text, "size", "mm-N-MPa")


@pytest.mark.parametrize(
    ("text", "value"),
    [
        ("25", 0.025),
        ("  25\u00a0mm ", 0.025),
        ("1.500", 0.0015),
        ("1,500", 0.0015),
        (",5", 0.0005),
        ("5.", 0.005),
        ("−3,5", -0.0035),
        ("2*350+20", 0.72),
        ("2×350−20", 0.68),
        ("1/8", 0.000125),
        ("10÷4", 0.0025),
        ("1 1/2 in", 0.0381),
        ("-1 1/2 in", -0.0381),
        ('1 1/2"', 0.0381),
        ("2*(1 1/2 + 1/4) in", 0.0889),
        ("2*-3", -0.006),
        ("8/2/2", 0.002),
        ("5-2-1", 0.002),
        ("1.5e2", 0.15),
        ("1E-3 m", 0.001),
        ("5 thou", 0.000127),
        ("5 µm", 5e-6),
        ("((((7))))", 0.007),
    ],
)
def test_numbers(text: str, value: float) -> None:
    assert millimetres(text) == value


@pytest.mark.parametrize(
    ("text", "quantity", "value"),
    [
        ("25 kN", "force", 25e3),
        ("1 kip", "force", 4448.2216152605),
        ("160 N/mm²", "stress", 160e6),
        ("160 N/mm^2", "stress", 160e6),
        ("160N/mm2", "stress", 160e6),
        ("12 kN/m/mm", "bedding", 12e6),
        ("3 klf", "distributed", 3 * 4448.2216152605 / 0.3048),
        ("12e-6 /K", "expansion", 12e-6),
        ("12e-6 1/°C", "expansion", 12e-6),
        ("12 µm/m/K", "expansion", 12e-6),
        ("12 ppm/K", "expansion", 12e-6),
        ("18 °F", "temperature", 10.0),
        ("18 F", "temperature", 10.0),
        ("30 °C", "temperature", 30.0),  # a rise, not a temperature
        ("-1 g", "acceleration", -9.80665),
        ("7850 kg·m⁻³", "density", 7850.0),
        ("95 %", "factor", 0.95),
        ("1.35", "factor", 1.35),
    ],
)
def test_units(text: str, quantity: str, value: float) -> None:
    # Not all of these decimals are exact products; the last digit of the expected value is ours.
    assert math.isclose(parse_entry(text, quantity, "in-kip-ksi"), value, rel_tol=2.3e-16)


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("", "Nothing entered"),
        ("abc", "is not a number"),
        ("nan", "is not a number"),
        ("inf", "is not a number"),
        ("٣", "is not a number"),
        ("1_000", "is not a number"),
        ("-", "is not a number"),
        ("1.500,5", "more than one decimal sign"),
        ("1..2", "more than one decimal sign"),
        ("1 500", "follows a number"),
        ("1\u202f500", "follows a number"),
        ("1 3/2 in", "follows a number"),
        ("2+", "is not a number"),
        ("2**3", "A number is missing before “*”"),
        ("9**9**9", "A number is missing before “*”"),
        ("--5", "A number is missing"),
        ("(1+2", "closing bracket is missing"),
        ("(1 500)", "follows a number"),
        ("1+2)", "without an opening"),
        ("()", "A number is missing before “)”"),
        ("1/0", "Division by zero"),
        ("1/(2-2)", "Division by zero"),
        ("1e999999", "Too large"),
        ("1e400", "Too large"),
        ("1e300*1e300", "Too large"),
        ("1e-999999", "Too small"),
        ("1e-350", "Too small"),
        ("25 kN", "use one such as mm"),
        ("25 mm²", "did you mean"),
        ("25 MM", "did you mean “mm”"),
        ("25 mm mm", "no unit"),
        ("25 mm/", "no unit"),
        ("25 " + "m" * 200, "no unit"),
        ("__import__('os')", "is not a number"),
    ],
)
def test_what_is_refused_is_said_in_words(text: str, said: str) -> None:
    with pytest.raises(EntryError) as caught:
        millimetres(text)
    assert said in caught.value.sentence
    assert str(caught.value) == caught.value.sentence


def test_a_factor_takes_no_unit() -> None:
    with pytest.raises(EntryError, match="plain number"):
        parse_entry("1.35 kN", "factor", "mm-N-MPa")


@pytest.mark.parametrize(
    "text",
    [
        "1" * 10_000,
        "(" * 10_000,
        "1e999999999999999999",
        "1e39999999",
        "1+" * 5_000,
        "9" * 290 + "e400",
        "1e300*" * 49 + "1",
    ],
)
def test_hostile_texts_are_refused_quickly(text: str) -> None:
    began = time.perf_counter()
    with pytest.raises(EntryError):
        millimetres(text)
    assert time.perf_counter() - began < 0.1  # about a millisecond here; seconds if it were not bounded


@given(st.text(max_size=30) | st.text("0123456789.,+-*/() eEmkN°µ²−×÷", max_size=30), QUANTITY)
@example("1/K/K/K", "expansion")
def test_any_text_is_a_finite_number_or_an_entry_error(text: str, quantity: str) -> None:
    try:
        value = parse_entry(text, quantity, "mm-kN-MPa")
    except EntryError:
        return
    assert math.isfinite(value)


@given(DOUBLES, QUANTITY, SYSTEM)
def test_what_is_shown_for_editing_reads_back_to_the_same_double(
    value: float, quantity: str, system: str
) -> None:
    text = entry_text(value, quantity, system)
    assert parse_entry(text, quantity, system) == value
    assert parse_entry(text.replace(".", ",").replace("-", "−"), quantity, system) == value


@given(st.fractions(-1000, 1000, max_denominator=999), SYSTEM)
def test_a_number_is_rounded_once(exact: Fraction, system: str) -> None:
    text = f"{exact.numerator}/{exact.denominator}"
    assert parse_entry(text, "length", system) == float(exact * SYSTEMS[system]["length"].factor)


@given(
    st.recursive(
        st.integers(1, 99).map(str),
        lambda inner: st.tuples(inner, st.sampled_from("+-*/"), inner).map(lambda t: f"({t[0]}{t[1]}{t[2]})"),
        max_leaves=8,
    )
)
def test_expressions_against_python(text: str) -> None:
    """The second road: Python's own grammar over fractions, the same text."""
    try:
        exact = eval(re.sub(r"(\d+)", r"Fraction(\1)", text), {"Fraction": Fraction})  # noqa: S307
    except ZeroDivisionError:
        with pytest.raises(EntryError, match="zero"):
            parse_entry(text, "factor", "mm-N-MPa")
        return
    assert parse_entry(text, "factor", "mm-N-MPa") == float(exact)


SYMBOLS = {
    "1/K": "1/kelvin", "1/°F": "1/delta_degF", "°F": "delta_degF", "K": "kelvin",
}  # fmt: skip


@cache
def plain_pint() -> pint.UnitRegistry:
    return pint.UnitRegistry(non_int_type=Fraction)


@pytest.mark.parametrize("system", SYSTEM_NAMES)
@pytest.mark.parametrize("quantity", QUANTITIES)
def test_display_factors_against_pint(quantity: str, system: str) -> None:
    """The second road: pint's own reading of the symbol, in its own unit list, exact."""
    registry = plain_pint()
    unit = SYSTEMS[system][quantity]
    text = unit.symbol.replace("²", "**2").replace("³", "**3").replace("⁴", "**4").replace("·", "*")
    parsed = registry.parse_units(SYMBOLS.get(unit.symbol, text))
    si = registry.UnitsContainer(ALLOWED[quantity][1])
    assert registry.Quantity(Fraction(1), parsed).to(si).magnitude == unit.factor


@pytest.mark.parametrize("quantity", QUANTITIES)
def test_every_allowed_spelling_is_known_to_pint(quantity: str) -> None:
    """Each one alone or with the power that makes it fit, so that no list has a dead name."""
    registry = plain_pint()
    for product in ALLOWED[quantity][0].values():
        assert registry.UnitsContainer(product)
        for name in product:
            assert name in registry


def test_nearest_units() -> None:
    assert nearest_unit("mpa", "stress") == "MPa"
    assert nearest_unit("KN", "force") == "kN"
    assert nearest_unit("furlong", "force") is None


def test_strict_by_case() -> None:
    with pytest.raises(UnknownUnitError):
        unit_factor("mPa", "stress")


def test_the_display_units_are_read_without_pint() -> None:
    """pint takes a third of a second to import: nobody waits for it who types the usual units."""
    code = (
        "import sys; from app.entry import parse_entry; from app.units import *;"
        "[parse_entry('1 ' + symbol(q, s), q, s) for s in SYSTEM_NAMES for q in QUANTITIES];"
        "assert 'pint' not in sys.modules"
    )
    subprocess.run([sys.executable, "-c", code], check=True)


def test_every_sentence_is_filled_from_its_facts() -> None:
    assert all(sentence.count("{") == sentence.count("}") for sentence in ENTRIES.values())


@pytest.mark.parametrize(
    ("text", "quantity", "nearest"),
    [("N", "distributed", None), ("kN", "stress", None), ("KN/m", "distributed", "kN/m")],
)
def test_only_units_of_the_same_dimension_are_proposed(text, quantity, nearest) -> None:
    assert nearest_unit(text, quantity) == nearest


def test_every_proposed_unit_can_be_typed() -> None:
    for quantity in ALLOWED:
        for text in ("N", "kn", "mm", "Mpa", "k", "m2", "lb", "in", "kg"):
            nearest = nearest_unit(text, quantity)
            assert nearest is None or unit_factor(nearest, quantity)
