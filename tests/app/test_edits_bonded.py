"""Edits keep bonded parts right: cut, joined, turned, copied, renamed, and no material is lost."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st
from msgspec.structs import replace
from numpy.testing import assert_allclose

from app import edits
from app.edits import EditError
from solver.model import BondedPart, Material, RoundSection
from solver.solve import solve
from tests.members import Part, area, case, member
from tests.solver.test_bonded import composite_projects


def two_segments(second=None):
    """Two alike, each with a tapered core of its own material."""
    parts = [Part(1.0, area(1e-3)), Part(1.0, area(1e-3))]
    project = member(parts, {})
    core = BondedPart("of B", RoundSection(diameter=0.02, diameter_end=0.04))
    rest = core if second is None else second
    segments = (
        replace(project.segments[0], bonded=(core,)),
        replace(project.segments[1], bonded=(rest,), material="of A"),
    )
    return replace(project, segments=segments, materials=(*project.materials, Material("Spare", 1e9)))


@given(composite_projects(2), st.floats(0.1, 0.9))
def test_a_split_carries_the_same_and_joining_undoes_it(project, share):
    index = len(project.segments) - 1
    split = edits.split_segment(project, index, share * project.segments[index].length)
    assert len(split.segments[index].bonded) == len(project.segments[index].bonded)
    one, two = solve(project), solve(split)
    assert_allclose(two.mass, one.mass, rtol=1e-9)
    assert edits.join_segments(split, index, index + 1) == project


@given(composite_projects(2))
def test_turning_twice_gives_the_parts_back(project):
    turned = edits.reverse_member(project)
    assert_allclose(solve(turned).mass, solve(project).mass, rtol=1e-12)
    assert edits.reverse_member(turned) == project


def test_segments_with_unlike_parts_are_not_joined():
    other = BondedPart("of A", RoundSection(diameter=0.02))
    with pytest.raises(EditError) as refused:
        edits.join_segments(two_segments(other), 0, 1)
    assert [fault.facts["kind"] for fault in refused.value.faults] == ["bonded"]


def test_neighbours_with_tapering_parts_are_not_alike():
    project = two_segments()
    assert len(edits.join_equal_neighbours(project).segments) == 2
    even = BondedPart("of B", RoundSection(diameter=0.02))
    alike = replace(project, segments=tuple(replace(s, bonded=(even,)) for s in project.segments))
    joined = edits.join_equal_neighbours(alike)
    assert [segment.bonded for segment in joined.segments] == [(even,)]


def test_a_new_segment_goes_on_with_the_parts_of_its_neighbour():
    grown = edits.insert_segment(two_segments(), 2)
    assert grown.segments[2].bonded == (BondedPart("of B", RoundSection(diameter=0.04)),)


def test_renaming_a_material_renames_it_in_the_parts():
    renamed = edits.set_value(two_segments(), ("materials", 1, "name"), "Core")
    assert [segment.bonded[0].material for segment in renamed.segments] == ["Core", "Core"]


@pytest.mark.parametrize("edit", [edits.mirror_member, lambda p: edits.repeat_segments(p, 0, 1, 1)])
def test_copies_have_the_parts_too(edit):
    heavy = case(gravity=9.81)
    project = replace(two_segments(), load_cases=(heavy,))
    assert all(segment.bonded for segment in edit(project).segments)
