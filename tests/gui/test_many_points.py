"""Strips of very many points stay true: each column of pixels shows its lowest and its highest value."""

from dataclasses import replace

import numpy as np
import pytest
from PySide6.QtGui import QColor, QImage, QPainter

from app.gui.strips.content import envelope_contents, number, state_contents
from app.gui.strips.readout import state_readout
from app.gui.theme import LIGHT
from app.thinning import MOST
from solver.fields import at, curves
from solver.model import Combination, FixedSupport, SegmentLoad
from solver.solve import solve
from tests.gui.sheets import SIZES
from tests.gui.test_strips import BOTH_WAYS, places, strip_in
from tests.members import Part, case, member, round_bar, segment_mark

COUNT = 20_000
KINDS = ("displacement", "force", "stress")
HALF_PIXEL = 0.5


@pytest.fixture(scope="module")
def long():
    """20 000 short tapers with loads that turn from one to the next, so that each has extremes inside."""
    random = np.random.default_rng(5)
    parts = [
        Part(0.01, round_bar(d, d * 1.1), allowable_tension=1.6e8, allowable_compression=1.4e8)
        for d in random.uniform(0.03, 0.06, COUNT)
    ]
    sizes = random.normal(0.0, 3e6, COUNT)
    loads = [SegmentLoad(segment_mark(i), size, -size) for i, size in enumerate(sizes)]
    return solve(member(parts, {0: FixedSupport(), COUNT: FixedSupport()}, [case(on_segments=loads)]))


def columns(along, across, place):
    """By column of pixels in the window, the lowest and the highest value; NaN where nothing is."""
    first, last = sorted((place.ruler.begin, place.ruler.end))
    found = np.full((2, round(last - first)), np.nan)
    at = np.floor(along - first).astype(int)
    inside = (at >= 0) & (at < found.shape[1])
    np.fmin.at(found[0], at[inside], across[inside])
    np.fmax.at(found[1], at[inside], across[inside])
    return found


def spread_out(found):
    """The lowest and highest of each column and the two beside it."""
    wide = np.pad(found, ((0, 0), (1, 1)), mode="edge")
    low, high = np.stack([wide[:, :-2], wide[:, 1:-1], wide[:, 2:]]).transpose(1, 0, 2)
    return np.nanmin(low, axis=0), np.nanmax(high, axis=0)


def points_of(curve):
    """Where its points lie, (x, y) in pixels."""
    return curve.shape.points.x, curve.shape.points.y


@BOTH_WAYS
@pytest.mark.parametrize("size", SIZES, ids=["small", "large"])
@pytest.mark.usefixtures("qapp")
def test_every_column_reaches_its_extremes(long, size, upright):
    whole = curves(long, 0, points=9 * COUNT)  # all ends, all extremes, filling
    for kind, shown, place in zip(
        KINDS, state_contents(long, 0), places(long, size, upright=upright), strict=False
    ):
        strip = strip_in(shown, place)
        data = [points_of(curve) for curve in strip.curves if curve.brush is None]
        drawn = np.hstack([np.array(pair[:: -1 if upright else 1]) for pair in data])
        wanted = columns(place.ruler.pixel(whole.x), strip.scale.pixels(getattr(whole, kind)), place)
        found = columns(drawn[0], drawn[1], place)
        assert drawn.shape[1] <= 3 * MOST * wanted.shape[1]
        # Of extremes within 1/4800 of the member one is kept, which may lie in the next column.
        for own, other in ((found, wanted), (wanted, found)):
            low, high = spread_out(other)
            assert (own[0] >= low - HALF_PIXEL).all()
            assert (own[1] <= high + HALF_PIXEL).all()


@pytest.mark.usefixtures("qapp")
def test_the_readout_is_the_solvers_not_the_drawn_points(long):
    x = float(long.position[7_777]) + 0.0037
    exact = at(long, 0, x).left
    units = long.project.display.unit_system
    assert number("force", exact.force, units) in state_readout(long, 0, x)


def one_bar(force=0.0, *, states=1, checked=True):
    allowables = dict.fromkeys(("allowable_tension", "allowable_compression"), 1.6e8) if checked else {}
    part = Part(1.0, round_bar(0.04), **allowables)
    load = case(on_segments=[SegmentLoad("A", force, force)])
    names = [Combination(f"C{i}", {"Load": 1.0 + i}) for i in range(states)]
    return solve(member([part], {0: FixedSupport()}, [load], names))


@BOTH_WAYS
@pytest.mark.parametrize("together", [False, True], ids=["alone", "together"])
@pytest.mark.parametrize(
    "results",
    [one_bar(), one_bar(1e-6), one_bar(1e12, states=3), one_bar(5e5, checked=False), one_bar(states=2)],
    ids=["nothing", "almost nothing", "huge", "not checked", "nothing twice"],
)
@pytest.mark.usefixtures("qapp")
def test_the_edges_of_what_there_is_are_drawn_inside_their_strips(results, together, upright):
    image = QImage(900, 480, QImage.Format.Format_RGB32)
    for contents in (
        state_contents(results, 0, together=together),
        envelope_contents(results, together=together),
    ):
        for shown, place in zip(contents, places(results, upright=upright), strict=True):
            strip = strip_in(shown, place)
            assert np.isfinite([shown.low, shown.high]).all()
            assert shown.low < shown.high
            for curve in strip.curves:
                assert np.isfinite(points_of(curve)).all()
            image.fill(QColor(LIGHT.paper))
            painter = QPainter(image)
            strip.paint(painter, None, None)
            painter.end()
            outside = image.pixelColor(2, 2).name().upper()
            assert outside == LIGHT.paper
            texts = [label.text for label in strip.labels]
            assert len(texts) == len(set(texts)) or shown.kind in ("force", "stress")


@pytest.mark.usefixtures("qapp")
def test_zoomed_far_in_only_what_is_seen_is_drawn(long):
    place = places(long)[1]
    close = replace(place, ruler=place.ruler.zoomed(500.0, place.ruler.begin))
    strip = strip_in(state_contents(long, 0)[1], close)
    first, last = close.ruler.begin, close.ruler.end
    for curve in strip.curves:
        x, _y = points_of(curve)
        assert len(x) < 2_000
        assert x.min() > first - (last - first)
        assert x.max() < last + (last - first)
