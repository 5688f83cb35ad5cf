"""The JSON Schema of the project file, for editors and for people who write one with a program of their own.

msgspec knows types and constraints; what it cannot know is added here: what each key means and in which unit,
and the defaults, which in the model are values that know they were never written.
"""

from __future__ import annotations

from typing import Any, Final

import msgspec
from msgspec import NODEFAULT, Struct, inspect

from app.encode import plain
from solver.model import (
    DEFAULT_ACTION,
    DEFAULT_ORIENTATION,
    DEFAULT_UNITS,
    AreaSection,
    BondedPart,
    Combination,
    Companion,
    CompanionSegment,
    DisplacementLimit,
    Display,
    Endurance,
    FatigueRange,
    FixedSupport,
    Joint,
    JointLoad,
    Lateral,
    Limits,
    LoadCase,
    Material,
    Project,
    ReactionLimit,
    RectangleSection,
    RelativeLimit,
    RoundSection,
    Segment,
    SegmentLoad,
    SheetTexts,
    Shoulder,
    SpringSupport,
    StopSupport,
    TubeSection,
    Waiver,
)

_DIALECT: Final = "https://json-schema.org/draft/2020-12/schema"
_FOLLOWS: Final = "; follows the start where left out"

KEYS: Final[dict[type[Struct], dict[str, str]]] = {
    Project: {
        "format": "Says that this is a Barwright project",
        "version": "Version of the file format",
        "title": "Title of the member",
        "notes": "Free text",
        "sheet": "Texts of the calc sheet's title block",
        "display": "How the project is shown; never changes what the file stores",
        "materials": "Materials; their names are unique",
        "joints": "The n + 1 joints in order along the axis; their marks are unique",
        "segments": "The n segments in order along the axis, each between two joints; their marks are unique",
        "companions": "Second chains beside the member; the marks of their segments differ from the member's",
        "load_cases": "Loads that come together; their names are unique",
        "combinations": "Factored load cases that are checked; with none, each case is checked alone",
        "fatigue": "Pairs of combinations between which the stress goes back and forth",
        "limits": "What the member must keep within beside the allowable stresses",
    },
    SheetTexts: {
        "job": "Job or contract",
        "author": "Who made the calculation",
        "checker": "Who checked it",
        "revision": "Revision",
        "date": "Date, as it is to be printed",
    },
    Display: {
        "units": "Display unit system",
        "orientation": "Layout of the drawing; x runs upward when vertical",
    },
    Material: {
        "name": "Name that segments refer to",
        "modulus": "Modulus of elasticity, Pa",
        "expansion": "Coefficient of thermal expansion, 1/K",
        "density": "Density, kg/m³",
        "allowable_tension": "Allowable stress in tension, Pa; without it tension is not checked",
        "allowable_compression": "Allowable stress in compression, Pa, positive; without it compression "
        "is not checked",
        "allowable_peak": "Allowable peak stress at shoulders, Pa, either sign; without it it is not checked",
        "endurance": "What the material endures under stress that goes back and forth",
    },
    Endurance: {
        "amplitude": "Amplitude endured without mean stress, Pa; size, finish and reliability are in it",
        "ultimate": "Mean stress endured without amplitude, Pa",
    },
    Joint: {
        "mark": "Label on the drawing, that loads and limits refer to",
        "support": "What holds the joint along the axis; free where left out",
        "supports": "Several supports at one joint, instead of support",
        "shoulder": "Step that raises the stress, by its fillet radius or its factor",
        "lateral": "What holds the joint sideways, for stability; free where left out",
    },
    Shoulder: {
        "fillet_radius": "Fillet radius of a step from round to round, m",
        "factor": "Stress concentration factor on the nominal stress of the smaller side",
    },
    Lateral: {
        "translation": "free, fixed, or a stiffness, N/m; free where left out",
        "rotation": "free, fixed, or a stiffness, N·m/rad; free where left out",
    },
    FixedSupport: {"kind": "Held at its movement"},
    SpringSupport: {"kind": "Pulled back in proportion", "stiffness": "Stiffness, N/m"},
    StopSupport: {
        "kind": "Blocks motion to one side only",
        "side": "plus blocks motion along +x beyond the clearance, minus along −x",
        "clearance": "Free way before it blocks, m",
        "stiffness": "Stiffness once it blocks, N/m; rigid where left out",
    },
    Segment: {
        "mark": "Label on the drawing, that loads refer to",
        "length": "Length, m",
        "material": "Name of a material",
        "section": "Cross-section, told apart by its shape",
        "bedding": "Elastic resistance along the axis per length and displacement at the start, N/m²",
        "bedding_end": f"The same at the end, N/m²{_FOLLOWS}",
        "bonded": "Parts that share the segment's strain, beside its own material and section",
    },
    BondedPart: {"material": "Name of a material", "section": "Cross-section, told apart by its shape"},
    Companion: {
        "mark": "Label on the drawing",
        "from": "Mark of the joint where it begins; it stays tied there",
        "to": "Mark of a joint further along, where one that acts one way only parts",
        "acts": "both, or in compression only (it can separate), or in tension only (it can go slack)",
        "segments": "Its segments in order along the axis; their lengths add up to the distance spanned",
    },
    CompanionSegment: {
        "mark": "Label on the drawing, that loads refer to",
        "length": "Length, m",
        "material": "Name of a material",
        "section": "Cross-section, told apart by its shape",
    },
    AreaSection: {
        "shape": "Known by its area alone",
        "area": "Area at the start, m²",
        "area_end": f"Area at the end, m²{_FOLLOWS}",
        "second_moment": "Second moment of area at the start, m⁴; needed for stability only",
        "second_moment_end": f"Second moment of area at the end, m⁴{_FOLLOWS}",
    },
    RoundSection: {
        "shape": "Solid round bar",
        "diameter": "Diameter at the start, m",
        "diameter_end": f"Diameter at the end, m{_FOLLOWS}",
    },
    TubeSection: {
        "shape": "Round tube; inner is below outer everywhere",
        "outer": "Outside diameter at the start, m",
        "outer_end": f"Outside diameter at the end, m{_FOLLOWS}",
        "inner": "Inside diameter at the start, m",
        "inner_end": f"Inside diameter at the end, m{_FOLLOWS}",
    },
    RectangleSection: {
        "shape": "Solid rectangle",
        "width": "Width at the start, m",
        "width_end": f"Width at the end, m{_FOLLOWS}",
        "depth": "Depth at the start, m; the drawing shows it",
        "depth_end": f"Depth at the end, m{_FOLLOWS}",
    },
    LoadCase: {
        "name": "Name that combinations refer to",
        "gravity": "Component of the acceleration along +x, m/s²; acts on every segment's density",
        "segment_loads": "Loads on segments; several for one segment add up",
        "joint_loads": "Loads at joints; several for one joint add up",
    },
    SegmentLoad: {
        "segment": "Mark of the segment",
        "load_start": "Load along +x at the start, N/m",
        "load_end": f"Load along +x at the end, N/m{_FOLLOWS}",
        "temperature_start": "Temperature rise above the stress-free state at the start, K",
        "temperature_end": f"Temperature rise at the end, K{_FOLLOWS}",
        "lack_of_fit": "Surplus of length, m; positive for a part made too long",
    },
    JointLoad: {
        "joint": "Mark of the joint",
        "force": "Force along +x, N",
        "movement": "Movement of the joint's support along +x, m",
    },
    Combination: {
        "name": "Name of the combination",
        "factors": "Factor by load case; a case not named counts 0",
        "allowable_factor": "Scales the allowable stresses only",
    },
    Limits: {
        "displacement": "Limits on displacements, at most one a joint",
        "relative": "Limits on displacements of one joint against another",
        "reaction": "Limits on reactions, at most one a joint",
        "stability_factor": "Least factor between the loads and the elastic critical load",
        "waived": "Checks that are done without, each with its reason",
    },
    Waiver: {"check": "Which check", "reason": "Why it is done without; printed"},
    FatigueRange: {"from": "Name of one combination", "to": "Name of the other combination"},
    DisplacementLimit: {"joint": "Mark of the joint", "limit": "Largest displacement either way, m"},
    RelativeLimit: {
        "from": "Mark of one joint",
        "to": "Mark of the other joint",
        "limit": "Largest difference of their displacements either way, m",
    },
    ReactionLimit: {"joint": "Mark of the joint", "limit": "Largest reaction either way, N"},
}

# Defaults that stand in no field, since the model keeps "left out" apart from them.
_RESOLVED: Final[dict[type[Struct], dict[str, str]]] = {
    Display: {"units": DEFAULT_UNITS, "orientation": DEFAULT_ORIENTATION},
    Companion: {"acts": DEFAULT_ACTION},
    Lateral: {"translation": "free", "rotation": "free"},
}


def schema() -> dict[str, Any]:
    """The JSON Schema (2020-12) of a project file, strict about unknown keys."""
    made = msgspec.json.schema(Project)
    definitions = made["$defs"]
    for record, words in KEYS.items():
        _describe(definitions[record.__name__], record, words)
    definitions["Project"]["properties"]["segments"]["minItems"] = 1
    definitions["Project"]["properties"]["joints"]["minItems"] = 2
    definitions["Companion"]["properties"]["segments"]["minItems"] = 1
    definitions["Shoulder"]["oneOf"] = [{"required": ["fillet_radius"]}, {"required": ["factor"]}]
    definitions["Joint"]["not"] = {"required": ["support", "supports"]}
    area = definitions[AreaSection.__name__]
    area["dependentRequired"] = {"second_moment_end": ["second_moment"]}
    return {"$schema": _DIALECT, "title": "Barwright project", **made}


def _describe(definition: dict[str, Any], record: type[Struct], words: dict[str, str]) -> None:
    """Add title, meaning and default of each key of one record."""
    defaults = _defaults(record) | _RESOLVED.get(record, {})
    for key, value in definition["properties"].items():
        value["title"] = key.replace("_", " ")
        value["description"] = words[key]
        if key in defaults:
            value["default"] = defaults[key]


def _defaults(record: type[Struct]) -> dict[str, Any]:
    described = inspect.type_info(record)
    assert isinstance(described, inspect.StructType)  # noqa: S101 - for the type checker
    made = {f.encode_name: f.default_factory for f in described.fields if f.default_factory is not NODEFAULT}
    return {key: plain(factory()) for key, factory in made.items()}
