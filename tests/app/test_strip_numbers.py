"""The strips as numbers: a spreadsheet reads back the solver's curve, extremes and both sides included."""

import csv
import io

import numpy as np
import pytest
from msgspec.structs import replace

from app.samples import read_sample
from app.strip_numbers import csv_text, number_rows
from app.units import SYSTEM_NAMES, to_display
from app.words import SOURCE, use_language
from solver.fields import at, checked_states, curves, envelope
from solver.model import FixedSupport
from solver.solve import solve
from tests.members import Part, member, round_bar


@pytest.fixture(scope="module")
def rod():
    return solve(read_sample("tie_rod"))


@pytest.fixture
def german():
    use_language("de")
    yield
    use_language(SOURCE)


def read(rows):
    """Heads, and the columns as numbers; the second one is text."""
    columns = list(zip(*rows[1:], strict=True))
    numbers = [np.array([float(n) if n else np.nan for n in c]) for i, c in enumerate(columns) if i != 1]
    return rows[0], columns[1], numbers


def test_a_state_reads_back_as_the_curve(rod):
    heads, marks, (x, u, force, stress, utilisation) = read(number_rows(rod, 0))
    units = rod.project.display.unit_system
    shown = curves(rod, 0)
    assert heads[1] == "Segment"
    assert heads[0].startswith("x (")
    assert marks[0] == rod.project.segments[0].mark
    for column, quantity, values in (
        (x, "length", shown.x),
        (u, "displacement", shown.displacement),
        (force, "force", shown.force),
        (stress, "stress", shown.stress),
        (utilisation, "factor", shown.utilisation),
    ):
        np.testing.assert_allclose(column, to_display(values, quantity, units), rtol=5e-7, atol=1e-300)


@pytest.mark.parametrize("name", ["tie_rod", "quay_pile", "hoist_shaft"])
@pytest.mark.parametrize("state", [0, None])
def test_joints_and_extremes_have_every_digit_and_what_is_between_few(name, state):
    results = solve(read_sample(name))
    rows = number_rows(results, state)
    _heads, _marks, columns = read(rows)
    units, shown = (
        results.project.display.unit_system,
        curves(results, 0) if state == 0 else envelope(results),
    )
    of = ("", "") if state == 0 else ("_max", "_min")
    names = [f"{kind}{end}" for kind in ("displacement", "force", "stress") for end in dict.fromkeys(of)]
    exact = [to_display(shown.x, "length", units)]
    exact += [to_display(getattr(shown, name), name.partition("_")[0], units) for name in names]
    exact.append(shown.utilisation)
    segment = shown.segment
    assert np.all(np.diff(columns[0]) >= 0.0)
    for column, values in zip(columns, exact, strict=True):
        for index in range(len(results.project.segments)):
            here = np.flatnonzero(segment == index)
            ends = here[[0, -1]]
            np.testing.assert_allclose(column[ends], values[ends], rtol=1e-14)
            if not np.isnan(values[here]).all():
                for extreme in (np.nanargmin, np.nanargmax):
                    wanted = values[here[extreme(values[here])]]
                    assert column[here[extreme(column[here])]] == pytest.approx(wanted, rel=1e-14, abs=0.0)
    long = sum(len(row[0].strip("-0.").replace(".", "")) > 7 for row in rows[1:])
    assert long < len(rows) / 4


def test_a_joint_stands_in_two_rows_one_for_each_side(rod):
    joint = float(rod.position[1])
    units = rod.project.display.unit_system
    place = f"{to_display(joint, 'length', units):.15g}"
    found = [row for row in number_rows(rod, 0, ("force",))[1:] if row[0] == place]
    assert [row[1] for row in found] == [segment.mark for segment in rod.project.segments[:2]]
    sides = at(rod, 0, joint)
    wanted = [to_display(side.force, "force", units) for side in (sides.left, sides.right)]
    assert [float(row[2]) for row in found] == pytest.approx(wanted, rel=1e-12)


def test_the_envelope_has_largest_and_smallest_with_the_exact_extremes(rod):
    heads, _marks, columns = read(number_rows(rod, None, ("stress", "utilisation")))
    assert [head.partition(", ")[0] for head in heads[2:]] == ["σ max", "σ min", "utilisation"]
    units = rod.project.display.unit_system
    largest = rod.segments.stress_max[checked_states(rod)].max()
    assert columns[1].max() == pytest.approx(to_display(float(largest), "stress", units), rel=1e-12)


@pytest.mark.parametrize("system", SYSTEM_NAMES)
def test_heads_say_the_units_of_each_system(rod, system):
    project = replace(rod.project, display=replace(rod.project.display, units=system))
    heads = number_rows(solve(project), 0)[0]
    assert all("(" in head and head.endswith(")") for head in (heads[0], *heads[2:5]))
    assert heads[5] == f"utilisation, {rod.states[0].name}"


def test_what_was_not_checked_is_empty():
    results = solve(member([Part(1.0, round_bar(0.04))], {0: FixedSupport()}))
    rows = number_rows(results, 0, ("utilisation",))
    assert {row[2] for row in rows[1:]} == {""}


def test_a_file_has_commas_between(rod):
    rows = number_rows(rod, 0)
    assert list(csv.reader(io.StringIO(csv_text(rows), newline=""))) == rows


def test_german_numbers_have_a_comma_and_semicolons_between(rod, german):
    rows = number_rows(rod, 0)
    assert any("," in row[3] for row in rows[1:])
    assert not any("." in cell for row in rows[1:] for cell in (row[0], *row[2:]))
    assert list(csv.reader(io.StringIO(csv_text(rows), newline=""), delimiter=";")) == rows


def test_the_heads_say_which_state_the_numbers_are_of(rod):
    assert number_rows(rod, 0, ("force",))[0][2].startswith(f"N, {rod.states[0].name} (")
    assert all(", Envelope (" in head for head in number_rows(rod, None, ("force",))[0][2:])
