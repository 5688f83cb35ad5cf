"""The basis of the calculation: method, signs, what is assumed, and the formulas, each once."""

from __future__ import annotations

from collections.abc import Iterator

from app.sheet.blocks import Block, bullets, formula, heading, paragraph
from app.words import tr
from solver.model import AreaSection, Project, RectangleSection, RoundSection, TubeSection, end_of


def basis_blocks(project: Project) -> Iterator[Block]:
    """The chapter on the basis."""
    yield heading(tr("Basis"))
    yield paragraph(
        tr(
            "A chain of segments in series under axial load, linear elastic, small displacements, plane sections."
            " Finite elements of rising degree on every segment, refined until the guaranteed bound on the"
            " numerical error (Prager and Synge 1947, equilibrated forces) is met. The axial force given is the"
            " equilibrated one; stress is force over area, both sides of a joint."
        )
    )
    yield paragraph(
        tr(
            "Signs: x runs along the chain from the first joint. Displacement u, forces, loads, movements and"
            " gravity are positive along +x; axial force N and stress σ are positive (+) in tension, negative (−)"
            " in compression; a temperature is the rise above the stress-free state; lack of fit λ is positive for"
            " a part made too long; a reaction R is the force of the support on the member."
        )
    )
    yield from _formulas(project)
    yield bullets(_assumptions(project))


def _formulas(project: Project) -> Iterator[Block]:
    yield formula("force", tr("N equals E A times u′ minus α ΔT minus λ over L"))
    yield formula("equilibrium", tr("minus N′ plus k u equals q plus ρ g A"))
    yield formula("joint", tr("N right of a joint minus N left of it plus P plus R equals 0"))
    yield formula("spring", tr("spring: R equals minus k times u minus δ; fixed: u equals δ"))
    yield formula("stress", tr("σ equals N over A"))
    yield formula("tension", tr("utilisation in tension equals σ over f times the allowable stress in tension"))
    yield formula(
        "compression", tr("utilisation in compression equals minus σ over f times the allowable in compression")
    )
    shapes = {type(segment.section) for segment in project.segments}
    for shape, name, alt in (
        (RoundSection, "round", tr("round: A equals π d squared over 4")),
        (TubeSection, "tube", tr("tube: A equals π over 4 times D squared minus d squared")),
        (RectangleSection, "rectangle", tr("rectangle: A equals b times h")),
    ):
        if shape in shapes:
            yield formula(name, alt)


def _assumptions(project: Project) -> list[str]:
    items = [
        tr("Within a segment every dimension of the section varies linearly, and so do q, ΔT and bedding."),
        tr("A combination scales loads, temperatures, lack of fit, movements and gravity alike."),
        tr("Stress is the mean over the section: no notch effect, no bending, no residual stress."),
        tr("A check passes at a utilisation up to 1."),
    ]
    if any(s.bedding or end_of(s.bedding, s.bedding_end) for s in project.segments):
        items.append(
            tr(
                "Bedding k resists along the segment in proportion to u; it pushes and pulls and has no slip limit:"
                " compare it with what the ground can carry."
            )
        )
    if any(isinstance(s.section, AreaSection) for s in project.segments):
        items.append(tr("Where only an area is given, the drawing shows the round bar of that area."))
    return items
