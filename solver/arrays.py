"""Names for the arrays that travel between the rooms, and the freezing of them."""

from __future__ import annotations

from typing import TypeAlias

import numpy as np
from numpy.typing import NDArray

FloatArray: TypeAlias = NDArray[np.float64]
IntArray: TypeAlias = NDArray[np.intp]
BoolArray: TypeAlias = NDArray[np.bool_]


def frozen(array: FloatArray) -> FloatArray:
    """The same array, made read-only, so that a result can be shared between threads."""
    array.setflags(write=False)
    return array
