"""The joints' matrix where companions make loops: sparse, factored with an order that keeps it so.

Tied nodes share one unknown, held ones have none. The matrix is that of a network of springs, so that no
pivoting is needed; a minimum degree order keeps the cost near linear for chains beside chains, however they
overlap.
"""

from __future__ import annotations

import numpy as np
from scipy.sparse import coo_matrix
from scipy.sparse.linalg import SuperLU, splu

from solver.arrays import FloatArray, IntArray
from solver.condense import Condensed
from solver.net import Net


class NotPositive(Exception):  # noqa: N818 - a finding: no digit is left
    """The matrix is singular to all digits."""


class SparseSystem:
    """Factored once; solves for forces at the nodes."""

    def __init__(
        self, ends: Condensed, net: Net, fixed: IntArray, sprung: IntArray, spring: FloatArray
    ) -> None:
        self._net = net
        self._free = np.setdiff1d(np.arange(net.count), np.append(fixed, net.tied))
        self._unknown = np.full(net.count, -1, dtype=np.intp)
        self._unknown[self._free] = np.arange(self._free.size)
        self._unknown[net.tied] = self._unknown[net.to]
        if self._free.size:
            self._factor = self._factored(ends, sprung, spring)

    def _factored(self, ends: Condensed, sprung: IntArray, spring: FloatArray) -> SuperLU:
        start, end = self._unknown[self._net.start], self._unknown[self._net.end]
        quarter = ends.mean_mean / 4
        own, beside = quarter + ends.stretch_stretch, quarter - ends.stretch_stretch
        row = np.concatenate([start, end, start, end, self._unknown[sprung]])
        column = np.concatenate([start, end, end, start, self._unknown[sprung]])
        value = np.concatenate([own - ends.mean_stretch, own + ends.mean_stretch, beside, beside, spring])
        used = (row >= 0) & (column >= 0)
        matrix = coo_matrix((value[used], (row[used], column[used])), shape=(self._free.size,) * 2).tocsc()
        options = {"SymmetricMode": True}
        try:
            factor = splu(matrix, permc_spec="MMD_AT_PLUS_A", diag_pivot_thresh=0.0, options=options)
        except RuntimeError as singular:
            raise NotPositive from singular
        if not (factor.U.diagonal() > 0.0).all():
            raise NotPositive
        return factor

    def solve(self, right: FloatArray) -> FloatArray:
        """(r, count) displacements under the forces `right` (r, count); 0 at held nodes."""
        forces = right.copy()
        self._net.hand_on(forces)
        found = np.zeros((right.shape[0], self._free.size + 1))  # the last for what is held
        if self._free.size:
            found[:, :-1] = self._factor.solve(np.ascontiguousarray(forces[:, self._free].T)).T
        return found[:, self._unknown]
