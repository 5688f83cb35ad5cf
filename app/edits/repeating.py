"""Repeating a part of the chain, such as a storey or a pitch of a thread, a number of times.

A copy has the segments with their bedding and their loads, and the joints between them with their supports
and loads. The joints where copies meet are free and carry nothing, so that a support at the far end is not
multiplied unasked; that far joint stays at the end of the last copy, with what lies beyond. Limits are not
repeated. Marks are fresh.
"""

from __future__ import annotations

from msgspec import structs

from app.edits.checking import checked, refused
from app.edits.copying import fresh_marks, with_loads_copied
from app.edits.records import fresh_mark
from solver.model import Joint, Project

MOST = 200  # copies at once; a slip of the finger should not make a member of millions


def repeat_segments(project: Project, first: int, last: int, times: int) -> Project:
    """The project with the segments `first` to `last` repeated `times` times behind themselves.

    EditError where the number is not between 1 and MOST.
    """
    if not 1 <= times <= MOST:
        raise refused(("segments", first), "repeats", count=times, most=MOST)
    for _ in range(times):
        project = _repeated(project, first, last)
        first, last = last + 1, 2 * last - first + 1
    return checked(project)


def _repeated(project: Project, first: int, last: int) -> Project:
    """One copy behind the segments `first` to `last`."""
    block, between = project.segments[first : last + 1], project.joints[first + 1 : last + 1]
    taken = [joint.mark for joint in project.joints]
    seam = Joint(fresh_mark(taken, project.joints[last].mark))
    segments = fresh_marks([s.mark for s in block], _ending_in(project.segments, block[-1].mark))
    joints = fresh_marks([j.mark for j in between], [*taken, seam.mark])
    copies = tuple(structs.replace(s, mark=segments[s.mark]) for s in block)
    inner = tuple(structs.replace(j, mark=joints[j.mark]) for j in between)
    grown = structs.replace(
        project,
        segments=(*project.segments[: last + 1], *copies, *project.segments[last + 1 :]),
        joints=(*project.joints[: last + 1], seam, *inner, *project.joints[last + 1 :]),
    )
    return with_loads_copied(grown, segments, joints)


def _ending_in(records: tuple[object, ...], mark: str) -> list[str]:
    """The marks taken, with the one to go on from at the end."""
    marks = [str(getattr(record, "mark", "")) for record in records]
    return [*(other for other in marks if other != mark), mark]
