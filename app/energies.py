"""The parts of a run's energy under the words that the screen and the report have for them."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from solver import Ledger

Array = NDArray[np.float64]

#: Word of each curve and the parts of the ledger that it sums; every part stands under one word.
PARTS = {
    "put in": ("work_of_load", "work_of_gravity", "initial_energy"),
    "motion": ("kinetic",),
    "elastic": ("elastic_member", "elastic_ground", "elastic_cushion", "elastic_springs"),
    "lost in the ground": ("ground_static_loss", "ground_damping_loss"),
    "lost in the cushion": ("cushion_loss",),
    "lost in the member": ("plastic", "viscous", "impact_loss"),
    "absorbed at the ends": ("absorbed_by_dashpots",),
}
#: What stays below this share of the largest of them gets no curve: it would lie on the axis.
SMALL_SHARE = 0.01


def energies_by_word(ledger: Ledger) -> dict[str, Array]:
    """Energy over the ledger's times, J, by word; without what is too small to be seen beside the rest."""
    sums = {
        word: np.sum([ledger.parts[p] for p in parts if p in ledger.parts], axis=0)
        for word, parts in PARTS.items()
        if any(p in ledger.parts for p in parts)
    }
    peaks = {word: float(np.max(np.abs(values), initial=0.0)) for word, values in sums.items()}
    least = SMALL_SHARE * max(peaks.values(), default=0.0)
    return {word: values for word, values in sums.items() if peaks[word] > least}
