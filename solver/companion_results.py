"""What companions come to: their forces, whether they have parted, their segments' extremes and checks.

The solver knows member and companions as one row of segments, the member's n first. Here that row is parted
again, so that everything that shows the member goes on to see the member alone.
"""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np

from solver.allowables import Range, StressChecks, allowables, check_stresses
from solver.arrays import FloatArray, IntArray, frozen
from solver.chain import Chain, Companions, Loads
from solver.companion_packing import BY_SEGMENT
from solver.extremes import ExtremeFinder, Extremes
from solver.model import CompanionSegment, Project
from solver.results import CompanionResults, State
from solver.segment_results import segment_results
from solver.solution import Solution


def part_of_loads(loads: Loads, some: slice) -> Loads:
    """The loads of some of the segments, and of the joints."""
    return replace(loads, **{name: getattr(loads, name)[:, some] for name in BY_SEGMENT})


def part_of_solution(solution: Solution, first: int, last: int) -> Solution:
    """The solution in the segments from `first` to before `last`, counted from the first of them."""
    start, end = np.searchsorted(solution.segment, [first, last]).tolist()
    segment = solution.segment[start:end] - first
    segment.setflags(write=False)
    return replace(
        solution,
        segment=segment,
        start=solution.start[start:end],
        end=solution.end[start:end],
        displacement=solution.displacement[:, start:end],
        force=solution.force[:, start:end],
        force_bound=solution.force_bound[:, first:last],
    )


@dataclass(frozen=True, slots=True)
class Beside:
    """The companions' segments (k,) as if they were a member, one companion after the other."""

    companions: Companions
    segments: tuple[CompanionSegment, ...]
    chain: Chain
    loads: Loads
    solution: Solution
    begins: FloatArray  # (k,) x along the member
    ends: FloatArray
    stress: Extremes
    force: Extremes
    displacement: Extremes

    def ranges(self) -> tuple[Range, Range]:
        """Largest and smallest stress and force."""
        stress, force = self.stress, self.force
        return (stress.largest, stress.smallest), (force.largest, force.smallest)


def beside(
    project: Project, whole: Chain, loads: Loads, solution: Solution, position: FloatArray
) -> Beside | None:
    """The companions of a solution of member and companions together; None where there are none."""
    companions = whole.companions
    if companions is None:
        return None
    n, every = len(position) - 1, slice(len(position) - 1, None)
    chain = Chain(
        length=whole.length[every],
        modulus=whole.modulus[every],
        area=whole.area[every],
        bedding=whole.bedding[every],
        expansion=whole.expansion[every],
        density=whole.density[every],
        fixed=whole.fixed,
        spring=whole.spring,
    )
    own, of = part_of_loads(loads, every), part_of_solution(solution, n, len(whole.length))
    begins, ends = _places(companions, chain.length, position)
    finder = ExtremeFinder(chain, of, own, begins, ends)
    return Beside(
        companions=companions,
        segments=tuple(segment for one in project.companions for segment in one.segments),
        chain=chain,
        loads=own,
        solution=of,
        begins=begins,
        ends=ends,
        stress=finder.stress(),
        force=finder.force(),
        displacement=finder.displacement(),
    )


def _places(
    companions: Companions, length: FloatArray, position: FloatArray
) -> tuple[FloatArray, FloatArray]:
    """Where along the member the segments begin and end."""
    counts = np.diff(companions.first)
    total = np.concatenate([[0.0], np.cumsum(length)])
    begins = total[:-1] - np.repeat(total[companions.first[:-1]], counts)
    begins = begins + np.repeat(position[companions.start], counts)
    return frozen(begins), frozen(begins + length)


def companion_results(
    project: Project, states: tuple[State, ...], row: Beside, zero: FloatArray
) -> tuple[CompanionResults, StressChecks]:
    """The results and what the stresses are against their allowables; up to `zero` (m,) a stress is none."""
    limits = allowables(project, states, row.segments)
    checks = check_stresses(row.stress, zero, limits)
    utilisation = checks.utilisation, checks.utilisation_at
    companions, force = row.companions, row.force
    parting = np.flatnonzero(companions.parting)
    push, gap = (_of_parting(row, parting, values) for values in (row.solution.push, row.solution.gap))
    separated = (companions.parting != 0.0) & (push == 0.0)
    separated.setflags(write=False)
    checked = [index for index, state in enumerate(states) if state.checked]
    least = np.where(companions.parting == 0.0, np.nan, push[checked].min(axis=0))
    return (
        CompanionResults(
            chain=row.chain,
            loads=row.loads,
            solution=row.solution,
            companions=companions,
            begins=row.begins,
            ends=row.ends,
            force_from=frozen(force.start[:, companions.first[:-1]]),
            force_to=frozen(np.where(separated, 0.0, force.end[:, companions.first[1:] - 1])),
            separated=separated,
            gap=frozen(gap),
            clamp=frozen(push),
            least_clamp=frozen(least),
            least_clamp_state=np.array(checked)[push[checked].argmin(axis=0)],
            segments=segment_results(
                row.stress, force, row.displacement, utilisation, row.solution.force_bound
            ),
            allowables=limits,
            segment_mass=frozen(row.chain.length * np.mean(row.chain.mass(slice(None)), axis=-1)),
        ),
        checks,
    )


def _of_parting(row: Beside, parting: IntArray, values: FloatArray) -> FloatArray:
    """(m, c) from the contacts, of which the stops come first; 0 for companions that are tied."""
    found = np.zeros((values.shape[0], row.companions.start.size))
    found[:, parting] = values[:, values.shape[1] - parting.size :]
    return found
