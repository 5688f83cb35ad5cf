"""The readout tells the force in companions beside the cursor, exactly, in one state and over all."""

import numpy as np
import pytest

from app.edits import set_value
from app.gui.strips.readout import envelope_readout, state_readout
from solver.companion_fields import companion_curves, companion_force_at
from solver.solve import solve
from tests.sleeves import draw_bolt


def test_the_force_stands_behind_the_members_values():
    results = solve(draw_bolt())
    pulled = results.state_index("Pulled")
    assert "S: N −42\u202f457 N" in state_readout(results, pulled, 0.1)
    assert "S: N" not in state_readout(results, pulled, 0.02)
    assert "S: N −52\u202f793 … −42\u202f457 N" in envelope_readout(results, 0.1)


def test_it_is_the_force_of_the_curve_where_loads_make_it_vary():
    loaded = set_value(draw_bolt(), ("load_cases", 1, "segment_loads", 0, "load_start"), 40e3)
    results = solve(loaded)
    state = results.state_index("Pulled")
    curves = companion_curves(results, state, 0)
    told = [companion_force_at(results, state, 0, float(x)) for x in curves.x[3:17]]
    np.testing.assert_allclose(told, curves.force[3:17], rtol=1e-9)
    assert companion_force_at(results, state, 0, 0.3) is None
    middle = 0.5 * (curves.force[0] + curves.force[19])
    assert companion_force_at(results, state, 0, 0.12) == pytest.approx(middle, rel=1e-6)
