"""Every rule, reason, kind and error has words, and no sentence says more than is true."""

from __future__ import annotations

import re
from pathlib import Path
from typing import get_args

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.entry import EntryError, refusal
from app.phrases import (
    caution,
    check_sentence,
    error_sentences,
    fault_sentence,
    numerical_error_sentence,
    reason_text,
    verdict_detail,
    verdict_line,
)
from app.phrases.checks import CHECKS, NOT_MADE, QUANTITIES, REASONS, REMEDIES, SUBJECTS, compared
from app.phrases.entries import ENTRIES, EntryRule
from app.phrases.errors import ERRORS
from app.phrases.faults import FAULTS, JSON_SLIPS
from app.phrases.shoulders import REASONS_OF_SHOULDERS
from app.places import place_words, quantity_at
from app.project_file import ProjectFileError, parse
from app.strict_json import JsonSlip
from app.units import SYSTEM_NAMES
from solver.checking import governing_of, verdict_of
from solver.checks import PASS_MARGIN, Check, CheckKind, Reason
from solver.errors import BoundNotMet, InputError, NotSolvable, OutOfRange, StiffnessContrast
from solver.faults import Fault, Rule, place_text
from solver.model import FixedSupport, JointLoad, SpringSupport
from tests.members import Part, area, case, member

MM = "mm-N-MPa"
ROOT = Path(__file__).parents[2]

# The facts of each rule, as `solver.faults` states them.
FACTS: dict[str, dict[str, object]] = {
    "not_utf8": {},
    "not_json": {"reason": "no_value", "line": 3, "column": 7},
    "too_deep": {},
    "duplicate_key": {"key": "length"},
    "not_finite": {"value": "NaN"},
    "not_a_project": {"found": None},
    "newer_version": {"value": 2, "known": 1},
    "unknown_key": {"key": "lenght", "nearest": "length"},
    "missing_key": {"key": "length"},
    "wrong_type": {"expected": "number", "value": "long"},
    "not_greater_than": {"bound": 0, "value": -0.04},
    "below_least": {"bound": 0, "value": -1.0},
    "not_a_choice": {"value": "fixd", "choices": ("fixed", "spring"), "nearest": None},
    "no_word_or_number": {"value": "stuck", "choices": ("fixed", "free"), "nearest": None},
    "no_reason": {},
    "empty_text": {},
    "too_few_segments": {},
    "joint_count": {"joints": 3, "segments": 3},
    "duplicate_mark": {"value": "A", "first": "segments[0].mark"},
    "unknown_reference": {"kind": "material", "value": "Stel", "nearest": "Steel"},
    "inner_not_below_outer": {"inner": 0.06, "outer": 0.05, "end": "end"},
    "duplicate_limit": {"joint": "2", "first": "limits.displacement[0].joint"},
    "same_joint": {"joint": "2"},
    "both_keys": {"key": "supports", "other": "support"},
    "neither_key": {"key": "fillet_radius", "other": "factor"},
    "no_companion_segments": {},
    "companion_order": {"from": "2", "to": "0"},
    "same_combination": {"combination": "Working"},
    "not_inside": {"length": 0.35, "value": 0.4},
    "parts_differ": {"kind": "material"},
    "joint_carries": {"kind": "support", "joint": "2"},
    "companion_full": {"companion": "S"},
    "repeats": {"count": 0, "most": 200},
    "several_records": {"count": 2},
    "not_held": {},
    "not_pressed": {},
    "movement_without_support": {"joint": "1", "case": "Service"},
    "companion_length": {
        "companion": "S",
        "length": 0.9,
        "span": 0.85,
        "difference": 0.05,
        "kind": "too_long",
    },
}


def test_every_rule_reason_kind_and_error_has_words() -> None:
    assert set(FAULTS) == set(FACTS) == set(get_args(Rule))
    assert set(ENTRIES) == set(get_args(EntryRule))
    assert set(JSON_SLIPS) == set(get_args(JsonSlip))
    assert set(REASONS) == set(REMEDIES) == set(get_args(Reason))
    assert set(NOT_MADE) | set(REASONS_OF_SHOULDERS) == set(get_args(Reason))
    assert set(QUANTITIES) == set(get_args(CheckKind))
    assert set(CHECKS) == set(SUBJECTS) == set(QUANTITIES) - {"fatigue"}  # its words follow from two facts
    assert {*ERRORS, NotSolvable} == set(InputError.__subclasses__())


@pytest.mark.parametrize("rule", FACTS)
@pytest.mark.parametrize("system", [None, "in-kip-ksi"])
def test_every_fault_names_place_and_rule(rule: str, system: str | None) -> None:
    place = "segments[2].section.diameter"
    sentence = fault_sentence(Fault(place, rule, FACTS[rule]), system)
    assert sentence.startswith("segment 3, section, diameter: " if system else f"{place}: ")
    assert not {"{", "}"} & set(sentence)


@pytest.mark.parametrize(
    ("fault", "system", "sentence"),
    [
        (
            Fault("segments[2].section.diameter", "not_greater_than", {"bound": 0, "value": -0.04}),
            None,
            "segments[2].section.diameter: must be greater than 0, is -0.04",
        ),
        (
            Fault("segments[2].section.diameter", "not_greater_than", {"bound": 0, "value": -0.04}),
            MM,
            "segment 3, section, diameter: must be greater than 0, is −40 mm",
        ),
        (
            Fault("segments[0].lenght", "unknown_key", FACTS["unknown_key"]),
            None,
            'segments[0].lenght: there is no key "lenght" here; did you mean "length"?',
        ),
        (
            Fault("segments[1].mark", "duplicate_mark", FACTS["duplicate_mark"]),
            MM,
            'segment 2, mark: "A" is taken already, at segment 1, mark; choose another',
        ),
        (
            Fault("", "not_json", FACTS["not_json"]),
            None,
            (
                "is not JSON: a value is missing or misspelt (line 3, column 7);"
                " mend it there or open an earlier copy"
            ),
        ),
    ],
)
def test_fault_sentences(fault: Fault, system: str | None, sentence: str) -> None:
    assert fault_sentence(fault, system) == sentence


def test_long_values_are_cut() -> None:
    sentence = fault_sentence(Fault("title", "wrong_type", {"expected": "text", "value": 10**5000}))
    assert "about 5001 digits" in sentence
    sentence = fault_sentence(Fault("title", "wrong_type", {"expected": "text", "value": [["a"] * 9] * 9}))
    assert "is a list" in sentence
    assert len(fault_sentence(Fault("title", "not_finite", {"value": "9" * 999}))) < 120


@pytest.mark.parametrize(
    ("text", "sentence"),
    [
        (b'{"version": 1}', 'the format must be "barwright-project", is not given; '),
        (b'{"format": NaN}', 'the format must be "barwright-project", is not given; '),
        (b'{"format": 5}', 'the format must be "barwright-project", is 5; '),
        (b'{"format": "barwright-project", "version": 0}', "version: must be 1, is 0"),
        (
            b'{"format": "barwright-project", "version": 1, "joints": [], "segments": [{}]}',
            ", here are joints: 0, segments: 1; ",
        ),
        (b'{"format": "barwright-project", "version": 1, "title": NaN}', "must be a finite number, is NaN; "),
    ],
)
def test_a_fault_says_what_is_there(text: bytes, sentence: str) -> None:
    with pytest.raises(ProjectFileError) as caught:
        parse(text)
    assert any(sentence in said for said in error_sentences(caught.value))


def test_the_faults_of_a_file_come_as_sentences() -> None:
    with pytest.raises(ProjectFileError) as caught:
        parse(b'{"format": "barwright-project", "version": 1, "joints": [], "segments": [{"mark": 5}]}')
    sentences = error_sentences(caught.value)
    assert "segments[0].mark: must be a text, is 5" in sentences
    assert all(not {"{", "}"} & set(sentence) for sentence in sentences)


@pytest.mark.parametrize(
    ("place", "quantity", "words"),
    [
        (("segments", 2, "section", "outer_end"), "size", "segment 3, section, outside diameter at the end"),
        (("limits", "reaction", 0, "limit"), "force", "limits, reaction 1, limit"),
        (("limits", "relative", 0, "limit"), "displacement", "limits, relative displacement 1, limit"),
        (("combinations", 0, "factors", "Dead"), "factor", "combination 1, factor, “Dead”"),
        (("combinations", 0, "factors", "a.length [m]"), "factor", "combination 1, factor, “a.length [m]”"),
        (("combinations", 0, "factors", "length"), "factor", "combination 1, factor, “length”"),
        (("materials", 0, "name"), None, "material 1, name"),
        ((), None, ""),
    ],
)
def test_places(place: tuple[str | int, ...], quantity: str | None, words: str) -> None:
    assert quantity_at(place_text(place)) == quantity
    assert place_words(place_text(place)) == words


def test_the_solver_errors_in_words() -> None:
    project = member([Part(1.0, area(1e-3))], {0: FixedSupport()})
    contrast = StiffnessContrast("Working", 1, 2e-4, 1e3)
    assert "(2·10⁻⁷ times the largest" in error_sentences(contrast)[0]
    assert "at joint number 2" in error_sentences(contrast)[0]
    assert "at joint 1)" in error_sentences(contrast, project=project)[0]
    assert "to 3·10⁻⁵ only, 1·10⁻⁹ is wanted" in error_sentences(BoundNotMet("Working", 2.1e-5, 1e-9))[0]
    assert error_sentences(OutOfRange("Working", "stiffness"))[0].startswith("Working: a stiffness goes")
    whole = StiffnessContrast("Working", 1, 1e3, 1e3)
    assert "(1 times the largest force is left over" in error_sentences(whole)[0]
    unsolvable = NotSolvable((Fault("joints", "not_held"),), ("Working", "Lifted"))
    assert error_sentences(unsolvable)[0].endswith("a bedding (Working, Lifted)")


def test_whatever_goes_out_of_range_has_words() -> None:
    source = "".join(path.read_text() for path in (ROOT / "solver").glob("*.py"))
    raised = set(re.findall(r'(?:OutOfRange|_require)\(.*?"(\w+)"', source))
    assert {"stress", "mass"} < raised
    for what in raised:
        assert re.match("K: (an?|the) ", error_sentences(OutOfRange("K", what))[0]), what


def test_an_error_of_ours_has_no_sentence() -> None:
    with pytest.raises(TypeError):
        error_sentences(ZeroDivisionError())


def test_an_entry_error_is_its_sentence() -> None:
    assert isinstance(refusal("zero_divisor"), EntryError)
    assert refusal("zero_divisor").sentence == "Division by zero"


TENSION = Check(
    check="tension", combination="Hot start", status="pass", segment="C",
    position=0.76, value=128.7e6, limit=160e6, utilisation=128.7 / 160,
)  # fmt: skip


@pytest.mark.parametrize(
    ("check", "sentence"),
    [
        (TENSION, "C: 129 of 160 MPa in tension, 0.80, at 760 mm, Hot start"),
        (
            Check("compression", "Hot", "fail", "C", position=0.0, value=-140.06e6, limit=140e6,
                  utilisation=140.06 / 140),
            "C: 140.1 of 140 MPa in compression, 1.0004, at 0 mm, Hot",
        ),
        (
            Check("displacement", "Hot", "pass", joint="2", position=1.0, value=-1.5e-3, limit=2e-3,
                  utilisation=0.75),
            "Joint 2: displacement −1.50 of 2 mm, 0.75, Hot",
        ),
        (
            Check("relative", "Hot", "pass", start="0", end="2", value=1e-3, limit=1.5e-3, utilisation=2 / 3),
            "Joints 0 to 2: relative displacement 1.00 of 1.5 mm, 0.67, Hot",
        ),
        (
            Check("reaction", "Hot", "pass", joint="0", position=0.0, value=-139e3, limit=4e5,
                  utilisation=139 / 400),
            "Joint 0: reaction −139\u202f000 of 400\u202f000 N, 0.35, Hot",
        ),
        (
            Check("tension", "Hot", "not_made", segment="C", position=0.1, reason="no_allowable_tension"),
            (
                "C: tension not checked, Hot: the material has no allowable stress in tension;"
                " enter the material's allowable stress in tension"
            ),
        ),
    ],
)  # fmt: skip
def test_check_sentences(check: Check, sentence: str) -> None:
    assert check_sentence(check, MM) == sentence


@given(st.floats(1e4, 1e9), st.floats(-1e-6, 1e-6) | st.floats(-0.9, 3.0), st.sampled_from(SYSTEM_NAMES))
def test_value_and_limit_never_contradict_the_status(limit: float, over: float, system: str) -> None:
    value = limit * (1 + over)
    status = "pass" if value / limit <= 1 + PASS_MARGIN else "fail"
    texts = compared(value, limit, status, "stress", system)
    shown, bound = (float(text.replace("\u202f", "").replace("·10⁹", "e9")) for text in texts)
    assert (shown > bound) == (status == "fail")


class Checked:
    """As much of `Results` as a verdict is about."""

    def __init__(self, *checks: Check) -> None:
        self.checks = checks
        self.verdict = verdict_of(checks)
        self.governing = governing_of(checks)
        self.unloaded = ()


def made(kind: str, utilisation: float) -> Check:
    status = "pass" if utilisation <= 1 else "fail"
    return Check(kind, "Hot", status, "C", position=0.0, value=1.0, limit=1.0, utilisation=utilisation)


NOT_MADE_CHECK = Check("tension", "Hot", "not_made", segment="D", reason="no_allowable_tension")
WAIVED = Check("stability", "Hot", "waived", reason="no_lateral", waiver="guided in its sleeve")
PUSHED_NOT_MADE = Check("compression", "Hot", "not_made", segment="D", reason="no_allowable_compression")


@pytest.mark.parametrize(
    ("checks", "line"),
    [
        ((), "Nothing checked"),
        ((NOT_MADE_CHECK,), "Nothing checked"),
        ((PUSHED_NOT_MADE,), "Nothing checked"),
        ((made("tension", 0.8),), "Passes"),
        ((made("tension", 0.8), NOT_MADE_CHECK), "No check fails, 1 not made"),
        ((made("tension", 0.8), PUSHED_NOT_MADE), "No check fails, 1 not made"),
        ((made("tension", 0.8), WAIVED), "Passes; stability waived"),
        ((WAIVED,), "Nothing checked"),
        ((made("tension", 1.1), WAIVED), "Does not pass"),
        ((made("tension", 0.8), made("compression", 1.1)), "Does not pass"),
        ((made("tension", 1.1), NOT_MADE_CHECK), "Does not pass"),
    ],
)
def test_the_verdict_never_flatters(checks: tuple[Check, ...], line: str) -> None:
    assert verdict_line(Checked(*checks)) == line


def test_what_stands_under_the_verdict() -> None:
    assert verdict_detail(Checked(made("tension", 0.8))) == "Largest utilisation 0.80: segment C, Hot"
    assert verdict_detail(Checked(made("tension", 1.13), made("compression", 0.2), NOT_MADE_CHECK)) == (
        "Largest utilisation 1.13: segment C, Hot. 1 of 3 checks fails, 1 not made"
    )
    two = verdict_detail(Checked(made("tension", 1.13), made("compression", 1.2)))
    assert two.endswith(". 2 of 2 checks fail")
    assert verdict_detail(Checked(NOT_MADE_CHECK)) == "1 check could not be made"
    assert verdict_detail(Checked()) == (
        "Nothing stresses the member and it has no limits: enter loads or limits to check"
    )


def test_the_numerical_error_is_not_called_more_than_it_is() -> None:
    sentence = numerical_error_sentence(2.1e-11)
    assert sentence == (
        "Numerical error at most 3·10⁻¹¹ (displacement, energy norm);"
        " it says nothing about the model or the input"
    )
    assert numerical_error_sentence(float("nan")) == "Numerical error unknown"
    assert "certified" not in sentence + caution()
    assert "competent engineer" in caution()


def test_reasons_say_what_to_enter() -> None:
    assert reason_text("no_support").endswith("give it a support or take the limit out")


def test_the_unsolvable_say_why() -> None:
    from solver.solve import solve

    loads = case(on_joints=[JointLoad(joint="1", force=1.0)])
    with pytest.raises(NotSolvable) as caught:
        solve(member([Part(1.0, area(1e-3))], {}, [loads]))
    assert "nothing holds the member along its axis" in error_sentences(caught.value)[0]
    assert solve(member([Part(1.0, area(1e-3))], {0: SpringSupport(stiffness=1e6)}, [loads]))


def test_a_limit_keeps_the_digits_typed_and_none_that_a_conversion_made() -> None:
    assert compared(10e6, 140e6, "pass", "stress", "in-kip-ksi") == ("1.45", "20.31")
    assert compared(0.01, 1.6875 * 0.0254, "pass", "displacement", "in-kip-ksi") == ("0.394", "1.6875")
