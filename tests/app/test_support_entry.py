"""Supports as typed text."""

import pytest
from hypothesis import given
from hypothesis import strategies as st
from msgspec import UNSET

from app.support_entry import SupportError, parse_support, support_entry, support_text
from app.units import SYSTEM_NAMES
from solver.model import FixedSupport, SpringSupport, StopSupport

KN = "mm-kN-MPa"


@pytest.mark.parametrize(
    ("text", "support"),
    [
        ("free", UNSET),
        ("", UNSET),
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
    assert parse_support(text, KN) == support


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
        parse_support(text, KN)


def test_a_bare_number_is_a_spring_where_there_is_one_already():
    assert parse_support("150", KN, SpringSupport(stiffness=6e8)) == SpringSupport(stiffness=1.5e8)
    with pytest.raises(SupportError, match="a support is"):
        parse_support("150", KN, FixedSupport())


def test_a_number_of_something_else_is_no_spring():
    with pytest.raises(ValueError, match="kg"):
        parse_support("150 kg", KN)


def test_what_cannot_be_solved_is_not_offered():
    with pytest.raises(SupportError) as raised:
        parse_support("held", KN)
    assert "stop" not in str(raised.value)


SIZES = st.floats(1e-6, 1e12)
SUPPORTS = st.one_of(
    st.just(UNSET),
    st.just(FixedSupport()),
    st.builds(SpringSupport, stiffness=SIZES),
    st.builds(
        StopSupport,
        side=st.sampled_from(["plus", "minus"]),
        clearance=st.floats(0, 10),
        stiffness=st.one_of(st.just(UNSET), SIZES),
    ),
)


@given(support=SUPPORTS, system=st.sampled_from(SYSTEM_NAMES))
def test_what_an_editor_shows_means_the_same_support(support, system):
    assert parse_support(support_entry(support, system), system) == support


def test_for_reading_numbers_are_short_and_carry_their_units():
    stop = StopSupport(side="minus", clearance=1 / 3000, stiffness=6e8)
    assert support_text(stop, KN) == "stop − 0.3333 mm; 600 kN/mm"
    assert support_text(UNSET, KN) == "free"
