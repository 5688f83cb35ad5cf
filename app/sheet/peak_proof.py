"""The governing check by hand where it is a peak stress or fatigue."""

from __future__ import annotations

from collections.abc import Iterator

from app.phrases.segments import segment_words
from app.sheet.blocks import Block, Value, formula, formulas, paragraph
from app.sheet.fatigue import by_hand as fatigue_by_hand
from app.sheet.readings import Readings
from app.sheet.shoulders import by_hand as factor_by_hand
from app.sheet.shoulders import factor_text
from app.sheet.verdicts import utilisation_by_hand
from app.words import tr
from solver.checks import Check
from solver.results import Results
from solver.shoulders import Notch, notches


def peak_or_fatigue_by_hand(results: Results, check: Check, say: Readings) -> Iterator[Block]:
    """Nominal stress, factor and utilisation of a check of this kind."""
    notch = _notch(results, check)
    if notch is not None:
        words = tr("Joint {joint}; the smaller side is segment {segment}.")
        yield paragraph(words.format(joint=check.joint, segment=check.segment), "lead")
    else:
        words = tr("Segment {mark} at x = {x}.")
        x = say.plain(check.position or 0.0, "length", unit=True)
        yield paragraph(words.format(mark=segment_words(check), x=x), "lead")
    factor = [] if notch is None else list(factor_by_hand(notch, results.project, say))
    if check.check == "fatigue" or notch is None:
        yield formulas([*factor, *fatigue_by_hand(check, say)])
    else:
        nominal = _nominal(results, check, notch, say)
        yield formulas([nominal, *factor, *_peak(results, check, say)])


def _notch(results: Results, check: Check) -> Notch | None:
    """The shoulder, seen from the side that the check is of."""
    marks = results.project.joints, results.project.segments
    found = (
        notch
        for notch in notches(results.project)
        if (marks[0][notch.joint].mark, marks[1][notch.segment].mark) == (check.joint, check.segment)
    )
    return next(found, None)


def _nominal(results: Results, check: Check, notch: Notch, say: Readings) -> dict[str, Value]:
    state = results.state_index(check.combination)
    ends = results.segments.force_start if notch.at_start else results.segments.force_end
    area = float(results.chain.area[notch.segment, 0 if notch.at_start else 2])
    parts = {
        "force": say.plain(float(ends[state, notch.segment]), "force", unit=True),
        "area": say.plain(area, "area", unit=True),
        "stress": say.plain(check.nominal or 0.0, "stress", unit=True, digits=6),
    }
    alt = tr("σ = N / A = {force} / {area} = {stress}").format(**parts)
    return formula(tr("nominal stress"), "stress_numbers", alt, **parts)


def _peak(results: Results, check: Check, say: Readings) -> Iterator[dict[str, Value]]:
    material = next(
        material
        for material in results.project.materials
        for segment in results.project.segments
        if segment.mark == check.segment and segment.material == material.name
    )
    parts = {
        "kt": factor_text(check.factor or 1.0),
        "nominal": say.plain(check.nominal or 0.0, "stress", unit=True, digits=6),
        "peak": say.plain(check.value or 0.0, "stress", unit=True, digits=6),
        "factor": say.exact(
            results.states[results.state_index(check.combination)].allowable_factor, "factor"
        ),
        "allowable": say.exact(float(material.allowable_peak or 0.0), "stress", unit=True),
        "utilisation": utilisation_by_hand(check),
    }
    alt = tr("peak stress = Kt σ = {kt} · ({nominal}) = {peak}").format(**parts)
    yield formula(tr("peak stress"), "peak_numbers", alt, **parts)
    alt = tr("utilisation = |{peak}| / ({factor} · {allowable}) = {utilisation}").format(**parts)
    yield formula(tr("utilisation"), "peak_utilisation_numbers", alt, **parts)
