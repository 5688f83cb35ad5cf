"""What stops cost: a ratio to the same member without them, in processor time."""

from __future__ import annotations

import time
from dataclasses import replace

import numpy as np
import pytest

from app.samples import read_sample
from solver.axial import solve_axial
from solver.chain import Stops
from solver.packing import pack
from tests.benchmarks.test_solver_speed import NAMES, cpu_seconds, report, stepped

__all__ = ["report"]

FOUR_STOPS = 3.0  # times the same member without
MANY_STOPS = 60.0  # 200 of them on 150 segments, in three states of very different contacts

pytestmark = pytest.mark.benchmark(timer=time.process_time, min_rounds=5)


def ratio_of(chain, stopped, loads, number):
    """The least of three, for the two sides are not measured at the same instant."""
    tries = []
    for _ in range(3):
        without = cpu_seconds(lambda: solve_axial(chain, loads, NAMES), number=number)
        with_stops = cpu_seconds(lambda: solve_axial(stopped, loads, NAMES), number=number)
        tries.append((with_stops / without, without))
    return min(tries)


def test_twelve_segments_with_four_stops(benchmark, report):
    chain, loads, _ = pack(read_sample("hoist_shaft"), cases=False)
    moved = solve_axial(chain, loads, NAMES).joint_displacement
    joint = np.array([3, 6, 9, 11])
    clearance = 0.6 * np.abs(moved[:, joint]).min(axis=0)
    stops = Stops(joint, np.sign(moved[0, joint]), clearance, np.array([np.inf, 1e9] * 2))
    stopped = replace(chain, stops=stops)
    closed = solve_axial(stopped, loads, NAMES).push > 0
    assert len({tuple(row) for row in closed.tolist()}) == 3  # no two states share a matrix
    benchmark(solve_axial, stopped, loads, NAMES)
    ratio, without = ratio_of(chain, stopped, loads, 30)
    report(
        f"12 segments, 4 stops: {ratio:.2f} times the {without * 1e3:.2f} ms without ({FOUR_STOPS} promised)"
    )
    assert ratio <= FOUR_STOPS


def test_two_hundred_stops(benchmark, report):
    chain, loads = stepped(150)
    rng = np.random.default_rng(1)
    stops = Stops(
        np.sort(rng.integers(0, 151, 200)),
        rng.choice([-1.0, 1.0], 200),
        rng.uniform(0, 1e-4, 200),
        np.where(rng.random(200) < 0.5, np.inf, 1e9),
    )
    stopped = replace(chain, stops=stops)
    assert (solve_axial(stopped, loads, NAMES).push > 0).sum() > 30
    benchmark.pedantic(solve_axial, (stopped, loads, NAMES), rounds=3)
    ratio, without = ratio_of(chain, stopped, loads, 3)
    report(f"150 segments, 200 stops: {ratio:.1f} times the {without * 1e3:.2f} ms without")
    assert ratio <= MANY_STOPS
