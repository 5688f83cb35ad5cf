"""A check as text to read: verdict, what governs, utilisations by combination, reactions, numerical error.

Shows the same findings in the same words as window and sheet; only the layout in columns is made here.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Callable, Iterator, Sequence
from itertools import zip_longest
from pathlib import Path

from app.beside import beside
from app.columns import one_line, table
from app.cures import Cures
from app.findings import Findings, StateBooks, findings
from app.phrases import caution, check_sentence
from app.phrases.checks import subject_text
from app.phrases.cures import cures_sentences, subject_words
from app.phrases.fatigue import swing_text
from app.phrases.segments import segment_words
from app.units import utilisation_text
from app.words import tr
from solver.checks import STRESSES, Check
from solver.model import Project, Segment, UnitSystemName, parts_of
from solver.results import Results

NOT_MADE = "?"  # beside a utilisation: another check of the same thing could not be made
NOTHING = "–"


def report(
    project: Project, results: Results, file: str, cured: Sequence[Cures] = (), unsought: str = ""
) -> str:
    """The check of one file as lines, in the project's display units; `cured` is for what fails.

    `unsought` says why there are cures for none or not all of it.
    """
    system = project.display.unit_system
    found = findings(results, system)
    blocks = [
        heading(project, file),
        verdict(results, found, system),
        *utilisations(results),
        *limits(results),
        *fatigue(results),
        *cures(cured, unsought),
        forces(found.books),
        *companions(found),
        remarks(found),
    ]
    return "\n".join(blocks)


def heading(project: Project, file: str) -> str:
    """Which member this is, and from which file."""
    name, title = one_line(Path(file).name), one_line(project.title)
    return f"{title} ({name})\n" if title else f"{name}\n"


def verdict(results: Results, found: Findings, system: UnitSystemName) -> str:
    """The verdict and the check that governs."""
    lines = [found.headline, found.detail]
    if results.governing is not None:
        lines.append(check_sentence(results.governing, system))
    return "".join(f"{one_line(line)}\n" for line in lines)


def utilisations(results: Results) -> Iterator[str]:
    """The largest utilisation of stress in every segment, a column for each combination."""
    stresses = [check for check in results.checks if check.check in STRESSES]
    if stresses:
        marks = [name for segment in results.project.segments for name in _row_names(segment)]
        marks += [of.segment.mark for of in beside(results.project)]
        rows = by_combination(results, stresses, lambda check: segment_words(check) or "")
        head = [tr("Utilisation of stress"), *checked(results)]
        yield table(head, [[mark, *rows[mark]] for mark in marks])


def _row_names(segment: Segment) -> list[str]:
    """The segment, or each of its parts where some are bonded."""
    parts = enumerate(parts_of(segment) if segment.bonded else ())
    names = [segment_words(Check("tension", "", "pass", segment.mark, n, p.material)) for n, p in parts]
    return [str(name) for name in names] or [segment.mark]


def limits(results: Results) -> Iterator[str]:
    """The utilisation of every other limit, a column for each combination."""
    others = [check for check in results.checks if check.check not in (*STRESSES, "fatigue")]
    if others:
        rows = by_combination(results, others, subject_text)
        head = [tr("Utilisation of limits"), *checked(results)]
        yield table(head, [[name, *row] for name, row in rows.items()])


def fatigue(results: Results) -> Iterator[str]:
    """The utilisation by fatigue of every segment and shoulder, a column for each pair of combinations."""
    swings = [check for check in results.checks if check.between is not None]
    if swings:
        names = list(dict.fromkeys(check.between for check in swings))
        groups: defaultdict[str, defaultdict[object, list[Check]]] = defaultdict(lambda: defaultdict(list))
        for check in swings:
            groups[subject_text(check)][check.between].append(check)
        head = [tr("Utilisation by fatigue"), *(swing_text(name) for name in names if name is not None)]
        yield table(head, [[row, *(cell(group[name]) for name in names)] for row, group in groups.items()])


def cures(cured: Sequence[Cures], unsought: str) -> Iterator[str]:
    """What would make the failing checks pass, the worst first; what cures several together is said once."""
    lines = dict.fromkeys(line for item in cured for line in map(one_line, _cure_lines(item)))
    head = [tr("What one changed number would cure, proved by a new solve")] if lines else []
    whole = [*head, *lines, *filter(None, (unsought,))]
    if whole:
        yield "".join(f"{line}\n" for line in whole)


def _cure_lines(item: Cures) -> Iterator[str]:
    for cure, sentence in zip_longest(item.found, cures_sentences(item)):
        if cure is not None and len(cure.subjects) > 1:
            yield sentence  # which names them
        else:
            yield tr("{subject}: {sentence}").format(subject=subject_words(item.subject), sentence=sentence)


def by_combination(
    results: Results, checks: Sequence[Check], row: Callable[[Check], str]
) -> dict[str, list[str]]:
    """The texts of the utilisations by row and combination; rows in the order in which they come up."""
    groups: defaultdict[str, defaultdict[str, list[Check]]] = defaultdict(lambda: defaultdict(list))
    for check in checks:
        groups[row(check)][check.combination].append(check)
    names = checked(results)
    return defaultdict(
        lambda: [NOTHING] * len(names),
        {name: [cell(group[combination]) for combination in names] for name, group in groups.items()},
    )


def cell(checks: Sequence[Check]) -> str:
    """The largest utilisation of some checks, marked where one of them could not be made or was waived."""
    made = [(check.utilisation, check.status) for check in checks if check.utilisation is not None]
    texts = [utilisation_text(*max(made))] if made else []
    statuses = {check.status for check in checks}
    texts += [NOT_MADE] if "not_made" in statuses else []
    texts += [tr("waived")] if "waived" in statuses else []
    return " ".join(texts) or NOTHING


def checked(results: Results) -> list[str]:
    """The names of the states that are checked; they come first."""
    return [state.name for state in results.states if state.checked]


def forces(books: Sequence[StateBooks]) -> str:
    """The forces on the member along it, by combination: what holds it, what loads it, what is left over."""
    rows: list[list[str]] = []
    for row, reaction in enumerate(books[0].reactions):
        rows.append([tr("Joint {mark}").format(mark=reaction.mark), *_reactions(books, row)])
        rows += _parts(books, row)
    rows.append([tr("Loads"), *(book.loads_text for book in books)])
    if books[0].bedding_text:
        rows.append([tr("Bedding"), *(book.bedding_text for book in books)])
    rows.append([tr("Sum"), *(book.residual_text for book in books)])
    return table([tr("Forces on the member"), *(book.name for book in books)], rows)


def _reactions(books: Sequence[StateBooks], row: int) -> list[str]:
    """The reactions at one support."""
    return [book.reactions[row].text for book in books]


def _parts(books: Sequence[StateBooks], row: int) -> Iterator[list[str]]:
    """What the supports of a joint do one by one, where there are several or a stop."""
    words = tr("Joint {mark}, {support}")
    for number, part in enumerate(books[0].reactions[row].parts):
        name = words.format(mark=books[0].reactions[row].mark, support=part.name)
        yield [name, *(book.reactions[row].parts[number].text for book in books)]


def companions(found: Findings) -> Iterator[str]:
    """The force in each companion by combination, or that it has parted, and what clamp force is left."""
    if found.companions:
        head = [tr("Force in companions"), *(state.name for state in found.companions[0].states)]
        rows = [[one.mark, *(state.text for state in one.states)] for one in found.companions]
        said = "".join(f"{one_line(one.sentence)}\n" for one in found.companions if one.sentence)
        yield table(head, rows) + said


def remarks(found: Findings) -> str:
    """What was not checked and what to enter for it, what else is to be known, how exact the numbers are."""
    missing = [f"{NOT_MADE} {item.sentence}: {item.remedy}" for item in found.not_made]
    lines = (*missing, *found.notes, found.numerical_error, caution())
    return "".join(f"{one_line(line)}\n" for line in lines)
