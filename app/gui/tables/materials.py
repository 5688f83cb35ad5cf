"""The materials table, and the modulus typed into a segment's row."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from msgspec import UNSET, UnsetType
from msgspec.structs import replace

from app import edits
from app.beside import beside
from app.edits.bonded import uses_of_material
from app.entry import parse_entry
from app.gui.tables import offers
from app.gui.tables.column import Adding, Change, Column, Sight, Table
from app.gui.tables.fatigue import ENDURED_AMPLITUDE, ENDURED_ULTIMATE
from app.gui.tables.reasons import NotTaken
from app.typical_materials import typical_named, with_typical
from app.units import Quantity, entry_text, format_value
from app.words import later, tr
from solver.model import Material, Project


def with_modulus(project: Project, index: int, modulus: float) -> Change:
    """The segment's modulus; where others share its material, the segment gets a copy of its own."""
    segment = project.segments[index]
    place = next((i for i, m in enumerate(project.materials) if m.name == segment.material), None)
    if place is None:
        raise NotTaken(tr("name a material from the Materials table first"))
    if project.materials[place].modulus == modulus:
        return Change(project)
    others = sum(of.segment.material == segment.material for of in beside(project))
    if uses_of_material(project, segment.material) + others == 1:
        note = tr("Modulus of material {name} changed").format(name=segment.material)
        return Change(edits.set_value(project, ("materials", place, "modulus"), modulus), note)
    name = free_name(f"{segment.material} {segment.mark}", {m.name for m in project.materials})
    own = replace(project.materials[place], name=name, modulus=modulus)
    with_own = edits.add_record(project, ("materials",), own)
    note = tr("{mark} now has a material of its own, {name}")
    if has_allowables(own):
        note = tr(
            "{mark} now has a material of its own, {name}; its allowable stresses are "
            "those of {material}: verify"
        )
    note = note.format(mark=segment.mark, name=name, material=segment.material)
    return Change(edits.set_value(with_own, ("segments", index, "material"), name), note)


def has_allowables(material: Material) -> bool:
    """Whether an allowable stress is given for it."""
    own = (
        material.allowable_tension,
        material.allowable_compression,
        material.allowable_peak,
        material.endurance,
    )
    return any(one is not UNSET for one in own)


def free_name(wished: str, taken: set[str]) -> str:
    """The wished name, with a number behind it where it is taken."""
    name, count = wished, 2
    while name in taken:
        name, count = f"{wished} {count}", count + 1
    return name


def _number(
    key: str,
    title: str,
    quantity: Quantity,
    *,
    optional: bool = True,
    width: int = 10,
    at_first: bool = True,
) -> Column:
    """A column for one number of a material; one not shown at first is shown where it holds something."""

    def value(row: Material) -> float | UnsetType:
        return getattr(row, key)  # type: ignore[no-any-return]

    def show(row: Material, sight: Sight) -> str:
        number = value(row)
        return (
            "" if isinstance(number, UnsetType) else format_value(number, quantity, sight.system, strip=True)
        )

    def entry(row: Material, sight: Sight) -> str:
        number = value(row)
        return "" if isinstance(number, UnsetType) else entry_text(number, quantity, sight.system)

    def put(project: Project, index: int, text: str, sight: Sight) -> Change:
        empty = optional and not text.strip()
        number = UNSET if empty else parse_entry(text, quantity, sight.system)
        return Change(edits.set_value(project, ("materials", index, key), number))

    def filled(project: Project) -> bool:
        return any(value(material) is not UNSET for material in project.materials)

    return Column(
        key,
        title,
        show,
        entry,
        put,
        quantity=quantity,
        optional=optional,
        width=width,
        at_first=at_first,
        filled=None if at_first else filled,
    )


def put_name(records: str) -> Callable[[Project, int, str, Sight], Change]:
    """Renames a record of that list and every reference to it."""
    return lambda project, index, text, _sight: Change(
        edits.set_value(project, (records, index, "name"), text.strip())
    )


def name_of(row: Any, _sight: Sight) -> str:
    """A record's name."""
    name: str = row.name
    return name


def _add(project: Project, text: str, _sight: Sight) -> Change:
    """A typical material by its name, else one whose modulus is the last one's, to be typed over."""
    typical = typical_named(text)
    if typical is not None:
        return _add_typical(project, text, typical)
    modulus = project.materials[-1].modulus if project.materials else 210e9
    made = Material(text.strip(), modulus)
    note = tr(
        "{name} starts with the modulus of the material above it and expansion and density 0: type its own"
    )
    return Change(edits.add_record(project, ("materials",), made), note.format(name=made.name))


def _add_typical(project: Project, text: str, typical: Material) -> Change:
    """A name that is taken, as it was typed or as it is listed, is refused like any other."""
    taken = {own.name for own in project.materials}
    for name in (text.strip(), typical.name):
        if name in taken:
            return Change(edits.add_record(project, ("materials",), replace(typical, name=name)))
    return Change(*with_typical(project, typical), stands=True)


def _delete(project: Project, indexes: tuple[int, ...], _sight: Sight) -> Project:
    """The project without these materials; NotTaken where a segment is made of one."""
    names = {project.materials[index].name for index in indexes}
    for segment in (*project.segments, *(of.segment for of in beside(project))):
        if segment.material in names:
            used = tr("{mark} is made of {name}: give it another material first")
            raise NotTaken(used.format(mark=segment.mark, name=segment.material))
    for segment in project.segments:
        for part in segment.bonded:
            if part.material in names:
                used = tr("{mark} has a bonded part of {name}: take it out or give it another material first")
                raise NotTaken(used.format(mark=segment.mark, name=part.material))
    return edits.remove_records(project, ("materials",), indexes)


COLUMNS = (
    Column("name", later("Name"), name_of, name_of, put_name("materials"), width=16),
    _number("modulus", later("Modulus"), "modulus", optional=False),
    _number("expansion", later("Thermal expansion"), "expansion"),
    _number("density", later("Density"), "density"),
    _number("allowable_tension", later("Allowable in tension"), "stress", width=14),
    _number("allowable_compression", later("Allowable in compression"), "stress", width=14),
    _number("allowable_peak", later("Allowable peak stress"), "stress", width=14, at_first=False),
    ENDURED_AMPLITUDE,
    ENDURED_ULTIMATE,
)

MATERIALS = Table(
    key="materials",
    title=later("Materials"),
    rows=lambda project, _sight: tuple(project.materials),
    columns=lambda _project, _sight: COLUMNS,
    row_name=lambda project, index, _sight: project.materials[index].name,
    records=lambda _sight: ("materials",),
    adding=Adding(
        later("type a name to add a material"), _add, later("Add material"), "name", offers.new_materials
    ),
    delete=_delete,
    delete_name=later("Delete materials"),
)
