"""The search for cures of one finding: knobs tried one after the other, each answer proved by its own solve.

For a stress the dimensions of the segment's own section; where others of the very same section fail too,
that of all of them at once, since they are parts of one kind. For a limit the springs of the supports and,
for displacements, the sections of those segments that stretch most. A changed member that cannot be solved,
or in which a check of the subject can no longer be made, does not pass.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import Final, TypeAlias

from app.cures.changes import Change, Knob, every_segment, section_knobs, spring_knobs
from app.cures.search import first_passing
from app.edits import EditError
from app.entry import EntryError
from app.findings.subjects import Subject, subject_of, utilisation_of, worst_by_subject
from solver.checks import Check
from solver.errors import InputError, never
from solver.model import Project
from solver.results import Results

UNSOUGHT: Final = ("peak", "fatigue", "fatigue_joint", "stability")
MOST_SPRINGS: Final = 3
MOST_SECTIONS: Final = 3
MOST_CURES: Final = 2
MOST_CHECKS: Final = 5000  # above, a search of some dozens of solves takes longer than anyone waits


@dataclass(frozen=True, slots=True)
class Cure:
    """A change with which every check of its subjects passes, and what the solve that proves it says else."""

    subjects: tuple[Subject, ...]  # the one it was sought for, and all that are changed alike
    change: Change
    worst: Check  # of the subjects, with the change
    fails_then: tuple[Check, ...]  # the worst of every other subject that fails only with the change
    still_fails: tuple[Check, ...]  # the same of those that failed before as well
    unchecked_then: tuple[Check, ...]  # checks elsewhere that the change keeps from being made


@dataclass(frozen=True, slots=True)
class Cures:
    """What was found for one subject; without any cure, the largest change that was tried in vain."""

    subject: Subject
    found: tuple[Cure, ...]
    tried: Change | None = None


def failing(results: Results) -> tuple[Subject, ...]:
    """The subjects with a check that fails, the worst first."""
    worst = sorted(worst_by_subject(results.checks).items(), key=lambda item: -utilisation_of(item[1]))
    return tuple(subject for subject, check in worst if check.status == "fail")


def is_small(results: Results) -> bool:
    """Whether the member is small enough for a search."""
    return len(results.checks) <= MOST_CHECKS


def seek(results: Results, subject: Subject, cancelled: Callable[[], bool] = never) -> Cures:
    """The cures of a subject that fails in these results. Raises Cancelled.

    Of peak stresses and fatigue none is sought: a radius or a surface helps there, not another size. Nor of
    stability, where it is the supports that help most.
    """
    if subject.kind in UNSOUGHT:
        return Cures(subject, ())
    trials = _Trials(results, (subject,), cancelled)
    alone = _nearest_first(trials, _knobs(results, subject))
    alike = _fail_alike(results, subject)
    together = _together(results, alike, cancelled) if len(alike) > 1 else []
    same = {cure.change.value for cure in together}  # what all need is no news of one of them
    found = [*together, *(cure for cure in alone if cure.change.value not in same)]
    tried = trials.largest if not found and subject.kind == "stress" else None
    return Cures(subject, tuple(found[:MOST_CURES]), tried)


def _fail_alike(results: Results, subject: Subject) -> list[int]:
    """The segments with the very section of the subject's that do not pass, in order."""
    if subject.kind != "stress":
        return []
    failed = {mark for found in failing(results) if found.kind == "stress" for mark in found.marks}
    segments = every_segment(results.project)
    section = next(segment.section for segment in segments if segment.mark == subject.marks[0])
    return [i for i, one in enumerate(segments) if one.mark in failed and one.section == section]


def _together(results: Results, alike: Sequence[int], cancelled: Callable[[], bool]) -> list[Cure]:
    """The nearest cure of all these segments at once, as the only one."""
    subjects = tuple(Subject("stress", (every_segment(results.project)[index].mark,)) for index in alike)
    trials = _Trials(results, subjects, cancelled)
    return _nearest_first(trials, [(knob,) for knob in section_knobs(results.project, *alike)])[:1]


def _nearest_first(trials: _Trials, groups: Sequence[tuple[Knob, ...]]) -> list[Cure]:
    found = [cure for knobs in groups if (cure := _nearest(map(trials.cure, knobs))) is not None]
    return [cure for _, cure in sorted(found, key=lambda pair: pair[0])]


_Ranked = tuple[float, Cure]  # how far away, and the cure


def _nearest(found: Iterator[_Ranked | None]) -> _Ranked | None:
    """Of the same number made larger and made smaller the nearer."""
    return min(filter(None, found), key=lambda pair: pair[0], default=None)


def _knobs(results: Results, subject: Subject) -> list[tuple[Knob, ...]]:
    """The knobs to try, those for the same number together."""
    project = results.project
    if subject.kind == "stress":
        marks = [segment.mark for segment in every_segment(project)]
        return [(knob,) for knob in section_knobs(project, marks.index(subject.marks[0]))]
    springs = [knobs for joint in _joints(project, subject) if (knobs := spring_knobs(project, joint))]
    stretched = _most_stretched(results, subject) if subject.kind != "reaction" else []
    sections = [section_knobs(project, segment)[-1:] for segment in stretched]
    return [*springs[:MOST_SPRINGS], *sections]


def _joints(project: Project, subject: Subject) -> list[int]:
    """All joints, the subject's own first."""
    marks = [joint.mark for joint in project.joints]
    own = [marks.index(mark) for mark in subject.marks]
    return own + [index for index in range(len(marks)) if index not in own]


def _most_stretched(results: Results, subject: Subject) -> list[int]:
    """The segments that stretch or shrink most where the subject is worst; of two joints those between."""
    worst = worst_by_subject(results.checks)[subject]
    moved = results.solution.joint_displacement[results.state_index(worst.combination)]
    stretch = [abs(float(end - start)) for start, end in pairwise(moved)]
    places = sorted(_joints(results.project, subject)[: len(subject.marks)])
    between = range(*places) if subject.kind == "relative" else range(len(stretch))
    return sorted(between, key=lambda index: -stretch[index])[:MOST_SECTIONS]


class _Trials:
    """Solves of the changed project, and what they say of the subjects."""

    def __init__(
        self, results: Results, subjects: tuple[Subject, ...], cancelled: Callable[[], bool]
    ) -> None:
        self._before = results
        self._subjects = subjects
        self._cancelled = cancelled
        self._missing = _not_made(results.checks)
        self.largest: Change | None = None  # of the first knob

    def cure(self, knob: Knob) -> _Ranked | None:
        """The nearest value found to cure the subjects, with how far away it is as a share of the reach.

        It is solved once more with every case alone as well, as the window does: these can keep from solving.
        """
        proved: list[tuple[Change, Results]] = []

        def passes(index: int) -> bool:
            change = self._change(knob, index)
            results = self._solved(change)
            if change is None or results is None or not self._cured(results):
                return False
            proved[:] = [(change, results)]
            return True

        index = first_passing(len(knob.values), passes)
        if index is None or self._solved(proved[0][0], cases=True) is None:
            return None
        return (index + 1) / len(knob.values), self._told(*proved[0])

    def _change(self, knob: Knob, index: int) -> Change | None:
        """The change; None where there is no such section, as a tube thicker than solid."""
        try:
            change = knob.change(knob.values[index])
        except EntryError:
            return None
        if index == len(knob.values) - 1 and self.largest is None:
            self.largest = change
        return change

    def _solved(self, change: Change | None, *, cases: bool = False) -> Results | None:
        """The results with the change; None where there are none."""
        from solver.solve import solve  # with libraries that a window which opens need not wait for

        try:
            changed = change.applied(self._before.project) if change else None
            return solve(changed, cases=cases, cancelled=self._cancelled) if changed else None
        except (EditError, InputError):
            return None

    def _cured(self, results: Results) -> bool:
        """Whether all checks of each subject pass, none of them is lost, and there is one."""
        return all(self._passes(results, subject) for subject in self._subjects)

    def _passes(self, results: Results, subject: Subject) -> bool:
        own = [check for check in results.checks if subject_of(check) == subject]
        lost = _not_made(own) - self._missing
        return not lost and any(c.status == "pass" for c in own) and all(c.status != "fail" for c in own)

    def _told(self, change: Change, results: Results) -> Cure:
        worst = worst_by_subject(results.checks)
        before = set(failing(self._before))
        fails = {subject: worst[subject] for subject in failing(results)}
        return Cure(
            subjects=self._subjects,
            change=change,
            worst=max((worst[subject] for subject in self._subjects), key=utilisation_of),
            fails_then=tuple(check for subject, check in fails.items() if subject not in before),
            still_fails=tuple(check for subject, check in fails.items() if subject in before),
            unchecked_then=tuple(_not_made_checks(results.checks, self._missing)),
        )


_MissingKey: TypeAlias = tuple[str, str, Subject, int | None, tuple[str, str] | None]
_Missing = frozenset[_MissingKey]


def _not_made(checks: Sequence[Check]) -> _Missing:
    return frozenset(_key(check) for check in checks if check.utilisation is None)


def _not_made_checks(checks: Sequence[Check], known: _Missing) -> Iterator[Check]:
    """Those that have no value, be they waived or not, and had one before."""
    return (check for check in checks if check.utilisation is None and _key(check) not in known)


def _key(check: Check) -> _MissingKey:
    return check.check, check.combination, subject_of(check), check.part, check.between
