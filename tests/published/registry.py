"""What a check is: a model, where its answer is published, and the numbers that a run gave against it."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass, field
from functools import partial
from importlib import import_module
from typing import Any

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]

TOPICS: dict[str, str] = {
    "dalembert": "Waves on a uniform rod",
    "impedance_steps": "Changes of impedance",
    "end_conditions": "Ends, and what is attached along the rod",
    "mass_on_rod": "A rigid mass strikes a rod",
    "cushion": "Ram, cushion, cap and member",
    "striker": "A rod strikes a rod",
    "joints": "Joints that open and close",
    "plastic": "Plastic rods",
    "viscous": "Viscous rods",
    "dispersion": "Lateral inertia, and dispersion of the mesh",
    "large_strain": "Rods at large strain",
    "brittle": "Rods that crack in tension",
    "law_paths": "Laws of ground, cushion and metal along given paths",
    "smith_toe": "Toe resistance",
    "shaft": "Shaft resistance",
    "radiation": "Ground as a half-space",
    "residual_stress": "Repeated blows",
    "frequencies": "Natural frequencies",
    "stability": "Stability of the time step",
    "energy": "Energy",
    "wave_relations": "Waves read from one gauge",
    "stress_limits": "Limits of driving stress",
}
"""Modules of this folder that hold checks, in the order of the page, with their headings."""


@dataclass(frozen=True)
class Compared:
    """One published value and the solver's. `scale`: what their difference is a share of, in the same unit.

    `tolerance` is its own where it differs from that of its check, for a reason that the check gives.
    """

    what: str
    expected: float
    found: float
    unit: str
    scale: float
    points: int = 1
    tolerance: float | None = None

    @property
    def difference(self) -> float:
        """|found - expected| / scale; infinite where the solver gave no number."""
        off = abs(self.found - self.expected) / self.scale
        return off if np.isfinite(off) else np.inf


@dataclass(frozen=True)
class Curve:
    """One line of a figure; `style` is `theory` or `solver`."""

    label: str
    style: str
    x: Array
    y: Array


@dataclass(frozen=True)
class Picture:
    """A figure for the page."""

    title: str
    x_label: str
    y_label: str
    curves: tuple[Curve, ...]


def value(
    what: str,
    expected: float,
    found: float,
    unit: str = "",
    scale: float | None = None,
    tolerance: float | None = None,
) -> Compared:
    """Compare one number, by default as a share of the expected one."""
    expected, found = float(expected), float(found)
    share_of = float(scale if scale is not None else abs(expected))
    return Compared(what, expected, found, unit, share_of, tolerance=tolerance)


def history(what: str, expected: Array, found: Array, unit: str = "", scale: float | None = None) -> Compared:
    """Compare two records point by point, by default as a share of the expected peak; the worst point is told."""
    expected, found = np.broadcast_arrays(np.asarray(expected, float), np.asarray(found, float))
    off = np.where(np.isfinite(found), np.abs(found - expected), np.inf)
    worst = np.unravel_index(int(np.argmax(off)), off.shape)
    peak = float(np.max(np.abs(expected))) if scale is None else float(scale)
    return Compared(what, float(expected[worst]), float(found[worst]), unit, peak, expected.size)


def picture(
    title: str,
    x_label: str,
    y_label: str,
    x: Array,
    expected: Array,
    found: Array,
    found_x: Array | None = None,
) -> Picture:
    """A figure of the closed form and what the solver gave, over the same `x` unless told otherwise."""
    at = np.asarray(x if found_x is None else found_x)
    return Picture(
        title,
        x_label,
        y_label,
        (
            Curve("closed form", "theory", np.asarray(x), np.asarray(expected)),
            Curve("solver", "solver", at, np.asarray(found)),
        ),
    )


@dataclass(frozen=True)
class Outcome:
    """What a check gave."""

    compared: tuple[Compared, ...]
    pictures: tuple[Picture, ...]
    tolerance: float

    def allowed(self, one: Compared) -> float:
        """Largest difference at which `one` passes."""
        return self.tolerance if one.tolerance is None else one.tolerance

    @property
    def worst(self) -> Compared:
        """The comparison that is nearest to its tolerance, or farthest beyond it."""
        return max(self.compared, key=lambda c: c.difference / self.allowed(c))

    @property
    def holds(self) -> bool:
        """Whether every difference is within the tolerance. Nothing compared is nothing shown."""
        return bool(self.compared) and all(c.difference <= self.allowed(c) for c in self.compared)


@dataclass(frozen=True)
class Check:
    """One check. `tolerance` is the largest difference that passes, as a share of what `share_of` names."""

    topic: str
    name: str
    title: str
    model: str
    source: str
    formula: str
    tolerance: float
    share_of: str
    why: str
    work: Callable[[], Iterator[Compared | Picture]] = field(repr=False)

    def run(self) -> Outcome:
        """Solve, and compare."""
        parts = list(self.work())
        return Outcome(
            tuple(p for p in parts if isinstance(p, Compared)),
            tuple(p for p in parts if isinstance(p, Picture)),
            self.tolerance,
        )


_found: list[Check] = []


def check(
    *,
    model: str,
    title: str,
    source: str,
    formula: str,
    tolerance: float,
    why: str,
    share_of: str = "the value",
    over: Mapping[str, Any] | None = None,
) -> Callable[[Callable[..., Iterator[Compared | Picture]]], Callable[..., Iterator[Compared | Picture]]]:
    """Register a function as a check; `over` makes one check of each of its entries, handed in as the argument."""

    def register(
        work: Callable[..., Iterator[Compared | Picture]],
    ) -> Callable[..., Iterator[Compared | Picture]]:
        topic = work.__module__.rpartition(".")[2]
        one = partial(Check, topic=topic, model=model, source=source, formula=formula, tolerance=tolerance)
        for label, argument in (over or {"": None}).items():
            _found.append(
                one(
                    name=f"{topic}: {work.__name__}" + (f" [{label}]" if label else ""),
                    title=title + (f" ({label})" if label else ""),
                    share_of=share_of,
                    why=why,
                    work=partial(work, argument) if label else work,
                )
            )
        return work

    return register


def all_checks() -> list[Check]:
    """Every check, in the order of the page."""
    for topic in TOPICS:
        import_module(f"{__package__}.{topic}")
    order = {topic: i for i, topic in enumerate(TOPICS)}
    return sorted(_found, key=lambda c: order[c.topic])
