"""The words of faults: place: rule, value; remedy.

A file's faults name place and value as they stand in the file, in SI, so that they can be found there. Given
a unit system the same fault is told in the words and units of the tables.
"""

from __future__ import annotations

import json
from collections.abc import Mapping, Sequence
from typing import Final

from app.numerals import MINUS
from app.places import place_words, quantity_at
from app.units import Quantity, entry_text, symbol
from app.words import later, tr
from solver.faults import Fault, Rule
from solver.model import UnitSystemName

# The rule's sentence and the remedy; a fact `nearest` replaces the remedy by a suggestion.
FAULTS: Final[Mapping[Rule, tuple[str, str]]] = {
    "not_utf8": (later("is not UTF-8 text"), later("save it as UTF-8")),
    "not_json": (
        later("is not JSON: {reason} (line {line}, column {column})"),
        later("mend it there or open an earlier copy"),
    ),
    "too_deep": (later("lists and tables are nested too deep for a project"), later("take the surplus out")),
    "duplicate_key": (later("the key {key} stands twice"), later("keep one of them")),
    "not_finite": (later("must be a finite number, is {value}"), later("enter a number")),
    "not_a_project": (
        later('the format must be "barwright-project", is {found}'),
        later("open a file that was saved as a project"),
    ),
    "newer_version": (
        later("this is version {value} of the project file, and this program reads up to version {known}"),
        later("open it with a newer Barwright"),
    ),
    "unknown_key": (later("there is no key {key} here"), later("take it out")),
    "missing_key": (later("the key {key} is missing"), later("add it")),
    "wrong_type": (later("must be {expected}, is {value}"), ""),
    "not_greater_than": (later("must be greater than {bound}, is {value}"), ""),
    "below_least": (later("must be at least {bound}, is {value}"), ""),
    "not_a_choice": (later("must be {choices}, is {value}"), ""),
    "no_word_or_number": (later("must be a number or {choices}, is {value}"), ""),
    "no_reason": (later("a check is waived for a reason, and none is given"), later("enter the reason")),
    "empty_text": (later("must not be empty"), later("enter a name")),
    "too_few_segments": (later("a member has at least one segment, this has none"), later("add a segment")),
    "joint_count": (
        later("a chain has one joint more than segments, here are joints: {joints}, segments: {segments}"),
        later("add or take out joints"),
    ),
    "duplicate_mark": (later("{value} is taken already, at {first}"), later("choose another")),
    "unknown_reference": (later("there is no {kind} {value}"), later("add it or choose one that exists")),
    "inner_not_below_outer": (
        later("the inside diameter must be below the outside diameter at the {end}, is {inner} in {outer}"),
        later("make the inside smaller or the outside larger"),
    ),
    "duplicate_limit": (
        later("joint {joint} has such a limit already, at {first}"),
        later("keep one of them"),
    ),
    "same_joint": (later("both ends are joint {joint}"), later("choose two different joints")),
    "both_keys": (later("{key} and {other} cannot both stand here"), later("keep one of them")),
    "neither_key": (later("either {key} or {other} must stand here"), later("add one of them")),
    "no_companion_segments": (
        later("a companion has at least one segment, this has none"),
        later("add a segment"),
    ),
    "companion_order": (
        later("a companion runs along the axis, but joint {from} lies beyond joint {to}"),
        later("swap the two joints"),
    ),
    "same_combination": (
        later("both ends are the combination {combination}"),
        later("choose two different combinations"),
    ),
    "not_inside": (
        later("a split must lie inside the segment, which is {length} long; given is {value}"),
        later("choose a place between its ends"),
    ),
    "parts_differ": (
        later("segments that differ in {kind} cannot be joined"),
        later("make them alike first"),
    ),
    "joint_carries": (
        later("joint {joint} has a {kind}, which joining would lose"),
        later("take it out first"),
    ),
    "companion_full": (
        later("the other segments of companion {companion} alone are as long as its span"),
        later("make one of them shorter"),
    ),
    "repeats": (
        later("segments are repeated between 1 and {most} times at once; given is {count}"),
        later("choose a number in between"),
    ),
    "several_records": (
        later("{count} load records stand behind this cell"),
        later("edit them one by one in the Loads table"),
    ),
    "not_held": (
        later("nothing holds the member along its axis"),
        later("give a joint a fixed or a spring support, or a segment a bedding"),
    ),
    "not_pressed": (
        later("only stops could hold the member, and the loads do not press it against them"),
        later("give a joint a fixed or a spring support, or a stop on the side to which the loads push"),
    ),
    "movement_without_support": (
        later("joint {joint} is moved by {case} but has no support to move"),
        later("give it a support or take the movement out"),
    ),
    "companion_length": (
        later("companion {companion} is {length} long and spans {span}; it is {difference} {kind}"),
        later("make the lengths add up; a mismatch that is meant is a lack of fit"),
    ),
}

_TYPES: Final[Mapping[str, str]] = {
    "number": later("a number"), "float": later("a number"), "int": later("a whole number"),
    "text": later("a text"), "str": later("a text"), "list": later("a list"), "array": later("a list"),
    "object": later("a table of keys"), "table": later("a table of keys"), "bool": later("true or false"),
    "null": later("null"),
}  # fmt: skip
_KINDS: Final[Mapping[str, str]] = {
    "segment": later("segment"), "joint": later("joint"), "material": later("material"),
    "load case": later("load case"), "load_case": later("load case"),
    "start": later("start"), "end": later("end"), "section": later("section shape"),
    "bonded": later("bonded parts"),
    "support": later("support"), "load": later("load"), "limit": later("limit"),
    "shoulder": later("shoulder"),
    "combination": later("combination"), "companion": later("companion"),
    "too_long": later("too long"), "too_short": later("too short"),
    "lateral support": later("lateral support"),
}  # fmt: skip
JSON_SLIPS: Final[Mapping[str, str]] = {
    "empty": later("the file is empty"),
    "ends_early": later("the file ends before its last bracket is closed"),
    "trailing_comma": later("no comma may stand before a closing bracket"),
    "no_value": later("a value is missing or misspelt"),
    "no_key": later("a key in double quotes is missing"),
    "no_colon": later("a colon is missing after the key"),
    "no_comma": later("a comma or a closing bracket is missing"),
    "text_open": later("a text has no closing quotation mark"),
    "bad_escape": later("a backslash stands before a sign that it cannot go with"),
    "control_sign": later("a text holds a line break or a tab"),
    "goes_on": later("the file goes on after its last bracket"),
    "other": later("the rules of JSON are broken"),
}
_NEAREST: Final = later("did you mean {nearest}?")
_LONGEST: Final = 60


def fault_sentence(fault: Fault, system: UnitSystemName | None = None) -> str:
    """The sentence of one fault; with a system, in its units and the tables' words instead of the file's."""
    rule, remedy = FAULTS[fault.rule]
    if fault.facts.get("nearest") is not None:
        remedy = _NEAREST
    quantity = quantity_at(fault.place) if system else None
    facts = {name: _fact(name, value, quantity, system) for name, value in fault.facts.items()}
    if fault.rule == "not_finite":
        facts["value"] = _cut(str(fault.facts["value"]))  # a numeral as written, no text
    sentence = "; ".join(tr(part).format_map(facts) for part in (rule, remedy) if part)
    place = place_words(fault.place) if system else fault.place
    return f"{place}: {sentence}" if place else sentence


def _fact(name: str, value: object, quantity: Quantity | None, system: UnitSystemName | None) -> str:
    """One fact as text: our own terms in words, places and reasons bare, values as in the file."""
    if name in ("kind", "end") and isinstance(value, str):
        return tr(_KINDS.get(value, value))
    if name == "expected" and isinstance(value, str):
        return tr(_TYPES.get(value, value))
    if name == "found" and value is None:
        return tr("not given")
    if name == "choices" and isinstance(value, Sequence) and len(value) > 1:
        return tr("one of {choices}").format(choices=shown(value))
    if name == "first" and isinstance(value, str):
        return place_words(value) if system else value
    if name == "reason":
        return tr(JSON_SLIPS[str(value)])
    if name in ("line", "column", "joints", "segments", "known", "count"):
        return str(value)
    if system and quantity and isinstance(value, float | int) and not isinstance(value, bool):
        return _in_units(value, quantity, system)
    return shown(value)


def _in_units(value: float, quantity: Quantity, system: UnitSystemName) -> str:
    """A number as it would be typed, with its unit."""
    text = entry_text(float(value), quantity, system).replace("-", MINUS)
    return text if value == 0 else f"{text} {symbol(quantity, system)}".rstrip()


def shown(value: object) -> str:
    """A value of the file as it stands there, cut where it is long."""
    if isinstance(value, Mapping) or value in ("{…}", "{}"):
        return tr("a table of keys")
    if value in ("[…]", "[]"):
        return tr("a list")
    if isinstance(value, Sequence | frozenset | set) and not isinstance(value, str):
        return ", ".join(shown(part) for part in value) if _are_plain(value) else tr("a list")
    return _cut(_json(value))


def _cut(text: str) -> str:
    return text if len(text) <= _LONGEST else text[: _LONGEST - 1] + "…"


def _are_plain(values: Sequence[object] | frozenset[object] | set[object]) -> bool:
    """A short list of texts and numbers, worth naming one by one."""
    return 0 < len(values) <= 12 and all(isinstance(value, str | int | float) for value in values)


def _json(value: object) -> str:
    """As JSON; a whole number with thousands of digits is not spelled out."""
    if isinstance(value, int) and not isinstance(value, bool) and value.bit_length() > 200:
        return tr("a whole number of about {count} digits").format(
            count=int(value.bit_length() * 0.30103) + 1
        )
    try:
        return json.dumps(value, ensure_ascii=False)
    except (TypeError, ValueError):
        return str(value)
