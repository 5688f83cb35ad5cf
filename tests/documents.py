"""Project files as plain values: the example of the format's description, and ways to change and break it."""

from __future__ import annotations

import copy
import json
from typing import Any

from hypothesis import strategies as st

from app.encode import plain
from app.project_file import ProjectFileError, parse
from solver.faults import Fault
from tests.strategies import projects

_EXAMPLE: dict[str, Any] = {
    "format": "barwright-project",
    "version": 1,
    "title": "Gate hoist tie rod",
    "notes": "free text",
    "sheet": {"job": "", "author": "", "checker": "", "revision": "", "date": ""},
    "display": {"units": "mm-N-MPa", "orientation": "horizontal"},
    "materials": [
        {
            "name": "Steel",
            "modulus": 2.1e11,
            "expansion": 1.2e-5,
            "density": 7850.0,
            "allowable_tension": 1.6e8,
            "allowable_compression": 1.4e8,
        }
    ],
    "joints": [
        {"mark": "0", "support": {"kind": "fixed"}},
        {"mark": "1", "support": {"kind": "stop", "side": "plus", "clearance": 0.002, "stiffness": 5.0e8}},
        {"mark": "2", "support": {"kind": "spring", "stiffness": 4.0e7}},
    ],
    "segments": [
        {
            "mark": "A",
            "length": 0.35,
            "material": "Steel",
            "section": {"shape": "tube", "outer": 0.04, "outer_end": 0.03, "inner": 0.02, "inner_end": 0.01},
        },
        {
            "mark": "B",
            "length": 0.5,
            "material": "Steel",
            "section": {"shape": "area", "area": 7.0e-4},
            "bedding": 2.0e6,
            "bedding_end": 3.0e6,
        },
    ],
    "load_cases": [
        {"name": "Dead", "gravity": -9.80665, "segment_loads": [], "joint_loads": []},
        {
            "name": "Service",
            "segment_loads": [
                {
                    "segment": "A",
                    "load_start": 1000.0,
                    "load_end": 1500.0,
                    "temperature_start": 30.0,
                    "temperature_end": 45.0,
                    "lack_of_fit": 0.0001,
                }
            ],
            "joint_loads": [{"joint": "1", "force": 25000.0}, {"joint": "0", "movement": -0.0005}],
        },
    ],
    "combinations": [
        {"name": "Working", "factors": {"Service": 1.0, "Dead": 1.0}, "allowable_factor": 1.0},
        {"name": "Idle", "factors": {}},
    ],
    "limits": {
        "displacement": [{"joint": "2", "limit": 0.002}],
        "relative": [{"from": "0", "to": "2", "limit": 0.0015}],
        "reaction": [{"joint": "0", "limit": 40000.0}],
    },
}
KEPT = {"format", "version", "joints", "segments", "mark", "length", "material", "section", "name",
        "modulus", "shape", "kind", "area", "diameter", "outer", "inner", "width", "depth", "stiffness",
        "side", "clearance", "joint", "segment", "limit", "from", "to", "materials"}  # fmt: skip


def example() -> Any:
    """A fresh copy, to be changed at will."""
    return copy.deepcopy(_EXAMPLE)


def changed(*steps: Any) -> Any:
    """The example with the last step put at the place that the others name; a string names a key."""
    *place, last, value = steps
    document = holder = example()
    for step in place:
        holder = holder[step]
    holder[last] = value
    return document


def without(*place: Any) -> Any:
    """The example without the key at the place."""
    document = holder = example()
    for step in place[:-1]:
        holder = holder[step]
    del holder[place[-1]]
    return document


def encoded(document: Any) -> bytes:
    """In the format of a saved file."""
    return f"{json.dumps(document, indent=2, ensure_ascii=False)}\n".encode()


def faults_of(data: Any) -> tuple[Fault, ...]:
    """What reading says of the bytes, or of the document; empty where it reads them."""
    try:
        parse(data if isinstance(data, bytes) else encoded(data))
    except ProjectFileError as error:
        return error.faults
    return ()


@st.composite
def documents(draw: st.DrawFn) -> Any:
    """Well-formed documents in which any optional key may be left out."""
    document = _thinned(draw, plain(draw(projects(max_segments=3))))
    if "load_cases" not in document:
        document.pop("combinations", None)  # their factors would name cases that are gone
    return document


def _thinned(draw: st.DrawFn, value: Any) -> Any:
    if isinstance(value, list):
        return [_thinned(draw, item) for item in value]
    if not isinstance(value, dict):
        return value
    kept = {key: item for key, item in value.items() if key in KEPT or draw(st.booleans())}
    if "second_moment" not in kept:
        kept.pop("second_moment_end", None)
    if "outer" in kept:  # a bore left out at one end may be too wide for the other
        kept = value
    return {key: _thinned(draw, item) for key, item in kept.items()}
