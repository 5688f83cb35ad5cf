"""How fast the critical factor is: in milliseconds, against a dense solution, and for who does not need it.

Processor time, the least of several runs. The dense solution is that of all eigenvalues of the very matrices,
which is what a general library offers; it is one of the two or more spaces that the refinement goes through.
"""

from __future__ import annotations

import numpy as np
import pytest
from msgspec import UNSET, structs
from scipy.linalg import eigh

from app.samples import read_sample
from solver.axial import never, solve_axial
from solver.banded_eigen import full
from solver.beam_mesh import first_mesh
from solver.buckling import DEGREES, SETTLED, Space, critical_factors
from solver.model import FixedSupport, JointLoad, Lateral, Limits
from solver.packing import pack
from solver.solve import solve
from solver.stability import column_of
from tests.benchmarks.test_solver_speed import cpu_seconds, report  # noqa: F401 - fixture
from tests.members import Part, case, member, round_bar

STABILITY_MS = 20.0  # promised: 12 segments, one state, settled to 1e-6
DENSE_RATIO = 6.0  # over the dense solution of the last space: two spaces, assembled and solved
GROWTH = 2.0  # from 120 to 1200 segments, over linear

pytestmark = pytest.mark.benchmark(min_rounds=5)


def stepped_column(count):
    """Tapered and prismatic by turns, pinned, under its own weight and a load at its head."""
    parts = [
        Part(3.0 / count, round_bar(0.05 + 0.002 * (i % 3), 0.05 if i % 2 else UNSET), density=7850.0)
        for i in range(count)
    ]
    load = case(gravity=-9.81, on_joints=[JointLoad(str(count), force=-10e3)])
    project = member(parts, {0: FixedSupport()}, [load])
    held = {0: Lateral(translation="fixed"), count: Lateral(translation="fixed")}
    joints = tuple(structs.replace(j, lateral=held.get(i, UNSET)) for i, j in enumerate(project.joints))
    return structs.replace(project, joints=joints, limits=Limits(stability_factor=2.0))


def ready(project):
    chain, loads, _states = pack(project)
    return column_of(project, chain), solve_axial(chain, loads, ("Load",))


def test_twelve_segments(report):  # noqa: F811
    column, solution = ready(stepped_column(12))
    ours = cpu_seconds(lambda: critical_factors(column, solution, [0], never), number=10)
    space = Space(column, solution, first_mesh(column, solution), DEGREES[1])
    stiffness, load = space.pencil(0)
    dense = cpu_seconds(lambda: eigh(full(load), full(stiffness), lower=True), number=10)
    report(
        f"12 segments: settled to {SETTLED:g} in {ours * 1e3:.2f} ms (promised {STABILITY_MS:g} ms),"
        f" {ours / dense:.1f} times one dense solution of {stiffness.shape[1]} unknowns"
    )
    assert ours * 1e3 < STABILITY_MS
    assert ours < DENSE_RATIO * dense


def test_growth_is_near_linear(report):  # noqa: F811
    times = []
    for count in (120, 1200):
        column, solution = ready(stepped_column(count))
        times.append(cpu_seconds(lambda c=column, s=solution: critical_factors(c, s, [0], never), repeats=2))
    growth = times[1] / times[0] / 10
    report(f"1200 segments {times[1] * 1e3:.0f} ms, {growth:.2f} times ten times 120 segments")
    assert growth < GROWTH


def test_who_has_no_lateral_supports_pays_nothing(report):  # noqa: F811
    project = read_sample("hoist_shaft")
    loose = structs.replace(
        project, joints=tuple(structs.replace(joint, lateral=UNSET) for joint in project.joints)
    )
    pulled = read_sample("tie_rod")
    times = [cpu_seconds(lambda p=p: solve(p, cases=False), number=10) for p in (project, loose, pulled)]
    report(
        "whole check, held sideways {:.2f} ms, not held {:.2f} ms; tie rod {:.2f} ms".format(
            *np.multiply(times, 1e3)
        )
    )
    assert times[1] < times[0]
