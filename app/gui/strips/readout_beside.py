"""What the readout says of companions beside the cursor: the axial force in each, by its mark."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from app.units import format_value
from app.words import tr
from solver.companion_fields import companion_force_at
from solver.results import Results

MOST = 4  # that are told; a line has no room for more


def beside_cursor(results: Results, states: Sequence[int], x: float) -> Iterator[str]:
    """A text for each companion that lies beside x, from the least to the largest force over the states."""
    told = 0
    for at, companion in enumerate(results.project.companions):
        forces = [companion_force_at(results, state, at, x) for state in states]
        found = [force for force in forces if force is not None]
        if not found:
            continue
        told += 1
        if told > MOST:
            yield tr("and more companions")
            return
        yield tr("{mark}: N {force}").format(mark=companion.mark, force=_range(found, results))


def _range(forces: Sequence[float], results: Results) -> str:
    system, scale = results.project.display.unit_system, _largest(results)
    shown = [0.0 if abs(force) <= 1e-9 * scale else force for force in (min(forces), max(forces))]
    low, high = (format_value(force, "force", system) for force in shown)
    whole = format_value(shown[1], "force", system, with_unit=True)
    return whole if low == high else f"{low} … {whole}"


def _largest(results: Results) -> float:
    found = results.companions
    return (
        0.0
        if found is None
        else float(abs(found.segments.force_min).max() + abs(found.segments.force_max).max())
    )
