"""The chosen strips: each once, at least one, in the order a hand gives them."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.strip_choice import KINDS, StripChoice, kind_names

CHOICES = st.lists(st.sampled_from(KINDS), min_size=1, unique=True).map(lambda s: StripChoice(tuple(s)))
U, N, SIGMA, UTILISATION, MODE = KINDS


@given(CHOICES, st.sampled_from(KINDS), st.integers(-5, 5))
def test_whatever_is_done_each_strip_is_there_once_and_one_at_least(choice, kind, by):
    after = [choice.without(kind), choice.with_added(kind)]
    if kind in choice.shown:
        after += [choice.moved(kind, by), choice.put(kind, by)]
    for found in after:
        assert len(found.shown) == len(set(found.shown)) >= 1
        assert {*found.shown, *found.hidden} == set(KINDS)


@given(CHOICES)
def test_a_choice_is_remembered(choice):
    assert StripChoice.of_text(choice.text) == choice


@pytest.mark.parametrize("text", ["", "nonsense", "  "])
def test_what_says_nothing_means_all(text):
    assert StripChoice.of_text(text) == StripChoice()


def test_what_is_no_strip_and_what_comes_twice_is_left_out():
    assert StripChoice.of_text("stress moment stress force").shown == (SIGMA, N)


def test_the_last_strip_stays():
    one = StripChoice((SIGMA,))
    assert one.without(SIGMA) == one


def test_a_hidden_strip_comes_back_to_its_usual_place():
    assert StripChoice((U, SIGMA)).with_added(N).shown == (U, N, SIGMA)
    assert StripChoice((SIGMA,)).with_added(U).shown == (U, SIGMA)


@pytest.mark.parametrize(
    ("gap", "shown"), [(0, (N, U, SIGMA)), (1, (U, N, SIGMA)), (2, (U, N, SIGMA)), (3, (U, SIGMA, N))]
)
def test_a_strip_is_put_into_a_gap(gap, shown):
    assert StripChoice((U, N, SIGMA)).put(N, gap).shown == shown


def test_a_strip_moves_as_far_as_there_are_places():
    choice = StripChoice((U, N, SIGMA))
    assert choice.moved(N, -1).shown == (N, U, SIGMA)
    assert choice.moved(N, 1).shown == (U, SIGMA, N)
    assert choice.moved(U, -1) == choice
    assert choice.moved(SIGMA, 1) == choice


def test_every_strip_has_words():
    assert set(kind_names()) == set(KINDS)
