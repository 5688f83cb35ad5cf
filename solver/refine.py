"""Which degree an element gets, and where the mesh is refined when the bound asks for it.

The degree is chosen beforehand from what limits the convergence. The slope of the displacement behaves like
1/A, whose poles lie beyond the segment's ends where the area's linear factors vanish; with ζ the ratio of
such a factor's values at the two ends, Legendre expansions converge like ρ⁻ᵖ, ρ = (1 + √ζ)/|1 − √ζ|
(Bernstein, 1912; from memory). Bedding adds cosh(z t) with z = μL/2, whose coefficients fall like
zᵖ/(2p − 1)!!. Usually one pass suffices; where it does not, the bound's own shares say where to raise the
degree or to halve.
"""

from __future__ import annotations

import numpy as np

from solver.arrays import BoolArray, FloatArray, IntArray
from solver.chain import Chain
from solver.elements import GREATEST_DEGREE, LEAST_DEGREE
from solver.mesh import Mesh, closed_segments
from solver.sections import part_of

DEGREES = np.arange(1, GREATEST_DEGREE + 1)
CLOSED_DEGREE = 3
SAFETY = 0.1  # part of the tolerance the first degree aims at
COARSEST = (
    1e-3  # tolerance aimed at where a larger one is asked: 1/A must stay smooth to the bound's quadrature
)
COMPLEX = 1e-12  # up to this part a negative square is rounding
STEP = 2  # by which a degree is raised
FEW = 256  # up to so many stacked elements share one degree: the calls cost more than the arithmetic
MOST_HALVINGS = 20_000
SHORTEST = 2.0**-40  # part of a segment below which no element is halved


def first_mesh(chain: Chain, tolerance: float) -> Mesh:
    """One element a segment, halved where no degree is expected to do; if that ends early the bound tells."""
    closed = closed_segments(chain)
    count = closed.size
    mesh = Mesh(
        segment=np.arange(count),
        start=np.zeros(count),
        end=np.ones(count),
        degree=np.full(count, CLOSED_DEGREE),
        closed=closed,
        whole=True,
    )
    if closed.all():
        return mesh
    wanted = wanted_degree(chain, mesh, tolerance)
    while (wanted > GREATEST_DEGREE).any() and mesh.segment.size - count <= MOST_HALVINGS:
        mesh = halved(mesh, wanted > GREATEST_DEGREE)
        wanted = wanted_degree(chain, mesh, tolerance)
    return with_degrees(mesh, np.minimum(wanted, GREATEST_DEGREE))


def wanted_degree(chain: Chain, mesh: Mesh, tolerance: float) -> IntArray:
    """(e,) the degree expected to meet the tolerance, or one more than the greatest where none does."""
    wanted = np.full(mesh.segment.size, CLOSED_DEGREE)
    opened = np.flatnonzero(~mesh.closed)
    segment, start, end = mesh.segment[opened], mesh.start[opened], mesh.end[opened]
    whole = chain.rigidity(segment)
    rigidity = whole if mesh.whole else part_of(whole, start, end)
    error = expected_error(pole_decay(rigidity), bedding_number(chain, segment, rigidity, end - start))
    met = error < SAFETY * min(tolerance, COARSEST)
    met[end - start <= SHORTEST, -1] = True  # as good as it gets
    degree = np.where(met.any(axis=1), np.maximum(met.argmax(axis=1) + 1, LEAST_DEGREE), GREATEST_DEGREE + 1)
    wanted[opened] = degree
    return wanted


def expected_error(decay: FloatArray, z: FloatArray) -> FloatArray:
    """(e, p) for the degrees 1…12, relative: the coefficients of pole and bedding multiplied as series."""
    error = decay[:, None] ** DEGREES
    if z.any():
        column, term = np.ones_like(decay), np.ones_like(z)
        for p in range(1, GREATEST_DEGREE + 1):
            term = term * z / (2 * p - 1)
            column = column * decay + term
            error[:, p - 1] = column
    return np.asarray(DEGREES * error)


def pole_decay(area: FloatArray) -> FloatArray:
    """(e,) 1/ρ of the nearer pole of 1/A, from Bernstein coefficients (e, 3); 0 where A is constant.

    A sum of bonded parts may have a pair of complex poles; a single part has none.
    """
    first, middle, last = area.T
    square = middle * middle - first * last
    if (square < -COMPLEX * middle * middle).any():
        root = np.sqrt(square + 0j)
    else:
        root = np.sqrt(np.maximum(square, 0.0))
    one, other = np.sqrt((middle + root) / last), np.sqrt(first / (middle + root))
    return np.asarray(np.maximum(np.abs((1 - one) / (1 + one)), np.abs((1 - other) / (1 + other))))


def bedding_number(chain: Chain, segment: IntArray, rigidity: FloatArray, part: FloatArray) -> FloatArray:
    """(e,) μL/2 with the segment's largest bedding and the element's least rigidity."""
    bedding = chain.bedding[segment].max(axis=1)
    return np.asarray(np.sqrt(bedding / rigidity.min(axis=1)) * chain.length[segment] * part / 2)


def with_degrees(mesh: Mesh, degree: IntArray) -> Mesh:
    """The mesh with these degrees, rounded up to few different ones."""
    opened = ~mesh.closed
    if np.count_nonzero(opened) <= FEW:
        rounded = np.where(opened, degree[opened].max(), CLOSED_DEGREE)
    else:
        rounded = np.where(opened, np.minimum(degree + degree % 2, GREATEST_DEGREE), CLOSED_DEGREE)
    return Mesh(mesh.segment, mesh.start, mesh.end, rounded, mesh.closed, mesh.whole)


def halved(mesh: Mesh, marked: BoolArray) -> Mesh:
    """The mesh with the marked elements (e,) halved."""
    copies = np.where(marked, 2, 1)
    middle = (mesh.start + mesh.end) / 2
    start, end = np.repeat(mesh.start, copies), np.repeat(mesh.end, copies)
    first = np.flatnonzero(marked) + np.arange(np.count_nonzero(marked))
    end[first] = middle[marked]
    start[first + 1] = middle[marked]
    return Mesh(
        segment=np.repeat(mesh.segment, copies),
        start=start,
        end=end,
        degree=np.repeat(mesh.degree, copies),
        closed=np.repeat(mesh.closed, copies),
        whole=False,
    )


def refined(mesh: Mesh, share: FloatArray, allowed: FloatArray) -> Mesh | None:
    """The next mesh, where an element's η² (m, e) is above its part of what is `allowed` (m,).

    None where no element is, and where halving went so far that more of it would only gather rounding.
    """
    marked = ((share > allowed[:, None] / mesh.segment.size).any(axis=0)) & ~mesh.closed
    halvings = mesh.segment.size - (mesh.segment[-1] + 1)
    if not marked.any() or halvings > MOST_HALVINGS:
        return None
    raised = np.where(marked, mesh.degree + STEP, mesh.degree)
    split = (raised > GREATEST_DEGREE) & (mesh.end - mesh.start > SHORTEST)
    degree = np.minimum(raised, GREATEST_DEGREE)
    grown = Mesh(mesh.segment, mesh.start, mesh.end, degree, mesh.closed, mesh.whole)
    return halved(grown, split) if split.any() else grown
