"""Where the ruler bends, the curves of an earlier edit and of a reference bend with it."""

import numpy as np

from app.drawing.ruler import Ruler
from app.gui.sheet_layout import Axes
from app.gui.strips.content import PLAIN, Trace
from app.gui.strips.paths import Pixels, Scale

SCALE = Scale(0.0, 10.0, 100.0, 0.0)


def test_a_straight_curve_across_a_joint_has_its_value_there_and_keeps_its_straightness_in_between():
    ruler = Ruler.fitting((0.0, 0.01, 10.0), 0.0, 100.0)
    trace = Trace(np.array([0.0, 10.0]), np.array([0.0, 10.0]), np.array([PLAIN]))
    line = Pixels.of(trace, ruler, SCALE, Axes(upright=False)).lines()[PLAIN]
    assert ruler.pixel(0.01) in line.x
    np.testing.assert_allclose(np.interp(ruler.pixel(0.01), line.x, line.y), SCALE.pixel(0.01))
    np.testing.assert_allclose(np.interp(ruler.pixel(5.0), line.x, line.y), SCALE.pixel(5.0))
