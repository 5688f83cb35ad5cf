"""Packing: loads land where they belong, records add up, factors multiply, states come in order."""

from __future__ import annotations

import numpy as np
from hypothesis import given
from msgspec.structs import replace
from numpy.testing import assert_allclose, assert_array_equal

from solver.model import (
    Combination,
    FixedSupport,
    JointLoad,
    SegmentLoad,
    SpringSupport,
    end_of,
)
from solver.packing import pack, states_of
from tests.members import Part, area, case, member, round_bar
from tests.strategies import projects

PARTS = [
    Part(1.0, area(2e-3), expansion=1.2e-5, density=7850.0),
    Part(2.0, round_bar(0.04, 0.02), bedding=1e6),
]
HELD = {0: FixedSupport(), 2: SpringSupport(stiffness=4e7)}
FIRST = case(
    "First",
    gravity=-9.81,
    on_segments=[
        SegmentLoad("B", load_start=100.0, load_end=200.0, temperature_start=10.0, lack_of_fit=1e-4),
        SegmentLoad("B", load_start=1.0, temperature_start=5.0, temperature_end=7.0),
    ],
    on_joints=[JointLoad("1", force=10.0), JointLoad("1", force=5.0), JointLoad("2", movement=1e-3)],
)
SECOND = case("Second", on_joints=[JointLoad("1", force=100.0)])
BOTH = Combination("Both", {"First": 2.0, "Second": -1.0}, 1.25)


def test_chain_holds_the_members_data():
    chain, _, _ = pack(member(PARTS, HELD))
    assert_array_equal(chain.length, [1.0, 2.0])
    assert_array_equal(chain.fixed, [True, False, False])
    assert_array_equal(chain.spring, [0.0, 0.0, 4e7])
    assert_array_equal(chain.bedding, [[0.0, 0.0], [1e6, 1e6]])
    assert_array_equal(chain.expansion, [1.2e-5, 0.0])
    assert_array_equal(chain.density, [7850.0, 0.0])
    assert_allclose(chain.area[1], np.pi / 4 * np.array([16e-4, 8e-4, 4e-4]), rtol=1e-14)


def test_records_add_up_and_absent_ends_follow_their_start():
    _, loads, states = pack(member(PARTS, HELD, [FIRST]))
    assert [state.name for state in states] == ["First"]
    assert_array_equal(loads.distributed[0], [[0.0, 0.0], [101.0, 201.0]])
    assert_array_equal(loads.temperature[0], [[0.0, 0.0], [15.0, 17.0]])
    assert_array_equal(loads.lack_of_fit[0], [0.0, 1e-4])
    assert_array_equal(loads.joint_force[0], [0.0, 15.0, 0.0])
    assert_array_equal(loads.movement[0], [0.0, 0.0, 1e-3])
    assert_array_equal(loads.gravity, [-9.81])


def test_combination_scales_every_kind_of_load():
    _, loads, _ = pack(member(PARTS, HELD, [FIRST, SECOND], [BOTH]))
    assert_array_equal(loads.distributed[0, 1], [202.0, 402.0])
    assert_array_equal(loads.temperature[0, 1], [30.0, 34.0])
    assert_array_equal(loads.lack_of_fit[0], [0.0, 2e-4])
    assert_array_equal(loads.joint_force[0], [0.0, 30.0 - 100.0, 0.0])
    assert_array_equal(loads.movement[0, 2], 2e-3)
    assert_array_equal(loads.gravity[0], -19.62)


def test_states_are_combinations_then_cases_and_only_the_first_are_checked():
    project = member(PARTS, HELD, [FIRST, SECOND], [BOTH])
    kinds = [(state.name, state.kind, state.checked) for state in states_of(project)]
    assert kinds == [("Both", "combination", True), ("First", "case", False), ("Second", "case", False)]
    assert [state.name for state in states_of(project, cases=False)] == ["Both"]
    assert states_of(project)[0].allowable_factor == 1.25


def test_without_combinations_the_cases_are_checked_whatever_is_asked():
    project = member(PARTS, HELD, [FIRST, SECOND])
    for cases in (True, False):
        states = states_of(project, cases=cases)
        assert [(state.name, state.checked) for state in states] == [("First", True), ("Second", True)]


def test_without_cases_there_is_one_unloaded_state():
    _, loads, states = pack(member(PARTS, HELD))
    assert [(state.name, state.kind, state.checked) for state in states] == [("Unloaded", "unloaded", True)]
    assert not loads.distributed.any()
    assert loads.distributed.shape == (1, 2, 2)


def test_combination_without_any_case_is_unloaded():
    _, loads, _ = pack(member(PARTS, HELD, [], [Combination("Empty")]))
    assert loads.joint_force.shape == (1, 3)
    assert not loads.joint_force.any()


def test_a_number_too_large_arrives_as_infinite_and_without_a_warning():
    huge = case("Huge", on_joints=[JointLoad("1", force=1.5e308), JointLoad("1", force=1.5e308)])
    _, loads, _ = pack(member(PARTS, HELD, [huge]))
    assert np.isinf(loads.joint_force[0, 1])


@given(projects())
def test_total_load_is_what_adding_the_records_by_hand_gives(project):
    _, loads, states = pack(project)
    for index, state in enumerate(states):
        by_hand = sum(
            state.factors.get(each.name, 0.0) * load.force
            for each in project.load_cases
            for load in each.joint_loads
        )
        assert_allclose(loads.joint_force[index].sum(), by_hand, rtol=1e-12, atol=1e-7)
        ends = sum(
            state.factors.get(each.name, 0.0) * end_of(load.load_start, load.load_end)
            for each in project.load_cases
            for load in each.segment_loads
        )
        assert_allclose(loads.distributed[index, :, 1].sum(), ends, rtol=1e-12, atol=1e-8)


@given(projects())
def test_arrays_cannot_be_written_to(project):
    chain, loads, _ = pack(project)
    for record in (chain, chain.stops, loads):
        values = [getattr(record, name) for name in record.__slots__]
        arrays = [value for value in values if isinstance(value, np.ndarray)]
        assert not any(array.flags.writeable for array in arrays)


def test_order_of_the_cases_does_not_matter():
    project = member(PARTS, HELD, [FIRST, SECOND], [BOTH])
    swapped = replace(project, load_cases=(SECOND, FIRST))
    assert_allclose(pack(project)[1].distributed[0], pack(swapped)[1].distributed[0], rtol=1e-15)
