"""A place in a project, such as `segments[2].section.diameter`: which quantity stands there, and its words.

Faults, edits and tables all name values by their place in the file; what unit such a value wears and what a
person calls it follow from its key alone, so they are tables.
"""

from __future__ import annotations

import re
from collections.abc import Mapping
from typing import Final

from app.units import Quantity
from app.words import later, tr

_QUANTITIES: Final[Mapping[str, Quantity]] = {
    "length": "length",
    **dict.fromkeys(
        ("diameter", "outer", "inner", "width", "depth",
         "diameter_end", "outer_end", "inner_end", "width_end", "depth_end"), "size"),
    **dict.fromkeys(("area", "area_end"), "area"),
    **dict.fromkeys(("second_moment", "second_moment_end"), "second_moment"),
    "fillet_radius": "size",
    **dict.fromkeys(("allowable_tension", "allowable_compression", "allowable_peak",
                     "amplitude", "ultimate"), "stress"),
    "translation": "spring",
    "rotation": "rotation_spring",
    "modulus": "modulus",
    "expansion": "expansion",
    "density": "density",
    "stiffness": "spring",
    **dict.fromkeys(("clearance", "lack_of_fit", "movement"), "displacement"),
    **dict.fromkeys(("bedding", "bedding_end"), "bedding"),
    **dict.fromkeys(("load_start", "load_end"), "distributed"),
    **dict.fromkeys(("temperature_start", "temperature_end"), "temperature"),
    "force": "force",
    "gravity": "acceleration",
    **dict.fromkeys(("allowable_factor", "factor", "stability_factor"), "factor"),
}  # fmt: skip

_WORDS: Final[Mapping[str, str]] = {
    "title": later("title"), "notes": later("notes"), "sheet": later("sheet"), "display": later("display"),
    "units": later("units"), "orientation": later("orientation"), "job": later("job"), "date": later("date"),
    "author": later("author"), "checker": later("checker"), "revision": later("revision"),
    "materials": later("material"), "joints": later("joint"), "segments": later("segment"),
    "load_cases": later("load case"), "combinations": later("combination"), "limits": later("limits"),
    "segment_loads": later("segment load"), "joint_loads": later("joint load"),
    "displacement": later("displacement"), "relative": later("relative displacement"),
    "reaction": later("reaction"), "name": later("name"), "mark": later("mark"), "length": later("length"),
    "material": later("material"), "section": later("section"), "shape": later("shape"),
    "diameter": later("diameter"), "diameter_end": later("diameter at the end"),
    "outer": later("outside diameter"), "outer_end": later("outside diameter at the end"),
    "inner": later("inside diameter"), "inner_end": later("inside diameter at the end"),
    "width": later("width"), "width_end": later("width at the end"),
    "depth": later("depth"), "depth_end": later("depth at the end"),
    "area": later("area"), "area_end": later("area at the end"),
    "second_moment": later("second moment"), "second_moment_end": later("second moment at the end"),
    "allowable_tension": later("allowable stress in tension"),
    "allowable_compression": later("allowable stress in compression"),
    "modulus": later("modulus"), "expansion": later("expansion"), "density": later("density"),
    "support": later("support"), "kind": later("kind"), "side": later("side"),
    "stiffness": later("stiffness"), "clearance": later("clearance"),
    "bedding": later("bedding"), "bedding_end": later("bedding at the end"),
    "load_start": later("load at the start"), "load_end": later("load at the end"),
    "temperature_start": later("temperature rise at the start"),
    "temperature_end": later("temperature rise at the end"), "lack_of_fit": later("lack of fit"),
    "segment": later("segment"), "joint": later("joint"), "from": later("from"), "to": later("to"),
    "force": later("force"), "movement": later("movement"), "gravity": later("gravity"),
    "factors": later("factor"), "allowable_factor": later("factor on the allowable stresses"),
    "supports": later("support"), "shoulder": later("shoulder"), "fillet_radius": later("fillet radius"),
    "factor": later("factor"), "lateral": later("lateral support"), "translation": later("translation"),
    "rotation": later("rotation"), "bonded": later("bonded part"), "companions": later("companion"),
    "acts": later("way of acting"), "allowable_peak": later("allowable peak stress"),
    "endurance": later("endurance"), "amplitude": later("amplitude"), "ultimate": later("ultimate stress"),
    "fatigue": later("fatigue range"), "stability_factor": later("required stability factor"),
    "waived": later("waiver"), "check": later("check"), "reason": later("reason"),
    "limit": later("limit"), "format": later("format"), "version": later("version"),
}  # fmt: skip

# A key in a table of factors is a name of the user's, which may hold dots and brackets of its own.
_FACTOR: Final = re.compile(r"(?P<table>.*\.factors)(?:\.(?P<name>.+)|\[(?P<quoted>\D.*)\])", re.DOTALL)


def quantity_at(place: str) -> Quantity | None:
    """The quantity of the number at a place of the project file; None where no number with a unit stands."""
    if _FACTOR.fullmatch(place):
        return "factor"
    keys = re.findall(r"[a-z_]+", place)
    if keys and keys[-1] == "limit":
        return "force" if "reaction" in keys else "displacement"
    return _QUANTITIES.get(keys[-1]) if keys else None


def place_words(place: str) -> str:
    """A place as a person counts it: "segment 3, section, diameter" for `segments[2].section.diameter`."""
    factor = _FACTOR.fullmatch(place)
    keys = re.findall(r"([a-z_]+)(?:\[([0-9]+)\])?", factor["table"] if factor else place)
    words = [_key_words(key, index) for key, index in keys]
    if factor:
        words.append(f"“{(factor['name'] or factor['quoted']).strip(chr(34))}”")
    return ", ".join(words)


def _key_words(key: str, index: str) -> str:
    """One key with its number, counted from 1."""
    word = tr(_WORDS.get(key, key))
    return f"{word} {int(index) + 1}" if index else word
