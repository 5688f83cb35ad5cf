"""Supports as typed text."""

import pytest
from hypothesis import given
from hypothesis import strategies as st
from msgspec import UNSET
from msgspec.structs import replace

from app.support_entry import SupportError, parse_supports, supports_entry, supports_text
from app.units import SYSTEM_NAMES
from solver.model import FixedSupport, SpringSupport, StopSupport

KN = "mm-kN-MPa"


@pytest.mark.parametrize(
    ("text", "support"),
    [
        ("free", ()),
        ("", ()),
        (" Fixed ", FixedSupport()),
        ("spring 600", SpringSupport(stiffness=6e8)),
        ("600 kN/mm", SpringSupport(stiffness=6e8)),
        ("2*(100+200) kN/mm", SpringSupport(stiffness=6e8)),
        ("spring 600 kN/mm", SpringSupport(stiffness=6e8)),
        ("SPRING 600 N/mm", SpringSupport(stiffness=6e5)),
        ("stop + 0.5 mm", StopSupport(side="plus", clearance=5e-4)),
        ("stop - 0,5", StopSupport(side="minus", clearance=5e-4)),
        ("stop − 0.5", StopSupport(side="minus", clearance=5e-4)),
        ("stop +", StopSupport(side="plus", clearance=0.0)),
        ("stop + 0.5 mm; 600 kN/mm", StopSupport(side="plus", clearance=5e-4, stiffness=6e8)),
        ("stop + 0.5 mm, 600 kN/mm", StopSupport(side="plus", clearance=5e-4, stiffness=6e8)),
        ("stop + 0,5 mm, 600,5 kN/mm", StopSupport(side="plus", clearance=5e-4, stiffness=6.005e8)),
    ],
)
def test_what_is_typed_is_what_is_meant(text, support):
    assert parse_supports(text, KN) == (support if isinstance(support, tuple) else (support,))


@pytest.mark.parametrize(
    ("text", "reason"),
    [
        ("held", "a support is"),
        ("5", "a support is"),
        ("-5 kN/mm", "greater than 0"),
        ("fixed 5", "nothing stands behind"),
        ("free 0", "nothing stands behind"),
        ("spring", "needs its stiffness"),
        ("spring 0", "greater than 0"),
        ("spring -5", "greater than 0"),
        ("stop", "side and clearance"),
        ("stop 0.5", "side and clearance"),
        ("stop + -0.5", "at least 0"),
        ("stop + 0.5; 0", "greater than 0"),
    ],
)
def test_what_is_no_support_is_said_in_words(text, reason):
    with pytest.raises(SupportError, match=reason):
        parse_supports(text, KN)


def test_a_bare_number_is_a_spring_where_there_is_one_already():
    assert parse_supports("150", KN, (SpringSupport(stiffness=6e8),)) == (SpringSupport(stiffness=1.5e8),)
    with pytest.raises(SupportError, match="a support is"):
        parse_supports("150", KN, (FixedSupport(),))


def test_a_number_of_something_else_is_no_spring():
    with pytest.raises(ValueError, match="kg"):
        parse_supports("150 kg", KN)


SIZES = st.floats(1e-6, 1e12)
SUPPORTS = st.one_of(
    st.just(FixedSupport()),
    st.builds(SpringSupport, stiffness=SIZES),
    st.builds(
        StopSupport,
        side=st.sampled_from(["plus", "minus"]),
        clearance=st.floats(0, 10),
        stiffness=st.one_of(st.just(UNSET), SIZES),
    ),
)


@given(supports=st.lists(SUPPORTS, max_size=4).map(tuple), system=st.sampled_from(SYSTEM_NAMES))
def test_what_an_editor_shows_means_the_same_supports(supports, system):
    assert parse_supports(supports_entry(supports, system), system) == supports


PLUS, MINUS = StopSupport(side="plus", clearance=5e-4), StopSupport(side="minus", clearance=5e-4)
SPRING = SpringSupport(stiffness=6e8)


@pytest.mark.parametrize(
    ("text", "supports"),
    [
        ("spring 600 kN/mm and stop + 0.5 mm", (SPRING, PLUS)),
        ("spring 600 and stop +0.5", (SPRING, PLUS)),
        ("stop + 0.5 mm; spring 600 kN/mm", (PLUS, SPRING)),
        ("stop + 0.5 mm, stop - 0,5 mm", (PLUS, MINUS)),
        ("stop + 0.5 mm & stop - 0.5 mm & 600 kN/mm", (PLUS, MINUS, SPRING)),
        ("stop + 0.5; 600; stop - 0.5; 600", (replace(PLUS, stiffness=6e8), replace(MINUS, stiffness=6e8))),
        ("stop ± 0.5 mm", (PLUS, MINUS)),
        ("stop +- 0.5 mm", (PLUS, MINUS)),
        ("fixed AND stop + 0.5 mm", (FixedSupport(), PLUS)),
    ],
)
def test_several_supports_stand_one_after_the_other(text, supports):
    assert parse_supports(text, KN) == supports


@pytest.mark.parametrize(
    ("text", "reason"),
    [
        ("free and stop + 0.5 mm", "no other support"),
        ("stop + 0.5 mm and", "missing"),
        ("and fixed", "missing"),
        ("fixed & & fixed", "missing"),
        ("stop + 0.5 mm and 600", "a support is"),
        ("spring 600 and stop 0.5", "side and clearance"),
    ],
)
def test_what_is_wrong_with_one_of_several_is_said(text, reason):
    with pytest.raises(SupportError, match=reason):
        parse_supports(text, KN)


@pytest.mark.parametrize("text", ["0.3", "0.3 mm", "0,3"])
def test_a_bare_number_is_the_clearance_where_there_is_one_stop(text):
    assert parse_supports(text, KN, (PLUS,)) == (replace(PLUS, clearance=3e-4),)
    assert parse_supports("600 kN/mm", KN, (PLUS,)) == (SPRING,)
    with pytest.raises(ValueError, match=r"a support is|no unit"):
        parse_supports(text, KN, (PLUS, MINUS))


def test_a_bare_clearance_is_not_negative():
    with pytest.raises(SupportError, match="at least 0"):
        parse_supports("-0.3", KN, (PLUS,))


def test_for_reading_numbers_are_short_and_carry_their_units():
    stop = StopSupport(side="minus", clearance=1 / 3000, stiffness=6e8)
    assert supports_text((stop,), KN) == "stop − 0.3333 mm; 600 kN/mm"
    assert supports_text((SPRING, PLUS, MINUS), KN) == "spring 600 kN/mm and stop ± 0.5 mm"
    assert supports_text((), KN) == "free"
