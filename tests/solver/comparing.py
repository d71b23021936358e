"""Arrays held against each other by the largest value of what is expected (element by element would punish round-
off near zero).
"""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike


def assert_close(
    found: ArrayLike, expected: ArrayLike, share: float, what: str = "", scale: float | None = None
) -> None:
    """Fail unless every value is within `share` of the largest expected one (or of `scale`)."""
    a, b = np.asarray(found, dtype=float), np.asarray(expected, dtype=float)
    assert a.shape == b.shape, f"{what}: {a.shape} against {b.shape}"
    size = float(np.abs(b).max(initial=0.0)) if scale is None else scale
    worst = float(np.abs(a - b).max(initial=0.0))
    assert worst <= share * size, f"{what}: off by {worst:.3g}, {worst / (size or 1):.3g} of {size:.3g}"
