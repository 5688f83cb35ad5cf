"""A cross-section as typed text: ⌀40, a taper ⌀75→⌀52, a tube ⌀60×5 (outside × wall), ▭20×30, or A 1200,
behind which its second moment may stand (`app.second_moment_entry`): A 1200 I 4.5e4.

    section := end [→ end]      end := [shape] dimension [(× | bore) dimension]      (dimension: `app.entry`)

On a plain keyboard: d40, r20x30, 75->52. One unit at the end counts for every dimension. A bare number is an
area where the section was one, else a diameter. Two without a shape are a rectangle where the section was
one, else a tube, as the trade writes them; `taken_as` says which, so that no guess goes unsaid. A wall
becomes the inside diameter exactly, before anything is rounded; where that makes a long number of the wall,
the bore is written instead.
"""

from __future__ import annotations

import re
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from fractions import Fraction
from typing import Final, Literal, TypeAlias

from msgspec import UNSET, UnsetType, structs

from app.entry import MOST_CHARACTERS, factor_of, nearest_double, read_number, refusal
from app.numerals import localised, shortest_decimal
from app.second_moment_entry import ARROW, area_words, cleared, with_second_moments, without_second_moments
from app.units import Quantity, decimal_text, entry_text, format_value, input_text, rounds_to, unit
from app.words import tr
from solver.model import (
    AnySection,
    AreaSection,
    RectangleSection,
    RoundSection,
    TubeSection,
    UnitSystemName,
    end_of,
)

_Shape: TypeAlias = Literal["round", "tube", "rectangle", "area", ""]
_Sizes: TypeAlias = tuple[float, ...]
_Wording: TypeAlias = Callable[[float, Quantity], str]

_SHAPES: Final[dict[str, _Shape]] = {
    **dict.fromkeys("⌀øØ∅dD", "round"), **dict.fromkeys("▭rR", "rectangle"), **dict.fromkeys("aA", "area"),
}  # fmt: skip
_COUNTS: Final[dict[_Shape, tuple[int, str]]] = {
    "round": (1, "d40"), "tube": (2, "d60x5"), "rectangle": (2, "r20x30"), "area": (1, "A 1200"),
}  # fmt: skip
_SECOND: Final = re.compile(r"[×xX]|\bbore\b")
_NUMBER_START: Final = re.compile(r"\s*[0-9.,(+−-]")
_LONGEST_WALL: Final = 7


@dataclass(frozen=True, slots=True)
class _End:
    """One end as typed: the shape that is marked (or not), whether a bore is given, the dimensions' texts."""

    shape: _Shape
    bore: bool
    dimensions: tuple[str, ...]


def parse_section(text: str, system: UnitSystemName, previous: AnySection | None = None) -> AnySection:
    """The section a text names, in SI; raises EntryError.

    `previous` is the section the text replaces: it settles what bare numbers are, keeps second moments where
    a bare number is an area, and is returned as it is where the text is still its own.
    """
    if previous is not None and text.strip() == section_text(previous, system):
        return previous
    alone, moments = without_second_moments(text.strip())
    section = _parsed(alone, system, previous)
    if not moments and alone[:1] in "aA":
        section = cleared(section)
    return with_second_moments(section, moments, system)


def _parsed(text: str, system: UnitSystemName, previous: AnySection | None) -> AnySection:
    """The section without what is said of its second moment."""
    ends = _read_ends(text)
    shape = _shape_of(ends, previous)
    if _is_bare_pair(ends) and shape == "tube":
        _refuse_bare_flat(ends, _sizes(ends, "size", system))
    for end in ends:
        _refuse_wrong_count(end, shape)
    sizes = _sizes(ends, "area" if shape == "area" else "size", system)
    return _BUILDERS[shape](
        tuple(_checked(end, shape, sizes) for end, sizes in zip(ends, sizes, strict=True)), previous
    )


def _read_ends(text: str) -> list[_End]:
    if not text:
        raise refusal("empty", example="d40")
    if len(text) > MOST_CHARACTERS:
        raise refusal("too_long", length=len(text), most=MOST_CHARACTERS)
    parts = ARROW.split(text)
    if len(parts) > 2:
        raise refusal("section_unknown", found=text[:30])
    return [_read_end(part.strip()) for part in parts]


def _read_end(text: str) -> _End:
    shape = _SHAPES.get(text[:1], "")
    rest = _in_english(text[1:] if shape else text)
    if not _NUMBER_START.match(rest):
        raise refusal("section_unknown", found=text[:30])
    return _End(shape, "bore" in rest, tuple(part.strip() for part in _SECOND.split(rest)))


def _in_english(text: str) -> str:
    """The text with the word for a bore as the file has it; it is understood in the user's language too."""
    ours = rf"\b{re.escape(tr('bore'))}\b"
    return re.sub(ours, "bore", text, flags=re.IGNORECASE)


def _shape_of(ends: Sequence[_End], previous: AnySection | None) -> _Shape:
    """The one shape of both ends; the second need not repeat the first."""
    marked = {end.shape for end in ends if end.shape}
    if len(marked) > 1:
        raise refusal("section_change", found=" × ".join(ends[-1].dimensions)[:30])
    pair = len(ends[0].dimensions) > 1
    if marked:
        shape = marked.pop()
        return "tube" if pair and shape == "round" else shape
    if pair:
        return _bare_pair(ends[0], previous)
    return "area" if isinstance(previous, AreaSection) else "round"


def _bare_pair(end: _End, previous: AnySection | None) -> _Shape:
    """What two dimensions without a shape are."""
    return "rectangle" if isinstance(previous, RectangleSection) and not end.bore else "tube"


def _is_bare_pair(ends: Sequence[_End]) -> bool:
    """Whether two dimensions are given without a word or sign of what they are."""
    return len(ends[0].dimensions) == 2 and not any(end.shape or end.bore for end in ends)


def _refuse_bare_flat(ends: Sequence[_End], sizes: Sequence[Sequence[Fraction]]) -> None:
    """A bare "20x30" can be no tube: say how a rectangle is typed instead."""
    for end, dimensions in zip(ends, sizes, strict=True):
        if len(dimensions) == 2 and dimensions[0] < 2 * dimensions[1]:
            raise refusal("section_flat", found="x".join(end.dimensions)[:30])


def taken_as(text: str, previous: AnySection | None) -> Literal["tube", "rectangle", ""]:
    """What a valid text with a bare pair, such as 60x5, was taken as; empty where it needed no guess."""
    if not _is_bare_pair(_read_ends(without_second_moments(text.strip())[0])):
        return ""
    return "rectangle" if isinstance(previous, RectangleSection) else "tube"


def _refuse_wrong_count(end: _End, shape: _Shape) -> None:
    wanted, example = _COUNTS[shape]
    if len(end.dimensions) != wanted or (end.bore and shape != "tube"):
        raise refusal(
            "section_dimensions", found=" × ".join(end.dimensions)[:30], wanted=wanted, example=example
        )


def _sizes(ends: Sequence[_End], quantity: Quantity, system: UnitSystemName) -> list[list[Fraction]]:
    """The dimensions of each end in SI, exact; one unit at the very end counts for all."""
    numbers = [[read_number(text, quantity, system) for text in end.dimensions] for end in ends]
    units = [text for end in numbers for _, text in end]
    if any(units[:-1]) and not all(units):
        raise refusal("section_units")
    common = factor_of(units[-1], quantity, system) if units[-1] else unit(quantity, system).factor
    return [
        [number * (factor_of(text, quantity, system) if text else common) for number, text in end]
        for end in numbers
    ]


def _checked(end: _End, shape: _Shape, sizes: Sequence[Fraction]) -> _Sizes:
    """The dimensions of one end rounded to doubles, a tube's wall turned into its inside diameter."""
    first, *others = sizes
    if first <= 0 or any(size < 0 or (size == 0 and not end.bore) for size in others):
        raise refusal("size_not_positive")
    if shape != "tube":
        return tuple(map(nearest_double, sizes))
    inner = others[0] if end.bore else first - 2 * others[0]
    if inner < 0:
        raise refusal("wall_too_thick")
    outer, inner_size = nearest_double(first), nearest_double(inner)
    if inner_size >= outer:
        raise refusal("bore_too_wide")
    return outer, inner_size


def _end(ends: Sequence[_Sizes], index: int) -> float | UnsetType:
    """A dimension at the end, absent where only one end is given."""
    return ends[1][index] if len(ends) > 1 else UNSET


def _round(ends: Sequence[_Sizes], _previous: AnySection | None) -> RoundSection:
    return RoundSection(diameter=ends[0][0], diameter_end=_end(ends, 0))


def _tube(ends: Sequence[_Sizes], _previous: AnySection | None) -> TubeSection:
    (outer, inner), outer_end, inner_end = ends[0], _end(ends, 0), _end(ends, 1)
    return TubeSection(outer=outer, outer_end=outer_end, inner=inner, inner_end=inner_end)


def _rectangle(ends: Sequence[_Sizes], _previous: AnySection | None) -> RectangleSection:
    (width, depth), width_end, depth_end = ends[0], _end(ends, 0), _end(ends, 1)
    return RectangleSection(width=width, width_end=width_end, depth=depth, depth_end=depth_end)


def _area(ends: Sequence[_Sizes], previous: AnySection | None) -> AreaSection:
    """The second moments of an area stay until the text speaks of them."""
    area, area_end = ends[0][0], _end(ends, 0)
    if isinstance(previous, AreaSection):
        return structs.replace(previous, area=area, area_end=area_end)
    return AreaSection(area=area, area_end=area_end)


_Builder: TypeAlias = Callable[[Sequence[_Sizes], AnySection | None], AnySection]
_BUILDERS: Final[dict[_Shape, _Builder]] = {
    "round": _round,
    "tube": _tube,
    "rectangle": _rectangle,
    "area": _area,
}


def section_text(section: AnySection, system: UnitSystemName) -> str:
    """The text that `parse_section` reads back to the same numbers, to the last digit."""

    def number(value: float, quantity: Quantity) -> str:
        return entry_text(value, quantity, system)

    def second(outer: float, inner: float) -> str:
        wall = wall_text(outer, inner, system)
        return f"×{wall}" if 0 < len(wall) <= _LONGEST_WALL else f" {tr('bore')} {number(inner, 'size')}"

    return _worded(section, number, second)


def section_label(section: AnySection, system: UnitSystemName) -> str:
    """The same for reading, on drawings and sheets: long numbers rounded."""

    def number(value: float, quantity: Quantity) -> str:
        return input_text(value, quantity, system)

    def second(outer: float, inner: float) -> str:
        wall = wall_text(outer, inner, system)
        rounded = format_value((outer - inner) / 2, "size", system, strip=True)
        return f"×{wall if 0 < len(wall) <= _LONGEST_WALL else rounded}"

    return _worded(section, number, second)


def _worded(section: AnySection, number: _Wording, second: Callable[[float, float], str]) -> str:
    """The section as text, start and end where a dimension of the end is given."""
    if isinstance(section, AreaSection):
        return area_words(section, number)

    def written(sizes: _Sizes) -> str:
        first = number(sizes[0], "size")
        if isinstance(section, RectangleSection):
            return f"▭{first}×{number(sizes[1], 'size')}"
        return f"⌀{first}" if len(sizes) == 1 else f"⌀{first}{second(sizes[0], sizes[1])}"

    return "→".join(map(written, _ends(section)))


def _ends(section: RoundSection | TubeSection | RectangleSection) -> list[_Sizes]:
    """The dimensions at the start, and at the end where the section names one of them there."""
    match section:
        case RoundSection(diameter=diameter, diameter_end=diameter_end):
            pairs = [(diameter, diameter_end)]
        case TubeSection(outer=outer, outer_end=outer_end, inner=inner, inner_end=inner_end):
            pairs = [(outer, outer_end), (inner, inner_end)]
        case RectangleSection(width=width, width_end=width_end, depth=depth, depth_end=depth_end):
            pairs = [(width, width_end), (depth, depth_end)]
    start = tuple(start for start, _ in pairs)
    varies = any(not isinstance(end, UnsetType) for _, end in pairs)
    return [start, tuple(end_of(*pair) for pair in pairs)] if varies else [start]


def wall_text(outer: float, inner: float, system: UnitSystemName) -> str:
    """The shortest wall that with the outside diameter as typed gives this inside diameter.

    Empty where no decimal of a reasonable length does, as for a bore of a thousandth of a millimetre.
    """
    factor = unit("size", system).factor
    typed = Fraction(decimal_text(outer, "size", system)) * factor
    wall = (typed - Fraction(inner)) / 2 / factor
    try:
        text = shortest_decimal(wall, lambda decimal: rounds_to(typed - 2 * decimal * factor, inner))
    except ValueError:
        return ""
    return localised(text)
