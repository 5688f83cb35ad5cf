"""Shoulders and fatigue on paper: inputs, factors, peaks and swings, each to be redone by hand."""

from __future__ import annotations

import pytest
from msgspec.structs import replace

from app.samples import read_sample
from solver.model import Shoulder
from solver.shoulders import Step
from tests.app.sheet.test_sheet import content, formula_parts, in_units, read, sheet, value
from tests.shouldered import FILLET, spindle, with_shoulders, without_strength

SPINDLE = spindle()


def tables(project):
    return {block["title"]: block for block in content(project)["blocks"] if block["kind"] == "table"}


def heads(table):
    return [column["head"] for column in table["columns"]]


def test_what_was_entered_is_printed():
    found = tables(SPINDLE)
    assert heads(found["Materials"])[-3:] == [
        "Allowable peak stress",
        "Endured amplitude Sa",
        "Ultimate stress Su",
    ]
    assert found["Materials"]["rows"][0][-3:] == ["300", "140", "600"]
    assert [row[-1] for row in found["Joints and supports"]["rows"]] == ["–", "r 2 mm", "Kt 1.8", "–"]
    assert found["Ranges of fatigue"]["rows"] == [["Pulling", "Pushing"]]


def test_a_member_without_them_has_none_of_it():
    bare = replace(without_strength(with_shoulders(SPINDLE, {})), fatigue=())
    found = tables(bare)
    assert heads(found["Materials"])[-1] == "Allowable in compression"
    assert heads(found["Joints and supports"])[-1] == "Support"
    assert not [title for title in found if "houlder" in title or "atigue" in title]
    assert not {"factor", "peak", "fatigue"} & set(formula_parts(bare))


@pytest.mark.parametrize("units", ["mm-N-MPa", "in-kip-ksi"])
def test_the_factor_can_be_redone_by_hand(units):
    parts = formula_parts(in_units(SPINDLE, units))
    step, kt = parts["step_numbers"], parts["factor_numbers"]
    height = 0.5 * (value(step["large"]) - value(step["small"]))
    assert height == pytest.approx(value(step["height"]), rel=1e-6)
    numbers = [float(kt[key].replace("−", "-")) for key in ("c1", "c2", "c3", "c4")]
    depth = float(kt["depth"])
    redone = sum(c * depth**power for power, c in enumerate(numbers))
    assert redone == pytest.approx(float(kt["factor"]), rel=2e-4)
    assert float(kt["factor"]) == pytest.approx(Step(0.05, 0.04, 0.002).factor, rel=1e-4)


def test_the_governing_fatigue_can_be_redone_by_hand():
    parts = formula_parts(SPINDLE)
    swing = {key: value(text) for key, text in parts["fatigue_numbers"].items()}
    amplitude = swing["kt"] * abs(swing["first"] - swing["second"]) / 2
    mean = swing["kt"] * (swing["first"] + swing["second"]) / 2
    assert (amplitude, mean) == (
        pytest.approx(swing["amplitude"], rel=1e-4),
        pytest.approx(swing["mean"], rel=1e-4),
    )
    redone = swing["amplitude"] / swing["endured"] + swing["mean"] / swing["ultimate"]
    assert redone == pytest.approx(swing["utilisation"], abs=6e-5)


def test_a_governing_peak_can_be_redone_by_hand():
    weak = replace(
        SPINDLE, fatigue=(), materials=tuple(replace(m, allowable_peak=120e6) for m in SPINDLE.materials)
    )
    parts = formula_parts(weak)
    peak = {key: value(text) for key, text in parts["peak_utilisation_numbers"].items()}
    stress = {key: value(text) for key, text in parts["stress_numbers"].items()}
    assert stress["force"] / stress["area"] == pytest.approx(stress["stress"], rel=1e-5)
    assert peak["kt"] * peak["nominal"] == pytest.approx(peak["peak"], rel=1e-4)
    assert peak["peak"] / (peak["factor"] * peak["allowable"]) == pytest.approx(peak["utilisation"], abs=6e-5)


def test_a_compressive_mean_is_not_put_in():
    idle, pushed = (
        replace(c, factors={"Push": f}) for c, f in zip(SPINDLE.combinations, (0, 1), strict=True)
    )
    parts = formula_parts(replace(SPINDLE, combinations=(idle, pushed)))
    assert "endured_numbers" in parts
    assert "fatigue_numbers" not in parts


def test_the_tables_of_results_name_each_place_with_its_verdict():
    found = tables(SPINDLE)
    assert found["Fatigue, Pulling to Pushing"]["strong"] == [3, 4]
    assert [row[0] for row in found["Fatigue, Pulling to Pushing"]["rows"]] == [
        "segment A",
        "segment B",
        "segment C",
        "joint 1",
        "joint 2",
    ]
    peaks = found["Shoulders: peak stress Kt σ of the smaller side"]["rows"]
    assert [(row[0], row[1], row[-2], row[-1]) for row in peaks] == [
        ("1", "B", "0.33", "passes"),
        ("2", "C", "0.33", "passes"),
    ]


def test_what_is_rounding_alone_reads_0_beside_its_limit():
    blocks = content(read_sample("capstan_shaft"))["blocks"]
    named = [block for block in blocks if block["kind"] == "table"]
    peaks = next(b for b in named if b["title"].startswith("Shoulders: peak"))  # of Drawn tight, the first
    assert [row[2:5] for row in peaks["rows"]] == [["0", "1.8965", "0"], ["0", "2.2", "0"]]
    limits = next(b for b in named if b["title"] == "Limits" and b["rows"][0][2] == "Drawn tight")
    assert [row[4] for row in limits["rows"] if row[1] == "reaction"] == ["0", "0"]


def test_what_has_no_factor_is_named_as_not_checked():
    project = with_shoulders(SPINDLE, {1: Shoulder(fillet_radius=1e-4), 2: FILLET})
    text = " ".join(read(sheet(project)).split())
    assert "the step is 50 times as high as the fillet radius" in text
    assert "NOT CHECKED, and so not passed" in text
