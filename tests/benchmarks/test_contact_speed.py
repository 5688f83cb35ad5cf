"""What stops and companions cost: ratios to members without them and growth, in processor time."""

from __future__ import annotations

import time
from dataclasses import replace

import numpy as np
import pytest

from app.samples import read_sample
from solver.axial import solve_axial
from solver.chain import Companions, Stops
from solver.packing import pack
from tests.benchmarks.test_solver_speed import NAMES, cpu_seconds, report, stepped

__all__ = ["report"]

FOUR_STOPS = 3.0  # times the same member without
NEAR_LINEAR = 1.3
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


def with_sleeves(count):
    """Prismatic segments, and beside every three of them a sleeve of two parts; every other can part."""
    chain, loads = stepped(count)
    start = np.arange(0, count - 2, 3)
    length = np.repeat([chain.length[i : i + 3].sum() / 2 for i in start], 2)
    own = 2 * start.size
    companions = Companions(start, start + 3, np.arange(0, own + 1, 2), np.arange(start.size) % 2.0)
    whole = replace(
        chain,
        length=np.append(chain.length, length),
        modulus=np.full(count + own, 2.1e11),
        area=np.concatenate([chain.area, np.full((own, 3), 1e-3)]),
        bedding=np.zeros((count + own, 2)),
        expansion=np.full(count + own, 1.2e-5),
        density=np.full(count + own, 7850.0),
        companions=companions,
    )
    more = {
        "distributed": np.zeros((3, own, 2)),
        "temperature": np.zeros((3, own, 2)),
        "lack_of_fit": np.full((3, own), 1e-4),
    }
    beside = {name: np.concatenate([getattr(loads, name), value], axis=1) for name, value in more.items()}
    return whole, replace(loads, **beside)


@pytest.mark.parametrize("parting", [0.0, 1.0])
def test_many_companions_grow_near_linearly(benchmark, report, parting):
    seconds = {}
    for count in (900, 9_000):
        chain, loads = with_sleeves(count)
        own = replace(chain.companions, parting=parting * chain.companions.parting)
        whole = replace(chain, companions=own)
        seconds[count] = cpu_seconds(lambda c=whole, q=loads: solve_axial(c, q, NAMES), repeats=3)
    benchmark.pedantic(solve_axial, (whole, loads, NAMES), rounds=2)
    step = seconds[9_000] / seconds[900] / 10
    report(
        ", ".join(f"{count // 3} companions in {s * 1e3:.0f} ms" for count, s in seconds.items())
        + f" ({'half of them can part' if parting else 'tied'}); growth over linear {step:.2f}"
    )
    assert step <= NEAR_LINEAR


def test_two_hundred_companions_half_of_which_can_part(benchmark, report):
    chain, loads = with_sleeves(600)
    without = replace(chain, companions=replace(chain.companions, parting=0 * chain.companions.parting))
    benchmark.pedantic(solve_axial, (chain, loads, NAMES), rounds=3)
    tied = cpu_seconds(lambda: solve_axial(without, loads, NAMES), number=3)
    parting = cpu_seconds(lambda: solve_axial(chain, loads, NAMES), number=3)
    report(f"200 companions: {tied * 1e3:.1f} ms tied, {parting * 1e3:.1f} ms where half of them can part")
    assert parting <= MANY_STOPS * tied
