"""How far a material law may stiffen, and so how much shorter its elements' step must be."""

from __future__ import annotations

from solver.model.material import Law

#: Smallest stretch that a large-strain segment may be pressed to; below it the run is ended with a word.
SMALLEST_STRETCH = 0.4


def stiffening_of(law: Law) -> float:
    """Largest tangent stiffness over the initial one.

    Neo-Hookean, P = G (s - 1/s^2): dP/ds = G (1 + 2/s^3), three times G at s = 1. All other laws soften only.
    """
    if law.kind == "large_strain":
        return (1 + 2 / SMALLEST_STRETCH**3) / 3
    return 1.0
