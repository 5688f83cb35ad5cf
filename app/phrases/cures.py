"""The sentences of cures: what passes with which change, and what does not pass then.

Only what a solve of the changed member has shown is said.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from typing import Final

from app.cures import Change, Cure, Cures
from app.findings.listing import listed
from app.findings.subjects import Subject, SubjectKind, subject_of
from app.units import utilisation_text
from app.words import later, tr, trn
from solver.checks import Check

# A change elsewhere than in the section of the segment that does not pass.
CHANGES: Final[Mapping[str, str]] = {
    "section": later("{value} in {mark}"),
    "spring": later("a spring of {value} at joint {mark}"),
}

# Of what has marks and is no stress.
SUBJECTS: Final[Mapping[SubjectKind, str]] = {
    "displacement": later("displacement of joint {mark}"),
    "relative": later("relative displacement of joints {mark} to {end}"),
    "reaction": later("reaction at joint {mark}"),
    "peak": later("peak stress at joint {mark}"),
    "fatigue": later("fatigue in {mark}"),
    "fatigue_joint": later("fatigue at joint {mark}"),
}


def subject_words(subject: Subject) -> str:
    """What a check is of, in the middle of a sentence."""
    if subject.kind == "stress":
        return subject.marks[0]
    if subject.kind == "stability":
        return tr("stability")
    return tr(SUBJECTS[subject.kind]).format(mark=subject.marks[0], end=subject.marks[-1])


def change_words(change: Change, subject: Subject) -> str:
    """The change: "⌀42.5 mm", or with its place where that is not the subject's own section."""
    if change.kind == "section" and subject == Subject("stress", change.marks):
        return change.text
    return tr(CHANGES[change.kind]).format(value=change.text, mark=listed(change.marks))


def cure_sentence(cure: Cure) -> str:
    """What passes, and what does not: "Passes with ⌀42.5 mm, 0.99; then B does not pass, 1.03"."""
    return "; ".join((_passes(cure), *_reservations(cure)))


def _passes(cure: Cure) -> str:
    utilisation = _utilisation(cure.worst)
    if len(cure.subjects) > 1:
        said = tr("{subjects} pass with {change} each, {utilisation}")
        names = listed([subject_words(subject) for subject in cure.subjects])
        return said.format(subjects=names, change=cure.change.text, utilisation=utilisation)
    said = tr("Passes with {change}, {utilisation}")
    return said.format(change=change_words(cure.change, cure.subjects[0]), utilisation=utilisation)


def cures_sentences(cures: Cures) -> tuple[str, ...]:
    """A sentence for each cure; for a stress without any, how far the search went."""
    if cures.found or cures.tried is None:
        return tuple(map(cure_sentence, cures.found))
    return (tr("None tried up to {value} passes").format(value=cures.tried.text),)


def _reservations(cure: Cure) -> Iterator[str]:
    """What fails only then is named; of what fails as before, which is listed anyway, how much it is."""
    if len(cure.fails_then) == 1:
        yield _one(tr("then {subject} does not pass, {utilisation}"), cure.fails_then[0])
    elif cure.fails_then:
        names = [subject_words(subject_of(check)) for check in cure.fails_then]
        yield tr("then these do not pass: {subjects}").format(subjects=listed(names))
    if len(cure.still_fails) == 1:
        yield _one(tr("{subject} still does not pass, {utilisation}"), cure.still_fails[0])
    elif cure.still_fails:
        count = len(cure.still_fails)
        yield trn("{count} other still does not pass", "{count} others still do not pass", count)
    if cure.unchecked_then:
        names = list(dict.fromkeys(subject_words(subject_of(check)) for check in cure.unchecked_then))
        yield tr("then not checked: {subjects}").format(subjects=listed(names))


def _one(template: str, check: Check) -> str:
    return template.format(subject=subject_words(subject_of(check)), utilisation=_utilisation(check))


def _utilisation(check: Check) -> str:
    return utilisation_text(check.utilisation or 0.0, check.status)


def unsought_sentence(count: int, most: int, *, small: bool) -> str:
    """Why cures stand under none or not all of the `count` that fail; empty where they are sought for all."""
    if not small:
        return tr("No cures are sought: the member has too many checks")
    if count > most:
        return tr("Cures are sought for the {most} worst only").format(most=most)
    return ""
