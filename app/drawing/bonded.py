"""Bonded parts on the drawing: layers around or inside a segment's own part, and their label.

What is thicker than the segment's own part lies around it and is drawn first; the rest is seen inside. A part
known by its area alone is the round bar of that area, dashed, as such a segment is.
"""

from __future__ import annotations

from functools import lru_cache

from app.bonded_entry import bonded_label
from app.drawing.shapes import Fill, Part
from app.drawing.sketch import Sketch
from app.words import language, tr
from solver.model import AnySection, AreaSection, BondedPart, Segment, TubeSection, UnitSystemName, parts_of
from solver.sections import outline

SAMPLES = 12  # of an outline that is not straight
THIN = 0.9  # px, the edge of a layer


def outer_of(segment: Segment, s: float) -> float:
    """Half the thickness of all parts together at a fraction of the segment, m."""
    if not segment.bonded:
        return outline(segment.section, s).outer
    return max(outline(part.section, s).outer for part in parts_of(segment))


def layers_around(segment: Segment) -> list[AnySection]:
    """The sections that are drawn behind the segment's own, the thickest first."""
    return [section for section in _by_thickness(segment) if _is_thicker(section, segment.section)]


def layers_inside(segment: Segment) -> list[AnySection]:
    """The sections that are drawn over the segment's own, the thickest first."""
    return [section for section in _by_thickness(segment) if not _is_thicker(section, segment.section)]


def _by_thickness(segment: Segment) -> list[AnySection]:
    if not segment.bonded:
        return []
    return sorted((part.section for part in segment.bonded), key=_thickness, reverse=True)


def _thickness(section: AnySection) -> float:
    return outline(section, 0.5).outer


def _is_thicker(section: AnySection, own: AnySection) -> bool:
    return _thickness(section) > _thickness(own)


def draw_layer(sketch: Sketch, section: AnySection, ends: tuple[float, float], part: Part) -> None:
    """The outline of one layer between the segment's ends, a tube's inside with it."""
    bare = isinstance(section, AreaSection)
    fill: Fill = "" if sketch.frame.detail.hollow else "band_fill"
    upper, lower = _edges(sketch, section, ends, inner=False)
    dash = (4.0, 3.0) if bare else ()
    sketch.line(*upper, *reversed(lower), width=THIN, fill=fill, closed=True, dash=dash, part=part, clip=True)
    if isinstance(section, TubeSection):
        for edge in _edges(sketch, section, ends, inner=True):
            sketch.line(*edge, ink="quiet", width=THIN, dash=(4.0, 3.0), clip=True)


def _edges(
    sketch: Sketch, section: AnySection, ends: tuple[float, float], *, inner: bool
) -> tuple[list[tuple[float, float]], list[tuple[float, float]]]:
    """Both sides of the axis, from start to end."""
    fractions = [i / SAMPLES for i in range(SAMPLES + 1)] if isinstance(section, AreaSection) else [0.0, 1.0]
    start, end = ends
    halves = []
    for s in fractions:
        found = outline(section, s)
        half = (found.inner if inner else found.outer) * sketch.scale
        halves.append((start + s * (end - start), half))
    axis = sketch.rows.axis
    return [(a, axis - h) for a, h in halves], [(a, axis + h) for a, h in halves]


def bonded_text(parts: tuple[BondedPart, ...], system: UnitSystemName) -> str:
    """What is bonded, for labels and tooltips; empty where nothing is."""
    return tr("bonded: {parts}").format(parts=_label(parts, system, language())) if parts else ""


@lru_cache(maxsize=1024)
def _label(parts: tuple[BondedPart, ...], system: UnitSystemName, _language: str) -> str:
    return bonded_label(parts, system)
