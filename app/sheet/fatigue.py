"""Fatigue on the sheet: every place of every range with its numbers, and the worst of each by hand."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from app.phrases.fatigue import swing_text
from app.sheet.blocks import Block, Value, column, formula, formulas, heading, paragraph, table
from app.sheet.readings import NOTHING, Readings
from app.sheet.shoulders import factor_text
from app.sheet.verdicts import status_word, subject, utilisation_by_hand
from app.units import utilisation_text
from app.words import tr
from solver.checks import Check
from solver.results import Results


def fatigue_blocks(results: Results, say: Readings) -> Iterator[Block]:
    """The chapter on fatigue; nothing where no range is asked for."""
    ranges = list(dict.fromkeys(check.between for check in results.checks if check.between is not None))
    if not ranges:
        return
    yield heading(tr("Fatigue"), 2)
    yield paragraph(
        tr(
            "Between the two combinations named, at the place of the largest utilisation in every segment and"
            " at every shoulder. σ₁ and σ₂ are nominal stresses; the full notch effect Kt is taken on"
            " amplitude and mean, 1 away from shoulders. The endured amplitude Sa holds size, finish and"
            " reliability already; the factor on allowable stresses does not apply. A compressive mean is not"
            " counted."
        ),
        "lead",
    )
    for between in ranges:
        checks = [check for check in results.checks if check.between == between]
        yield _table(between, checks, say)
        made = [check for check in checks if check.utilisation is not None]
        if made:
            worst = max(made, key=lambda check: check.utilisation or 0.0)
            yield formulas(list(by_hand(worst, say)))


def _table(between: tuple[str, str], checks: Sequence[Check], say: Readings) -> Block:
    stress = say.unit("stress")
    columns = [
        column(tr("Of"), align="left"),
        column(tr("at x"), say.unit("length")),
        column("σ₁", stress),
        column("σ₂", stress),
        column("Kt"),
        column("σa", stress),
        column("Sa", stress),
        column("σm", stress),
        column("Su", stress),
        column(tr("Utilisation")),
        column(tr("Verdict"), align="left"),
    ]
    strong = [row for row, check in enumerate(checks) if check.status == "fail"]
    title = tr("Fatigue, {states}").format(states=swing_text(between))
    return table(title, columns, [_row(check, say) for check in checks], strong=strong)


def _row(check: Check, say: Readings) -> list[str]:
    place = NOTHING if check.position is None else say.plain(check.position, "length")
    if check.utilisation is None:
        return [subject(check), place, *8 * [NOTHING], status_word(check.status)]
    first, second, amplitude, mean = _stresses(check, say)
    return [
        subject(check),
        place,
        first,
        second,
        factor_text(check.factor or 1.0),
        amplitude,
        say.exact(check.limit or 0.0, "stress"),
        mean,
        say.exact(check.ultimate or 0.0, "stress"),
        utilisation_text(check.utilisation, check.status),
        status_word(check.status),
    ]


def _stresses(check: Check, say: Readings) -> tuple[str, str, str, str]:
    values = (check.nominal, check.nominal_to, check.amplitude, check.mean)
    largest = max(abs(value or 0.0) for value in values)
    first, second, amplitude, mean = (say.read(v or 0.0, "stress", beside=largest) for v in values)
    return first, second, amplitude, mean


def by_hand(check: Check, say: Readings) -> Iterator[dict[str, Value]]:
    """Amplitude, mean and utilisation with their numbers put in."""

    def number(value: float | None) -> str:
        return say.plain(value or 0.0, "stress", unit=True, digits=6)

    parts = {
        "first": number(check.nominal),
        "second": number(check.nominal_to),
        "kt": factor_text(check.factor or 1.0),
        "amplitude": number(check.amplitude),
        "mean": number(check.mean),
        "endured": say.exact(check.limit or 0.0, "stress", unit=True),
        "ultimate": say.exact(check.ultimate or 0.0, "stress", unit=True),
        "utilisation": utilisation_by_hand(check),
    }
    alt = tr("σa = Kt |σ₁ − σ₂| / 2 = {kt} · |{first} − ({second})| / 2 = {amplitude}").format(**parts)
    label = tr("amplitude, {subject}").format(subject=subject(check))
    yield formula(label, "amplitude_numbers", alt, **parts)
    alt = tr("σm = Kt (σ₁ + σ₂) / 2 = {kt} · ({first} + ({second})) / 2 = {mean}").format(**parts)
    yield formula(tr("mean"), "mean_numbers", alt, **parts)
    if (check.mean or 0.0) > 0.0:
        words = tr(
            "utilisation = σa / Sa + σm / Su = {amplitude} / {endured} + {mean} / {ultimate} = {utilisation}"
        )
        yield formula(tr("utilisation"), "fatigue_numbers", words.format(**parts), **parts)
    else:
        words = tr("utilisation = σa / Sa = {amplitude} / {endured} = {utilisation}")
        yield formula(tr("utilisation"), "endured_numbers", words.format(**parts), **parts)
