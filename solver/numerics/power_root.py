"""The root that the power law of damping asks for at every node and step, without a power at every node and step.

a w + b w^N = g with w = s x, s = (b/a)^(1/(1 - N)), is x + x^N = H with H = g/(a s): one curve x/H for each exponent N,
between 0 and 1. It is kept as polynomials, one for each of 32 pieces of each octave of H, which the leading bits of H
tell; a product of H's own trailing bits is then all that is left to compute.
"""

from functools import lru_cache

import numpy as np
from numpy.typing import NDArray

from solver.numerics.arrays import aligned
from solver.numerics.compiled import kernel, part_of_step

Array = NDArray[np.float64]

#: Octaves of H that are kept, pieces of each (as a power of 2), and coefficients of a piece: a line of cache.
LOW, HIGH = -120, 40
SPLIT = 5
TERMS = 8
#: Bits of a double below those that tell its piece, and the bits of 2^LOW.
BELOW = 52 - SPLIT
FIRST = (1023 + LOW) << 52
PIECES = (HIGH - LOW) << SPLIT
UNIT = 2.0**-BELOW
#: Exponents that are kept; nearer to 1 (where it takes no power at all) s leaves the range of numbers.
EXPONENTS = (0.05, 0.95)


@lru_cache(maxsize=16)
def pieces_of(exponent: float) -> Array:
    """Polynomials of x/H in t, 0 to 1 along a piece; shape (pieces, terms). Off by 1e-12 of x/H at most."""
    nodes = 0.5 - 0.5 * np.cos((2 * np.arange(TERMS) + 1) * np.pi / (2 * TERMS))
    piece = np.arange(PIECES)
    within = 1 + ((piece % 2**SPLIT)[:, None] + nodes) / 2**SPLIT
    log_h = np.log(within) + ((piece >> SPLIT) + LOW)[:, None] * np.log(2)
    found = np.asarray(
        np.linalg.solve(np.vander(nodes, TERMS, increasing=True), _share(exponent, log_h).T).T, np.float64
    )
    found = aligned(found)
    found.flags.writeable = False
    return found


def pieces_for(exponents: Array) -> tuple[NDArray[np.int64], Array]:
    """For the exponent of each node: its first piece in the table of all (-1: not kept), and the table. Kept are those
    of several nodes, not the mean of two layers at the node between them."""
    if not len(exponents):
        return np.zeros(0, dtype=np.int64), np.zeros((0, TERMS))
    values, of, nodes = np.unique(exponents.round(12), return_inverse=True, return_counts=True)
    kept = (nodes > 2) & (values >= EXPONENTS[0]) & (values <= EXPONENTS[1])
    tables = [pieces_of(float(value)) for value in values[kept]]
    first = np.where(kept, (np.cumsum(kept) - 1) * PIECES, -1)
    if not tables:
        return first[of], np.zeros((0, TERMS))
    return first[of], tables[0] if len(tables) == 1 else np.concatenate(tables)


def _share(exponent: float, log_h: Array) -> Array:
    """x/H = 1/(1 + e^-d), where d = (1 - N) ln x solves d + (1 - N) ln(1 + e^-d) = (1 - N) ln H by Newton's method.

    The left side is convex and rising, and both bounds lie right of the root; a last step squares what is missing.
    """
    left = 1 - exponent
    goal = left * log_h
    d = np.minimum(goal, goal / exponent)
    for _ in range(60):
        small = np.exp(-np.abs(d))
        part = np.where(d > 0, small, 1.0) / (1 + small)
        change = (d + left * (np.log1p(small) + np.maximum(-d, 0.0)) - goal) / (1 - left * part)
        d -= change
        if np.max(np.abs(change) / (1 + np.abs(d))) < 1e-9:
            break
    small = np.exp(-np.abs(d))
    return np.asarray(np.where(d > 0, 1.0, small) / (1 + small))


@part_of_step
def speed_by_pieces(a, one_over_a, b, exponent, rest, scale, pieces, first):
    """Root w of a w + b |w|^N sign(w) = rest; `scale` = 1/(a s), `first` the piece with which this exponent begins, or
    -1 where it is not kept."""
    bits = np.float64(abs(rest) * scale).view(np.int64) - FIRST
    piece = bits >> BELOW
    if first < 0 or piece < 0 or piece >= PIECES:
        return power_speed(a, b, exponent, rest)
    c = pieces[first + piece]
    t = (bits & ((1 << BELOW) - 1)) * UNIT
    square = t * t
    low = c[0] + c[1] * t + square * (c[2] + c[3] * t)
    high = c[4] + c[5] * t + square * (c[6] + c[7] * t)
    return rest * one_over_a * (low + square * square * high)


@kernel
def power_speed(a, b, exponent, rest):
    """Root w of a w + b |w|^N sign(w) = rest, a > 0, b >= 0, 0 < N <= 1.

    With y = |w|^N the left side is a y^(1/N) + b y, convex and rising, so Newton's steps fall onto the root from
    above.
    """
    goal = abs(rest)
    if goal == 0.0:
        return 0.0
    inverse = 1.0 / exponent
    # both bounds lie above the root
    y = min(goal / b if b > 0.0 else 1e300, (goal / a) ** exponent)
    for _ in range(50):
        lead = a * y ** (inverse - 1.0)
        change = (lead * y + b * y - goal) / (inverse * lead + b)
        y -= change
        if change <= 1e-13 * y:
            break
    # of a slow node the difference would leave nothing but rounding
    size = (goal - b * y) / a if b * y < 0.9 * goal else y**inverse
    return size if rest > 0.0 else -size
