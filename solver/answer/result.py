"""What came out of a case: frozen, with read-only arrays. SI units; tension and motion towards the far end positive.

Positions are distances from the struck end in m. A rod that strikes (striker, or a ram that is a rod) lies at
negative positions: its struck face is at 0 and it reaches to minus its length.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from functools import cached_property
from typing import Any, Literal

import numpy as np
from numpy.typing import NDArray

from solver.answer.remark import Remark, sentence
from solver.model.project import Case

Array = NDArray[np.float64]
Single = NDArray[np.float32]


def read_only(array: NDArray[Any]) -> Array:
    """The same numbers, in a row and safe from changes."""
    array = np.ascontiguousarray(array, dtype=np.float64)
    array.flags.writeable = False
    return array


EventKind = Literal[
    "impact",
    "separation",
    "first_yield",
    "crack",
    "joint_opened",
    "joint_closed",
    "wall_contact",
    "toe_lift",
]


@dataclass(frozen=True)
class Event:
    """Something that happened once, at a place (m) and a time (s)."""

    kind: EventKind
    position: float
    time: float


@dataclass(frozen=True)
class Peak:
    """Largest value of a kind (magnitude, never negative) with its place (m) and time (s)."""

    value: float
    position: float
    time: float


def first_of_largest(values: Array, times: Array) -> int:
    """Index of the largest value; of values that differ by rounding only, the one that stood first."""
    largest = values.max()
    equal = np.flatnonzero(values >= largest * (1 - 1e-9) if largest > 0 else values == largest)
    return int(equal[np.argmin(times[equal])])


@dataclass(frozen=True, eq=False)
class GaugeRecord:
    """Everything at one gauge, at every step. All arrays have shape (n,), n the number of recorded times.

    `force` (N), `stress` (Pa), `strain`: tension positive, with the static part at rest before the blow where
    gravity acts. `velocity` (m/s), `displacement` (m, from the position of rest before the blow) and
    `acceleration` (m/s2): positive towards the far end. `impedance` is Z = A sqrt(E rho) at the gauge, N·s/m;
    `rest_force` is the static force before the blow, N; `axial_stiffness` EA (N), `None` where force is not EA times
    strain: other laws, and lateral inertia, with which a bulging section holds a part of the force.
    Long records lie in a temporary file and are read where they are looked at.
    """

    name: str
    position: float
    on: Literal["member", "ram", "striker"]
    impedance: float
    area: float
    rest_force: float
    time_step: float
    axial_stiffness: float | None
    force: Array
    velocity: Array
    displacement: Array
    acceleration: Array
    element_strain: Array

    @cached_property
    def time(self) -> Array:
        """Time of each record from the blow on, s."""
        return read_only(np.arange(len(self.force)) * self.time_step)

    @cached_property
    def stress(self) -> Array:
        """Force over area, Pa."""
        return read_only(self.force / self.area)

    @cached_property
    def strain(self) -> Array:
        """Force over EA where that is so (see `axial_stiffness`), else the mean strain of the elements at the gauge."""
        return (
            self.element_strain
            if self.axial_stiffness is None
            else read_only(self.force / self.axial_stiffness)
        )

    @property
    def down_wave(self) -> Array:
        """Force wave towards the far end, (F - Z v)/2, N (d'Alembert; tension positive)."""
        return (self.force - self.impedance * self.velocity) / 2

    @property
    def up_wave(self) -> Array:
        """Force wave towards the struck end, (F + Z v)/2, N (d'Alembert; tension positive)."""
        return (self.force + self.impedance * self.velocity) / 2

    @property
    def transferred_energy(self) -> Array:
        """Energy that has passed the gauge towards the far end, -integral F v dt by trapezoids, J, shape (n,)."""
        power = -self.force * self.velocity
        steps = np.diff(self.time) * (power[1:] + power[:-1]) / 2
        return np.concatenate(([0.0], np.cumsum(steps)))


@dataclass(frozen=True, eq=False)
class Envelope:
    """Extremes over a run, or over its first blow, along the member. All arrays have shape (elements of the member,).

    `position` (m) is the middle of each element. Stresses in Pa with sign (lowest = most compressive), each with
    the time (s) at which it stood; largest velocity (m/s) and displacement (m) towards the far end.
    """

    position: Array
    lowest_stress: Array
    lowest_stress_time: Array
    highest_stress: Array
    highest_stress_time: Array
    max_velocity: Array
    max_displacement: Array


@dataclass(frozen=True, eq=False)
class Fields:
    """The run as pictures: values over time and distance, thinned to what a screen can show.

    `time` (s), shape (frames,); `position` (m), shape (columns,), middles of elements, rising, negative on a rod that
    strikes; `edges` (m), shape (columns + 1,), where each column's stretch of rod begins and ends; `area` (m2) and
    `impedance` (N·s/m), shape (columns,). `stress` (Pa), `velocity` (m/s) and `displacement` (m): shape
    (frames, columns), single precision.
    """

    time: Array
    position: Array
    edges: Array
    area: Array
    impedance: Array
    stress: Single
    velocity: Single
    displacement: Single


@dataclass(frozen=True, eq=False)
class Ledger:
    """Energy over time. `time` (s) has shape (m,); each of `parts` (J) too.

    What came in (`work_of_load`, `work_of_gravity`, `initial_energy`) is balanced by what is stored (`kinetic`,
    `elastic_member`, `elastic_ground`, `elastic_cushion`, `elastic_springs`) and what is lost (`plastic`, `viscous`,
    `cushion_loss`, `ground_static_loss`, `ground_damping_loss`, `impact_loss`, `absorbed_by_dashpots`).
    `residual` is what does not close, as a share of the largest energy of the run.
    """

    time: Array
    parts: dict[str, Array]
    residual: float

    @property
    def final(self) -> dict[str, float]:
        """The last value of every part, J."""
        return {name: float(values[-1]) for name, values in self.parts.items()}


@dataclass(frozen=True, eq=False)
class HeadTrain:
    """Ram and cap over time, shape (n,): cushion force on the ram (N, compression positive here, as a cushion
    knows no tension), velocity of the ram (m/s) and of the struck end (m/s)."""

    time: Array
    cushion_force: Array
    ram_velocity: Array
    struck_end_velocity: Array


@dataclass(frozen=True, eq=False)
class Residual:
    """Repeated blows: permanent movement of the toe per blow (m, shape (blows,)), and the axial force (N, tension
    positive) locked in along the member (m) after the last one, both of shape (elements of the member,)."""

    set_per_blow: Array
    repeats: bool
    position: Array
    force: Array


@dataclass(frozen=True, eq=False)
class Result:
    """All that a run tells. `finished` is False where it was stopped early; `at_rest` where it came to rest by
    itself.

    `struck_again` is the time (s) at which the ram or striker struck again, having been away for longer than a wave
    takes to the far end and back; `first_envelope` what the envelope was until then. Both `None` where it did not.
    `striking_envelope` is that of a rod that strikes, at its negative positions; `None` where there is none.
    """

    case: Case
    elements: int
    steps: int
    time_step: float
    duration: float
    courant_worst: float
    gauges: dict[str, GaugeRecord]
    envelope: Envelope
    fields: Fields
    ledger: Ledger
    peak_compression: Peak
    peak_tension: Peak
    set: float | None
    head_set: float | None
    head_rebound: float | None
    max_toe_displacement: float
    events: tuple[Event, ...]
    remarks: tuple[Remark, ...]
    solve_seconds: float
    finished: bool = True
    at_rest: bool = False
    head_train: HeadTrain | None = None
    residual: Residual | None = None
    crack_openings: dict[str, float] = field(default_factory=dict)
    struck_again: float | None = None
    first_envelope: Envelope | None = None
    striking_envelope: Envelope | None = None

    @property
    def warnings(self) -> tuple[str, ...]:
        """The remarks as sentences, in SI."""
        return tuple(sentence(remark) for remark in self.remarks)

    @property
    def transferred_energy(self) -> dict[str, tuple[float, float]]:
        """Per gauge the largest and the final energy that has passed it, J."""
        found = {}
        for name, gauge in self.gauges.items():
            energy = gauge.transferred_energy
            found[name] = (float(energy.max()), float(energy[-1]))
        return found
