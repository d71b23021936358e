"""The check that a mesh is fine enough: the same case on elements half as long."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

from solver.answer.result import Result
from solver.run import solve


@dataclass(frozen=True)
class Change:
    """One headline figure on both meshes, in SI units. `figure` is the name of a quantity of a result."""

    figure: str
    value: float
    finer: float

    @property
    def share(self) -> float | None:
        """Change as a share of the finer value; `None` where that is nothing."""
        return (self.finer - self.value) / abs(self.finer) if self.finer else None


@dataclass(frozen=True)
class MeshCheck:
    """Elements of both meshes and what changed between them."""

    elements: int
    finer_elements: int
    changes: tuple[Change, ...]


def check_mesh(result: Result, cancel: Callable[[], bool] | None = None) -> MeshCheck:
    """Solve a result's case on elements half as long and compare its headline figures.

    Peak compression and tension (Pa), set (m, with ground), and the largest energy past the first gauge (J).
    Raises `SolveError` as `solve` does.
    """
    case = result.case
    finer = solve(case, element_length=case.member.length / (2 * result.elements), cancel=cancel)
    changes = [
        Change("peak_compression", result.peak_compression.value, finer.peak_compression.value),
        Change("peak_tension", result.peak_tension.value, finer.peak_tension.value),
    ]
    if result.set is not None and finer.set is not None:
        changes.append(Change("set", result.set, finer.set))
    if case.gauges:
        name = case.gauges[0].name
        changes.append(
            Change("energy", result.transferred_energy[name][0], finer.transferred_energy[name][0])
        )
    return MeshCheck(result.elements, finer.elements, tuple(changes))
