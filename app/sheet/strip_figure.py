"""The figure of all strips for one state, or for the envelope of the checked ones."""

from __future__ import annotations

from typing import TYPE_CHECKING

import numpy as np

from app.allowable_lines import allowable_lines, allowable_texts, over_least
from app.drawing.words import not_to_scale
from app.point_marks import point_marks
from app.sheet.colours import QUIET
from app.sheet.limit_labels import Limit
from app.sheet.member_figure import Figure, draw_above, drawn_positions, member_alt
from app.sheet.ruler import Ruler
from app.sheet.strips import DEPTH_ACROSS, DEPTH_UPRIGHT, Strip, draw_strip
from app.sheet.svg import Canvas, fitted, text_width
from app.strip_choice import USUAL, Kind, kind_names
from app.words import tr
from solver.arrays import FloatArray
from solver.fields import curves, envelope
from solver.mode_fields import mode_curve

if TYPE_CHECKING:
    from solver.results import Results

POINTS = 240
_ACROSS, _UPRIGHT = 420.0, 270.0
_GAP = 7.0
_SIZE = 7.0


def state_figure(
    results: Results, state: int, kinds: tuple[Kind, ...] = USUAL, *, drawing: bool = False
) -> Figure:
    """The strips of one state, these in this order; σ with the allowable band where the state is checked.

    On request the drawing with the loads of the state stands over them, on the same ruler.
    """
    field = curves(results, state, points=POINTS)
    checked = results.states[state].checked
    over = field.utilisation
    if results.parts is not None:  # of the stress drawn, not of another part's
        over = over_least(results, (state,), field.segment, field.stress, field.utilisation)
    strips = [
        Strip("u", "displacement", "displacement", field.x, (field.displacement,)),
        Strip("N", "force", "force", field.x, (field.force,)),
        Strip(
            "σ",
            "stress",
            "stress",
            field.x,
            (field.stress,),
            over=(over,) if checked else (),
            limits=_allowables(results, (state,), (field.stress,)) if checked else (),
            marks=point_marks(results, (state,), "stress"),
        ),
    ]
    if checked:
        strips.append(_utilisation(results, (state,), field.x, field.utilisation))
    if "mode" in kinds:
        strips += _shapes(results, state)
    chosen = _chosen(strips, kinds)
    canvas = _canvas(results, chosen)
    if drawing:
        draw_above(canvas, results.project, results.position, results.loads, state, _extent(results))
    return _figure(results, canvas, chosen, results.states[state].name, drawing=drawing)


def envelope_figure(results: Results, kinds: tuple[Kind, ...] = USUAL, *, drawing: bool = False) -> Figure:
    """The largest and smallest values over all checked states; extremes, not one state in equilibrium."""
    field = envelope(results, points=POINTS)
    x, stress = field.x, (field.stress_max, field.stress_min)
    checked = tuple(index for index, state in enumerate(results.states) if state.checked)
    strips = [
        Strip("u", "displacement", "displacement", x, (field.displacement_max, field.displacement_min)),
        Strip("N", "force", "force", x, (field.force_max, field.force_min)),
        Strip(
            "σ",
            "stress",
            "stress",
            x,
            stress,
            over=tuple(over_least(results, checked, field.segment, c, field.utilisation) for c in stress),
            limits=_allowables(results, checked, stress),
            marks=point_marks(results, checked, "stress"),
        ),
        _utilisation(results, checked, x, field.utilisation),
    ]
    chosen = _chosen(strips, kinds)
    canvas = _canvas(results, chosen)
    if drawing:
        draw_above(canvas, results.project, results.position, None, 0, _extent(results))
    return _figure(results, canvas, chosen, tr("envelope of all checked combinations"), drawing=drawing)


def mode_figure(results: Results, state: int) -> Figure:
    """The shape in which the member bends out; it has no size and no unit."""
    canvas = _canvas(results, _shapes(results, state))
    alt = tr("Shape of buckling: {state}").format(state=results.states[state].name)
    return Figure(canvas.render(alt), *canvas.size, alt)


def _shapes(results: Results, state: int) -> list[Strip]:
    """The strip of the mode shape, where there is one."""
    curve = mode_curve(results, state, points=POINTS)
    return [] if curve is None else [Strip("w", "mode", "factor", curve.x, (curve.deflection,))]


def _chosen(strips: list[Strip], kinds: tuple[Kind, ...]) -> list[Strip]:
    """Those of these kinds that there are, in the order of the kinds."""
    made = {strip.kind: strip for strip in strips}
    return [made[kind] for kind in kinds if kind in made]


def _utilisation(results: Results, states: tuple[int, ...], x: FloatArray, values: FloatArray) -> Strip:
    return Strip(
        tr("utilisation"),
        "utilisation",
        "factor",
        x,
        (values,),
        over=(values,),
        limits=(Limit(0.0, float(results.position[-1]), 1.0),),
        marks=point_marks(results, states, "utilisation"),
    )


def _allowables(
    results: Results, states: tuple[int, ...], stress: tuple[FloatArray, ...]
) -> tuple[Limit, ...]:
    """The states' allowable stresses, as the window draws them."""
    units = results.project.display.unit_system
    return tuple(
        Limit(line.first, line.last, line.value, allowable_texts(line, units), line.far)
        for line in allowable_lines(results, states, stress)
    )


def _extent(results: Results) -> float:
    return _UPRIGHT if results.project.display.layout == "vertical" else _ACROSS


def _canvas(results: Results, strips: list[Strip]) -> Canvas:
    """The strips with the joints' marks, the first joint at 0."""
    upright = results.project.display.layout == "vertical"
    units = results.project.display.unit_system
    positions = drawn_positions(results.position.tolist(), _extent(results), upright=upright)
    ruler, canvas, place = Ruler(upright, positions), Canvas(), 0.0
    for strip in strips:
        depth = DEPTH_UPRIGHT if upright else DEPTH_ACROSS[strip.kind]
        start = place if upright else -place - depth
        draw_strip(canvas, ruler, strip, start, depth, results.position, units)
        place += depth + _GAP + (10.0 if upright else 0.0)
    _draw_places(canvas, ruler, results, place)
    _say_scale(canvas, ruler, results, place)
    return canvas


def _figure(results: Results, canvas: Canvas, strips: list[Strip], of: str, *, drawing: bool) -> Figure:
    """The canvas with what it shows in words."""
    names = kind_names()
    alt = tr("Strips of {strips}: {state}").format(
        strips="; ".join(names[strip.kind] for strip in strips), state=of
    )
    if drawing:
        alt = f"{member_alt(results.project)}. {alt}"
    return Figure(canvas.render(alt), *canvas.size, alt)


def _say_scale(canvas: Canvas, ruler: Ruler, results: Results, place: float) -> None:
    """Which segments are wider than to scale, under the strips."""
    text = not_to_scale([results.project.segments[index].mark for index in ruler.positions.widened])
    if text:
        x, y = ruler.point(-14.0, 0.0) if ruler.upright else ruler.point(0.0, -place - 12.0)
        canvas.text((x, y + 2.5), text, size=_SIZE, fill=QUIET)


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
