"""The findings against numbers done by hand, and against the results they were picked from."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given, settings
from msgspec import structs

from app.findings import Findings, findings
from app.samples import names, read_sample
from app.units import SYSTEM_NAMES
from solver.model import (
    Combination,
    DisplacementLimit,
    FixedSupport,
    JointLoad,
    Lateral,
    Limits,
    Project,
    ReactionLimit,
    RelativeLimit,
    SegmentLoad,
    SpringSupport,
)
from solver.solve import solve
from tests.members import STEEL, Part, area, case, member, round_bar, waived
from tests.strategies import projects

MM = "mm-N-MPa"


def stepped(limits: Limits | None = None, **part: float) -> Project:
    """Two parts of 1000 and 500 mm² held at joint 0, pulled by 60 kN at joint 1 and pushed by 40 kN at 2."""
    parts = [Part(1.0, area(1e-3), **part), Part(0.5, area(5e-4), **part)]
    loads = [
        case("Pull", on_joints=[JointLoad(joint="1", force=60e3)]),
        case("Push", on_joints=[JointLoad(joint="2", force=-40e3)]),
    ]
    combinations = [
        Combination(name="Both", factors={"Pull": 1.0, "Push": 1.0}),
        Combination(name="Rare", factors={"Pull": 2.0, "Push": 1.0}, allowable_factor=1.25),
    ]
    project = member(parts, {0: FixedSupport()}, loads, combinations)
    return structs.replace(project, limits=limits) if limits else project


def found(project: Project, system: str = MM) -> Findings:
    return findings(solve(project), system)


ALLOWABLES = {"allowable_tension": 160e6, "allowable_compression": 100e6}


def test_segments_come_worst_first_with_their_numbers() -> None:
    """By hand: A 20 and 80 MPa in tension, B 80 MPa in compression; of 160 (200) and 100 (125) MPa."""
    items = found(stepped(**ALLOWABLES)).segments
    assert [(item.mark, item.segment, item.state, item.utilisation_text) for item in items] == [
        ("B", 1, "Both", "0.80"),
        ("A", 0, "Rare", "0.40"),
    ]
    assert items[0].sentence == "B: 80.0 of 100 MPa in compression, 0.80, at 1000 mm, Both"
    assert items[0].short == "80.0 of 100 MPa in compression, at 1000 mm, Both"
    assert items[1].sentence == "A: 80.0 of 200 MPa in tension, 0.40, at 0 mm, Rare"


def test_the_scale_is_that_of_the_governing_allowable_factor() -> None:
    """A is governed by Rare (factor 1.25): there 80 MPa; 20 MPa in Both count 25 MPa at that factor."""
    band = found(stepped(**ALLOWABLES)).segments[1].band
    # Stresses come out of a solution with rounding, hence 1e-12.
    assert math.isclose(band.low, 25e6, rel_tol=1e-12)
    assert math.isclose(band.high, 80e6, rel_tol=1e-12)
    assert (band.compression, band.tension) == (-125e6, 200e6)
    assert (band.compression_text, band.tension_text) == ("−125", "200")


def test_without_an_allowable_the_check_is_missing_and_says_what_to_enter() -> None:
    result = found(stepped(allowable_tension=160e6))
    assert result.verdict == "incomplete"
    assert result.headline == "No check fails, 4 not made"
    missing, stability = result.not_made
    assert stability.sentence == "Not checked: stability, no joint is held sideways (Both, Rare)"
    assert missing.sentence == "Not checked: compression in B (Both, Rare)"
    assert missing.remedy == "enter an allowable stress in compression for of B"
    assert (missing.count, missing.segments, missing.joints) == (2, (1,), ())
    assert [item.mark for item in result.segments] == ["A"]
    assert result.segments[0].band.compression is None
    assert result.segments[0].band.compression_text == ""


def test_limits() -> None:
    """By hand: u₁ = 80 kN/210 MN in Rare; the relative one is 40 kN · 0.5 / 105 MN."""
    limits = Limits(
        displacement=(DisplacementLimit(joint="1", limit=1e-3),),
        relative=(RelativeLimit(start="1", end="2", limit=1e-4),),
        reaction=(ReactionLimit(joint="0", limit=100e3), ReactionLimit(joint="2", limit=1.0)),
    )
    result = found(stepped(limits, **ALLOWABLES))
    assert result.headline == "Does not pass"
    assert [(item.joints, item.utilisation_text, item.status) for item in result.limits] == [
        ((1, 2), "1.90", "fail"),
        ((0,), "0.80", "pass"),
        ((1,), "0.38", "pass"),
    ]
    assert result.limits[1].sentence == "Joint 0: reaction −80\u202f000 of 100\u202f000 N, 0.80, Rare"
    missing, _stability = result.not_made
    assert (missing.sentence, missing.joints) == ("Not checked: reaction at joint 2 (Both, Rare)", (2,))


def test_a_waived_check_is_named_wherever_something_is_compressed() -> None:
    pushed = found(waived(stepped(**ALLOWABLES), "guided in its sleeve"))
    assert pushed.headline == "Passes; stability waived"
    assert pushed.notes[0] == "Stability waived (Both, Rare): guided in its sleeve"
    assert pushed.not_made == ()
    pulled = structs.replace(
        stepped(**ALLOWABLES), combinations=(Combination(name="P", factors={"Pull": 1.0}),)
    )
    assert found(pulled).headline == "Passes"
    assert found(pulled).notes == ()


def test_a_waiver_does_not_hide_a_critical_factor_that_is_known() -> None:
    parts = [Part(1.0, round_bar(0.02), **ALLOWABLES)]
    pushed = member(parts, {0: FixedSupport()}, [case("Push", on_joints=[JointLoad("1", force=-10e3)])])
    pinned = tuple(structs.replace(j, lateral=Lateral(translation="fixed")) for j in pushed.joints)
    factor = math.pi**3 * STEEL * 0.02**4 / 64 / 10e3
    notes = found(waived(structs.replace(pushed, joints=pinned), "guided")).notes
    assert notes[0] == f"Stability waived (Push with critical factor {factor:.3g}): guided"


def test_bedding_is_said_to_have_no_slip_limit() -> None:
    part = Part(1.0, area(1e-3), bedding=1e6, allowable_compression=1e8)
    project = member([part], {}, [case(on_joints=[JointLoad(joint="0", force=1e3)])])
    result = found(project)
    assert any("no slip limit" in note for note in result.notes)
    assert result.books[0].bedding_text == "−1000 N"


def test_a_temperature_without_expansion_is_said_to_have_no_effect() -> None:
    parts = [Part(1.0, area(1e-3)), Part(1.0, area(1e-3), expansion=1.2e-5), Part(1.0, area(1e-3))]
    heat = [
        SegmentLoad(segment="A", temperature_start=30.0),
        SegmentLoad(segment="B", temperature_start=30.0),
    ]
    fade = [SegmentLoad(segment="C", temperature_start=0.0, temperature_end=5.0)]
    unused = [SegmentLoad(segment="B", load_start=1.0), SegmentLoad(segment="A", temperature_start=1.0)]
    cases = [case("Sun", on_segments=heat), case("Dusk", on_segments=fade), case("Fire", on_segments=unused)]
    used = Combination(name="Day", factors={"Sun": 1.0, "Dusk": 0.5, "Fire": 0.0})
    project = member(parts, {0: FixedSupport()}, cases, [used])
    note = "The temperature of A, C in Sun, Dusk has no effect: the material has no expansion"
    assert found(project).notes == (note,)
    sound = tuple(structs.replace(material, expansion=1e-5) for material in project.materials)
    assert found(structs.replace(project, materials=sound)).notes == ()


def test_gravity_without_density_is_said_to_give_no_weight() -> None:
    parts = [Part(0.1, area(1e-3), density=7850.0)] + [Part(0.1, area(1e-3))] * 8
    project = member(parts, {0: FixedSupport()}, [case("Own", gravity=9.81)])
    note = "Gravity in Own gives no weight to B, C, D, E, F and 3 more: the material has no density"
    assert found(project).notes == (note,)
    still = tuple(structs.replace(load, gravity=0.0) for load in project.load_cases)
    assert found(structs.replace(project, load_cases=still)).notes == ()


def test_the_books_add_up_as_shown() -> None:
    result = found(stepped(**ALLOWABLES), "mm-kN-MPa")
    both, rare = result.books
    assert [(reaction.mark, reaction.text) for reaction in both.reactions] == [("0", "−20.00 kN")]
    assert (both.loads_text, both.residual_text, both.bedding_text) == ("20.00 kN", "0.00 kN", "")
    assert rare.reactions_text == "−80.00 kN"
    # ½ Σ N² L / EA: (80 kN)² · 1 m / (2 · 210 MN) + (40 kN)² · 0.5 m / (2 · 105 MN)
    assert rare.strain_text == "19.05 J"
    assert rare.potential_text == "−19.05 J"


def test_displacements_are_the_largest_of_the_checked_states() -> None:
    result = found(stepped(**ALLOWABLES))
    assert [(item.mark, item.text, item.state) for item in result.displacements] == [
        ("0", "0 mm", "Both"),
        ("1", "0.3810 mm", "Rare"),
        ("2", "0.1905 mm", "Rare"),
    ]
    assert result.largest_displacement.joint == 1


def test_a_displacement_back_counts_by_its_size() -> None:
    loads = [case(name, on_joints=[JointLoad(joint="1", force=f)]) for name, f in (("a", 1e3), ("b", -21e3))]
    (_, tip) = found(member([Part(1.0, area(1e-3))], {0: FixedSupport()}, loads)).displacements
    assert (tip.text, tip.state) == ("−0.1000 mm", "b")


def test_nothing_to_check_is_no_pass() -> None:
    part = Part(1.0, area(1e-3))
    result = found(member([part], {0: SpringSupport(stiffness=1e7)}))
    assert (result.headline, result.verdict) == ("Nothing checked", "incomplete")
    assert result.segments == result.limits == result.not_made == ()
    assert result.books[0].name == "Unloaded"


def test_many_names_are_cut_short() -> None:
    parts = [Part(0.1, area(1e-3))] * 9
    project = member(parts, {0: FixedSupport()}, [case(on_joints=[JointLoad(joint="9", force=1.0)])])
    steel = structs.replace(project.materials[0], name="Steel")
    segments = tuple(structs.replace(segment, material="Steel") for segment in project.segments)
    (missing,) = found(structs.replace(project, materials=(steel,), segments=segments)).not_made
    assert missing.sentence == "Not checked: tension in A, B, C, D, E and 4 more (Load)"
    assert missing.remedy == "enter an allowable stress in tension for Steel"


@pytest.mark.parametrize("system", SYSTEM_NAMES)
@pytest.mark.parametrize("name", names())
def test_samples_have_findings_in_every_system(name: str, system: str) -> None:
    results = solve(read_sample(name))
    result = findings(results, system)
    beside = sum(len(companion.segments) for companion in results.project.companions)
    assert len(result.segments) == len(results.project.segments) + beside
    worst = max(item.utilisation for item in (*result.segments, *result.limits))
    assert worst == results.governing.utilisation
    texts = [item.sentence for item in (*result.segments, *result.limits)]
    assert not any("{" in text or "nan" in text for text in texts)


@settings(max_examples=40, deadline=None)
@given(projects())
def test_findings_of_any_project_agree_with_its_results(project: Project) -> None:
    results = solve(project)
    result = findings(results, project.display.unit_system)
    checked = sum(state.checked for state in results.states)
    made = [check for check in results.checks if check.status != "not_made"]
    assert sum(item.count for item in result.not_made) == len(results.checks) - len(made)
    # The second road: the array of utilisations, which the checks did not pass through.
    expected = np.fmax.reduce(results.segments.utilisation[:checked], axis=0)
    shown = {item.segment: item.utilisation for item in result.segments}
    for segment, utilisation in enumerate(expected.tolist()):
        assert shown.get(segment, math.nan) == pytest.approx(utilisation, rel=1e-12, nan_ok=True)
    for item in result.segments:
        leaves = item.band.high > (item.band.tension or math.inf) * (1 + 1e-6) or -item.band.low > -(
            item.band.compression or -math.inf
        ) * (1 + 1e-6)
        assert not leaves or item.status == "fail"
    squashed = bool(
        (results.segments.stress_min[:checked] < -1e-6 * abs(results.segments.stress_min).max()).any()
    )
    assert not (squashed and result.headline == "Passes")


def test_a_combination_without_any_load_never_passes_unsaid() -> None:
    limits = Limits(displacement=(DisplacementLimit(joint="1", limit=1e-3),))
    loaded = stepped(limits, **ALLOWABLES)
    empty = structs.replace(loaded, combinations=(Combination(name="ULS", factors={"Pull": 0.0}),))
    assert found(empty).headline == "Passes; no load in ULS"
    pair = (*empty.combinations, Combination(name="SLS", factors={}))
    assert found(structs.replace(empty, combinations=pair)).headline == "Passes; no load in ULS, SLS"
    bare = structs.replace(loaded, combinations=(), load_cases=())
    assert found(bare).headline == "Passes; no load entered"
    assert found(waived(loaded)).headline == "Passes; stability waived"
