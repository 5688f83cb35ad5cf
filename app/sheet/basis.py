"""The basis of the calculation: method, signs, what is assumed, and the formulas, each once."""

from __future__ import annotations

from collections.abc import Iterator

from app.beside import beside
from app.sheet.blocks import Block, Value, bullets, formula, formulas, heading, paragraph
from app.sheet.bonded import bonded_formulas, is_bonded
from app.sheet.contacts import stop_assumptions
from app.words import tr
from solver.model import (
    AnySection,
    AreaSection,
    Project,
    RectangleSection,
    RoundSection,
    TubeSection,
    end_of,
    parts_of,
)


def basis_blocks(project: Project) -> Iterator[Block]:
    """The chapter on the basis."""
    yield heading(tr("Basis"))
    yield paragraph(
        tr(
            "A chain of segments in series under axial load: linear elastic, small displacements, plane"
            " sections. Finite elements of rising degree on every segment, refined until the guaranteed bound"
            " on the numerical error (Prager and Synge 1947, equilibrated forces) is met. The axial force"
            " given is the equilibrated one; stress is force over area, on both sides of a joint."
        )
    )
    yield paragraph(
        tr(
            "Signs: x runs along the chain from the first joint. Displacement u, force P, distributed load q,"
            " movement δ and gravity g are positive along +x; axial force N and stress σ are positive (+) in"
            " tension, negative (−) in compression; ΔT is the rise above the stress-free state; lack of fit λ"
            " is positive for a part made too long; a reaction R is the force of the support on the member."
            " E modulus, A area, L length, α expansion, ρ density, k stiffness of a spring or of the bedding"
            " per length, f the factor on allowable stresses, η utilisation."
        )
    )
    yield formulas(list(_formulas(project)))
    yield bullets(_assumptions(project))


def _formulas(project: Project) -> Iterator[dict[str, Value]]:
    yield formula(tr("axial force"), "force", tr("N equals E A times u′ minus α ΔT minus λ over L"))
    yield formula(tr("equilibrium in a segment"), "equilibrium", tr("minus N′ plus k u equals q plus ρ g A"))
    yield formula(tr("at a joint"), "joint", tr("N right of it minus N left of it plus P plus R equals 0"))
    yield formula(
        tr("spring, or fixed"),
        "spring",
        tr("R equals minus k times u minus δ, or u equals δ where it is fixed"),
    )
    shapes = {type(section) for section in _sections(project)}
    for shape, label, name, alt in (
        (RoundSection, tr("area, round"), "round", tr("A equals π over 4 times d squared")),
        (TubeSection, tr("area, tube"), "tube", tr("A equals π over 4 times D squared minus d squared")),
        (RectangleSection, tr("area, rectangle"), "rectangle", tr("A equals b times h")),
    ):
        if shape in shapes:
            yield formula(label, name, alt)
    yield formula(tr("stress"), "stress", tr("σ equals N over A"))
    if is_bonded(project):
        yield from bonded_formulas()
    yield formula(
        tr("utilisation in tension"), "tension", tr("η equals σ over f times the allowable stress in tension")
    )
    yield formula(
        tr("utilisation in compression"),
        "compression",
        tr("η equals minus σ over f times the allowable stress in compression"),
    )
    yield formula(
        tr("utilisation of a limit"), "limit", tr("η equals the magnitude of the value over its limit")
    )
    yield from _companion_formulas(project)
    yield from _notch_formulas(project)


def _sections(project: Project) -> Iterator[AnySection]:
    """Those of the member and of its companions."""
    yield from (part.section for segment in project.segments for part in parts_of(segment))
    yield from (of.segment.section for of in beside(project))


def _drawn(project: Project) -> Iterator[AnySection]:
    """Those that the drawing shows by themselves."""
    yield from (segment.section for segment in project.segments)
    yield from (of.segment.section for of in beside(project))


def _companion_formulas(project: Project) -> Iterator[dict[str, Value]]:
    """At the joints that companions are tied to, and where they can part, as far as there are such."""
    if project.companions:
        yield formula(
            tr("joint with companions"),
            "companion_joint",
            tr(
                "N right minus N left, plus N of companions from it, minus N of those to it, plus P plus R"
                " is 0"
            ),
        )
    actions = {companion.action for companion in project.companions}
    if "compression" in actions:
        yield formula(
            tr("acts in compression only"),
            "companion_compression",
            tr("N is at most 0, the gap g at least 0, and N times g equals 0"),
        )
    if "tension" in actions:
        yield formula(
            tr("acts in tension only"),
            "companion_tension",
            tr("N is at least 0, the gap g at least 0, and N times g equals 0"),
        )


def _notch_words(project: Project) -> str:
    if any(joint.shoulder for joint in project.joints):
        return tr(
            "Stress is the mean over the section, at the shoulders entered also its peak Kt σ: no other notch"
            " effect, no bending, no residual stress."
        )
    return tr("Stress is the mean over the section: no notch effect, no bending, no residual stress.")


def _notch_formulas(project: Project) -> Iterator[dict[str, Value]]:
    """What is needed for shoulders and fatigue, where there are any."""
    shoulders = [joint.shoulder for joint in project.joints if joint.shoulder]
    if any(shoulder.fillet_radius for shoulder in shoulders):
        yield formula(
            tr("factor of a fillet"),
            "factor",
            tr("Kt equals C1 plus C2 times 2h over D plus C3 times its square plus C4 times its cube"),
        )
    if shoulders:
        yield formula(
            tr("peak stress"),
            "peak",
            tr("peak σ equals Kt times σ; η equals its size over f times its allowable"),
        )
    if project.fatigue:
        yield formula(
            tr("fatigue"),
            "fatigue",
            tr("η equals the amplitude over Sa plus the tensile mean over Su, both with Kt"),
        )


def _assumptions(project: Project) -> list[str]:
    items = [
        tr("Within a segment every dimension of the section varies linearly, and so do q, ΔT and bedding."),
        tr("A combination scales loads, temperatures, lack of fit, movements and gravity alike."),
        _notch_words(project),
        tr("A check passes at a utilisation up to 1."),
    ]
    if any(s.bedding or end_of(s.bedding, s.bedding_end) for s in project.segments):
        items.append(
            tr(
                "Bedding k resists along the segment in proportion to u; it pushes and pulls and has no slip"
                " limit: compare it with what the ground can carry."
            )
        )
    items += stop_assumptions(project)
    if is_bonded(project):
        items.append(
            tr(
                "Bonded parts share the strain of their segment along its whole length: no slip, no creep, no"
                " cracking, and nothing bends. ΔT and lack of fit act on all of them, each with its own"
                " expansion; the strain energy holds what they store against each other. The stress of a"
                " segment in strips and tables is that of its own part, its utilisation the largest of all."
            )
        )
    if project.companions:
        items.append(
            tr(
                "A companion moves with the member at the two joints that it lies between, nowhere else:"
                " there is no friction between them and no clearance, except where one that acts one way only"
                " has parted from its far joint."
            )
        )
    if any(isinstance(section, AreaSection) for section in _drawn(project)):
        items.append(tr("Where only an area is given, the drawing shows the round bar of that area."))
    return items
