"""Generic materials to start from, with typical values: never an allowable stress, which is the user's own.

A grade, a casting or a delivery differs from what is typical, so these are marked "typical, verify" wherever
they are shown, and none gets into a project unasked. The names are in the user's language.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Final

from app import edits
from app.words import later, tr
from solver.model import Material, Project


@dataclass(frozen=True, slots=True)
class Typical:
    """A generic material: modulus in Pa, expansion in 1/K, density in kg/m³."""

    name: str
    modulus: float
    expansion: float
    density: float


# EN clauses and all values are from memory, to be verified like any typical value; "handbooks" means a round
# figure within what common handbooks give, without a source of its own.
TYPICAL: Final = (
    Typical(later("Steel"), 210e9, 12e-6, 7850.0),  # structural steel, EN 1993-1-1:2005, 3.2.6
    Typical(later("Stainless steel"), 200e9, 16e-6, 7900.0),  # austenitic; handbooks, from memory
    Typical(later("Aluminium alloy"), 70e9, 23e-6, 2700.0),  # EN 1999-1-1:2007, 3.2.5
    Typical(later("Tin bronze"), 110e9, 18e-6, 8800.0),  # handbooks, from memory
    Typical(later("Brass"), 100e9, 20e-6, 8400.0),  # handbooks, from memory
    Typical(later("Copper"), 120e9, 17e-6, 8900.0),  # handbooks, from memory
    # Grey iron softens with the stress; this is a middling grade at low stress. Handbooks, from memory.
    Typical(later("Grey cast iron"), 110e9, 11e-6, 7200.0),
    Typical(later("Ductile cast iron"), 170e9, 12e-6, 7100.0),  # handbooks, from memory
    Typical(later("Titanium"), 105e9, 8.6e-6, 4500.0),  # commercially pure; handbooks, from memory
    # Mean short-time modulus of C30/37 (EN 1992-1-1:2004, table 3.1), unreinforced; creep would lower it.
    Typical(later("Concrete, normal weight"), 33e9, 10e-6, 2400.0),
    # Mean modulus and mean density of C24 (EN 338); expansion from handbooks, from memory.
    Typical(later("Softwood, parallel to grain"), 11e9, 5e-6, 420.0),
)


def typical_materials() -> tuple[Material, ...]:
    """All of them as records, named in the user's language, without allowable stresses."""
    return tuple(Material(tr(one.name), one.modulus, one.expansion, one.density) for one in TYPICAL)


def not_in(project: Project) -> tuple[Material, ...]:
    """Those whose names the project does not have yet."""
    taken = {material.name for material in project.materials}
    return tuple(material for material in typical_materials() if material.name not in taken)


def typical_named(text: str) -> Material | None:
    """The one of that name in small or capital letters; None where there is none."""
    wanted = text.strip().casefold()
    return next((found for found in typical_materials() if found.name.casefold() == wanted), None)


def with_typical(project: Project, material: Material) -> tuple[Project, str]:
    """The project with one of these added, and the line that says so; as it is where it has that name."""
    if material not in not_in(project):
        return project, ""
    note = tr("{name} added with typical values, verify; it has no allowable stresses yet")
    return edits.add_record(project, ("materials",), material), note.format(name=material.name)
