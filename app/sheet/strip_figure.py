"""The figure of all strips for one state, or for the envelope of the checked ones."""

from __future__ import annotations

from typing import TYPE_CHECKING

import numpy as np

from app.sheet.colours import QUIET
from app.sheet.member_figure import ACROSS, Figure
from app.sheet.ruler import Ruler
from app.sheet.strips import DEPTH_ACROSS, DEPTH_UPRIGHT, Limit, Strip, draw_strip
from app.sheet.svg import Canvas, fitted, text_width
from app.words import tr
from solver.arrays import FloatArray
from solver.fields import curves, envelope

if TYPE_CHECKING:
    from solver.results import Results

POINTS = 240
_UPRIGHT = 270.0
_GAP = 7.0
_SIZE = 7.0


def state_figure(results: Results, state: int) -> Figure:
    """u, N, σ and utilisation of one state; σ with the allowable band where the state is checked."""
    field = curves(results, state, points=POINTS)
    checked = results.states[state].checked
    strips = [
        Strip("u", "displacement", "displacement", field.x, (field.displacement,)),
        Strip("N", "force", "force", field.x, (field.force,)),
        Strip(
            "σ",
            "stress",
            "stress",
            field.x,
            (field.stress,),
            over=field.utilisation if checked else None,
            limits=_band(results, state) if checked else (),
        ),
    ]
    if checked:
        strips.append(_utilisation(results, field.x, field.utilisation))
    name = results.states[state].name
    return _figure(
        results, strips, tr("Displacement, axial force, stress and utilisation, {name}").format(name=name)
    )


def envelope_figure(results: Results) -> Figure:
    """The largest and smallest values over all checked states; extremes, not one state in equilibrium."""
    field = envelope(results, points=POINTS)
    x = field.x
    strips = [
        Strip("u", "displacement", "displacement", x, (field.displacement_max, field.displacement_min)),
        Strip("N", "force", "force", x, (field.force_max, field.force_min)),
        Strip("σ", "stress", "stress", x, (field.stress_max, field.stress_min), limits=_common_band(results)),
        _utilisation(results, x, field.utilisation),
    ]
    return _figure(results, strips, tr("Envelope of displacement, axial force, stress and utilisation"))


def _utilisation(results: Results, x: FloatArray, values: FloatArray) -> Strip:
    ends = results.position[[0, -1]]
    return Strip(
        tr("utilisation"),
        "utilisation",
        "factor",
        x,
        (values,),
        over=values,
        limits=(Limit(ends, np.ones(2)),),
    )


def _band(results: Results, state: int) -> tuple[Limit, ...]:
    """The state's allowable stresses in tension and compression as steps along the member."""
    x = np.repeat(results.position, 2)[1:-1]
    pulled, pushed = results.allowables.tension[state], results.allowables.compression[state]
    return Limit(x, np.repeat(pulled, 2)), Limit(x, -np.repeat(pushed, 2))


def _common_band(results: Results) -> tuple[Limit, ...]:
    """The band where all checked states share one factor; with several there is no single band to draw."""
    checked = [index for index, state in enumerate(results.states) if state.checked]
    factors = {results.states[index].allowable_factor for index in checked}
    return _band(results, checked[0]) if len(factors) == 1 else ()


def _figure(results: Results, strips: list[Strip], title: str) -> Figure:
    upright = results.project.display.layout == "vertical"
    units = results.project.display.unit_system
    ruler = Ruler(upright, float(results.position[-1]), _UPRIGHT if upright else ACROSS)
    canvas, place = Canvas(), 0.0
    for strip in strips:
        depth = DEPTH_UPRIGHT if upright else DEPTH_ACROSS[strip.kind]
        start = place if upright else -place - depth
        draw_strip(canvas, ruler, strip, start, depth, results.position, units)
        place += depth + _GAP + (10.0 if upright else 0.0)
    _draw_places(canvas, ruler, results, place)
    return Figure(canvas.render(title), *canvas.size, title)


def _draw_places(canvas: Canvas, ruler: Ruler, results: Results, place: float) -> None:
    """Joint marks at the foot of the strips (at their left in an upright figure), as many as have room."""
    last = -np.inf
    for x, joint in zip(results.position.tolist(), results.project.joints, strict=True):
        along = ruler.along(x)
        mark = fitted(joint.mark, _SIZE, 40.0)
        room = _SIZE if ruler.upright else text_width(mark, _SIZE) + 3
        if along - last < room:
            continue
        last = along
        px, py = ruler.point(along, -5.0 if ruler.upright else -place - 2)
        canvas.text(
            (px, py + 2.5),
            mark,
            size=_SIZE,
            fill=QUIET,
            italic=True,
            anchor="end" if ruler.upright else "middle",
        )
