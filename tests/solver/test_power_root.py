"""The root of the power law of damping, kept as polynomials and by Newton's method: speeds put in must come out."""

import numpy as np
import pytest

from solver.numerics.compiled import kernel
from solver.numerics.power_root import pieces_of, power_speed, speed_by_pieces


@kernel
def _roots(a, b, n, rest, scale, pieces, kept, plain):
    for i in range(len(rest)):
        kept[i] = speed_by_pieces(a, 1.0 / a, b, n, rest[i], scale, pieces, 0)
        plain[i] = power_speed(a, b, n, rest[i])


@pytest.mark.parametrize("exponent", [0.05, 0.2, 0.5, 0.95])
@pytest.mark.parametrize("damping", [1e-8, 4e-4, 5.0])
def test_roots_hold_down_to_the_slowest_nodes(exponent: float, damping: float) -> None:
    """Speeds from 1e-300 to 1e3, with their sign; the polynomials are off by 3e-12 at the least exponent."""
    a, draw = 1.3, np.random.default_rng(0)
    speed = 10.0 ** draw.uniform(-300, 3, 4_000) * draw.choice([-1.0, 1.0], 4_000)
    size = np.abs(speed).astype(np.longdouble)
    whole = a * size + np.longdouble(damping) * size ** np.longdouble(exponent)
    rest = np.copysign(whole.astype(float), speed)
    with np.errstate(over="ignore"):
        scale = float(np.float64(a / damping) ** (1 / (1 - exponent)) / a)
    kept, plain = np.empty_like(rest), np.empty_like(rest)
    _roots(a, damping, exponent, rest, scale, pieces_of(exponent), kept, plain)
    # a rounding of `rest` is 1/N times as large in the speed of a slow node
    assert np.max(np.abs(kept / speed - 1)) < 1e-11
    assert np.max(np.abs(plain / speed - 1)) < 1e-11
