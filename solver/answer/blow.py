"""Everything that one blow's march recorded, before it is gathered to an answer."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from solver.numerics.arrays import Extremes, Frames
from solver.numerics.chain import Chain
from solver.numerics.equilibrium import State
from solver.numerics.laying import Stretch

Array = NDArray[np.float64]


@dataclass(frozen=True, eq=False)
class Blow:
    """Everything one march recorded; see `solver.marching.March`."""

    chain: Chain
    state: State
    extremes: Extremes
    columns: NDArray[np.int64]
    steps: int
    stride: int
    gauges: Array
    ram: Array
    frames: Frames
    residual: float
    events: NDArray[np.int64]
    start_row: Array
    rest: Array
    rest_forces: Array
    at_end: Array
    settled: bool
    sets: tuple[float, ...]
    planned: int

    def law_at(self, link: int) -> str:
        """Kind of the material law of an element."""
        return self.stretch_at(link).material.law.kind

    def stretch_at(self, link: int) -> Stretch:
        """The segment's stretch that an element belongs to."""
        return next(s for s in self.chain.stretches if s.start <= link < s.stop)

    @property
    def member_links(self) -> NDArray[np.int64]:
        """Elements of the member itself."""
        chain = self.chain
        return np.flatnonzero((chain.axial > 0) & (np.arange(len(chain.axial)) >= chain.head))
