"""The starter list of materials: plausible, without allowables, and named as people type."""

import pytest
from msgspec import UNSET

from app import edits
from app.typical_materials import not_in, typical_materials, typical_named, with_typical
from solver.model import FixedSupport, JointLoad
from solver.solve import solve
from tests.members import Part, case, member, round_bar

PULLED = case(on_joints=[JointLoad("1", 1000.0)])
ROD = member([Part(1.0, round_bar(0.04))], {0: FixedSupport()}, [PULLED])

# Wide bounds of engineering solids, from memory; what lies outside is a slip of the pen or of a power of ten.
BOUNDS = {"modulus": (5e9, 250e9), "expansion": (3e-6, 30e-6), "density": (300.0, 9500.0)}


@pytest.mark.parametrize("material", typical_materials(), ids=lambda material: material.name)
def test_each_has_plausible_values_and_no_allowable(material):
    for key, (low, high) in BOUNDS.items():
        assert low <= getattr(material, key) <= high
    assert material.allowable_tension is UNSET
    assert material.allowable_compression is UNSET


def test_they_differ_in_name_and_rank_as_everyone_knows():
    by_name = {material.name: material for material in typical_materials()}
    assert len(by_name) == len(typical_materials())
    stiff = ["Steel", "Titanium", "Aluminium alloy", "Concrete, normal weight", "Softwood, parallel to grain"]
    assert stiff == sorted(stiff, key=lambda name: -by_name[name].modulus)
    warm = ["Aluminium alloy", "Stainless steel", "Steel", "Titanium", "Softwood, parallel to grain"]
    assert warm == sorted(warm, key=lambda name: -by_name[name].expansion)


def test_a_name_is_found_in_small_and_capital_letters_only_as_a_whole():
    assert typical_named(" stainless STEEL ").name == "Stainless steel"
    assert typical_named("stainless") is None


def test_one_is_added_once_and_told_to_be_verified():
    steel = typical_named("steel")
    project, note = with_typical(ROD, steel)
    assert project.materials == (*ROD.materials, steel)
    assert note == "Steel added with typical values, verify; it has no allowable stresses yet"
    assert steel not in not_in(project)
    assert with_typical(project, steel) == (project, "")


def test_a_material_of_the_users_own_with_that_name_is_left_alone():
    own = edits.set_value(ROD, ("materials", 0, "name"), "Steel")
    assert with_typical(own, typical_named("steel")) == (own, "")


def test_a_member_of_a_typical_material_does_not_look_passed():
    project, _note = with_typical(ROD, typical_named("brass"))
    project = edits.set_value(project, ("segments", 0, "material"), "Brass")
    results = solve(project)
    assert results.verdict == "incomplete"
    assert "not_made" in {check.status for check in results.checks}


def test_they_are_added_in_the_users_language(monkeypatch):
    monkeypatch.setattr("app.typical_materials.tr", lambda words: {"Steel": "Stahl"}.get(words, words))
    assert typical_named("stahl").name == "Stahl"
