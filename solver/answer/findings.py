"""What a run means for the engineer: facts with their place, time and state. Not sentences: the screen words them.

Every number here is read from the arrays that the pictures draw, so that a finding and its picture cannot differ.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import Literal

import numpy as np

from solver.answer.cautions import Caution, cautions_of
from solver.answer.remark import Remark
from solver.answer.result import Array, Envelope, EventKind, Result, first_of_largest
from solver.model.derived import impact_energy, ram_mass, segment_mass
from solver.model.load import GRAVITY, Drop, Striker
from solver.model.member import Segment
from solver.model.project import Case

State = Literal["within", "near", "over", "no limit"]
Sign = Literal["compression", "tension"]
SIGNS: tuple[Sign, Sign] = ("compression", "tension")

#: Share of a limit above which a stress counts as near to it (a choice of this program).
NEAR = 0.9


@dataclass(frozen=True)
class StressAt:
    """A stress (Pa, magnitude) at a place (m) and a time (s) in a segment, with the limit of its material (Pa)."""

    value: float
    position: float
    time: float
    segment: str
    limit: float | None

    @property
    def share(self) -> float | None:
        """Stress over limit; `None` where no limit is given."""
        return None if self.limit is None else self.value / self.limit

    @property
    def state(self) -> State:
        if self.share is None:
            return "no limit"
        return "over" if self.share > 1 else "near" if self.share > NEAR else "within"


@dataclass(frozen=True)
class StressFinding:
    """The largest stress of one sign, and where its share of a limit is largest (`None`: no limit anywhere).

    `struck_again` is the time (s) at which the ram had struck again before the peak, `first` the peak before that;
    `None` where it had not. Such a peak belongs to a ram that fell on a member that still rings, as nothing in the
    model damps it.
    """

    sign: Sign
    peak: StressAt
    worst: StressAt | None
    struck_again: float | None = None
    first: StressAt | None = None

    @property
    def state(self) -> State:
        """Of the whole member: the worst place decides, which need not be the place of the peak."""
        return self.worst.state if self.worst else "no limit"

    @property
    def differs(self) -> bool:
        """The worst place lies in another segment than the peak."""
        return self.worst is not None and self.worst.segment != self.peak.segment


@dataclass(frozen=True)
class SetFinding:
    """Permanent movement of the toe per blow (m) and what goes with it (m). `time` (s): the end of the run; `last`:
    whether the ground had done giving way by then."""

    value: float
    toe_largest: float
    head_rebound: float | None
    time: float
    position: float
    last: bool = True

    @property
    def blows_per_metre(self) -> float | None:
        """1/set; `None` where the toe does not stay down."""
        return 1 / self.value if self.value > 0 else None


@dataclass(frozen=True)
class EnergyFinding:
    """Largest energy (J) that has passed the first gauge on the member, when (s), and what struck with how much (J).

    `source_energy`: of the ram or striker as it strikes, or the work of the pulse. `drop_energy`: m g h, where the
    load is given by a drop height.
    """

    gauge: str
    position: float
    value: float
    time: float
    source: Literal["ram", "striker", "load"]
    source_energy: float
    drop_energy: float | None

    @property
    def share(self) -> float | None:
        return self.value / self.source_energy if self.source_energy > 0 else None


@dataclass(frozen=True)
class Happening:
    """An event worth a note. `again` counts: 0 for the first of its kind at that place, 1 for the second ..."""

    kind: EventKind
    position: float
    time: float
    again: int


@dataclass(frozen=True)
class Quality:
    """How far the run can be trusted as a computation: mesh, step and the energy that does not close (share)."""

    elements: int
    steps: int
    time_step: float
    courant_worst: float
    energy_residual: float
    finished: bool
    at_rest: bool


@dataclass(frozen=True)
class Findings:
    """All facts of a run, verdict first. `striking`: compression and tension in a rod that strikes (ram or striker), at
    its negative positions; empty where none does."""

    compression: StressFinding
    tension: StressFinding
    set: SetFinding | None
    energy: EnergyFinding | None
    happenings: tuple[Happening, ...]
    remarks: tuple[Remark, ...]
    cautions: tuple[Caution, ...]
    quality: Quality
    striking: tuple[StressFinding, ...] = ()


def findings_of(result: Result) -> Findings:
    """The facts of a result, finished or not."""
    rod, striking = result.striking_envelope, result.case.ram_segments
    return Findings(
        compression=_of_all_blows(result, "compression"),
        tension=_of_all_blows(result, "tension"),
        set=_set(result),
        energy=_energy(result),
        happenings=_happenings(result),
        remarks=result.remarks,
        cautions=cautions_of(result.case),
        quality=Quality(
            result.elements,
            result.steps,
            result.time_step,
            result.courant_worst,
            result.ledger.residual,
            result.finished,
            result.at_rest,
        ),
        striking=() if rod is None else tuple(_stress(result.case, rod, striking, sign) for sign in SIGNS),
    )


def segment_of(case: Case, position: Array) -> Array:
    """Index of the member's segment at each position (m), same shape; a place on a joint counts to the lower one."""
    return _owner(case.member.segments, position)


def _owner(segments: Sequence[Segment], distance: Array) -> Array:
    """The same along any rod; `distance` (m) from where its first segment begins."""
    ends = np.cumsum([s.length for s in segments])
    return np.minimum(np.searchsorted(ends, distance, side="right"), len(ends) - 1)


def first_blow(result: Result) -> tuple[StressFinding, StressFinding]:
    """Compression and tension before the ram or striker strikes again, each held against its limits.

    Where it does not strike again these are the findings of the whole run. For judging how hard a blow may be: peaks of
    a second blow depend on when the ram falls back, and do not grow steadily with the first.
    """
    envelope = result.envelope if result.first_envelope is None else result.first_envelope
    case = result.case
    compression, tension = (_stress(case, envelope, case.member.segments, sign) for sign in SIGNS)
    return compression, tension


def _of_all_blows(result: Result, sign: Sign) -> StressFinding:
    case, again = result.case, result.struck_again
    found = _stress(case, result.envelope, case.member.segments, sign)
    if again is None or result.first_envelope is None or found.peak.time < again:
        return found
    return replace(
        found, struck_again=again, first=_stress(case, result.first_envelope, case.member.segments, sign).peak
    )


def _stress(case: Case, envelope: Envelope, segments: Sequence[Segment], sign: Sign) -> StressFinding:
    """Of the member, or of a rod that strikes, which ends at its struck face, 0."""
    if sign == "compression":
        values, times = np.maximum(-envelope.lowest_stress, 0.0), envelope.lowest_stress_time
    else:
        values, times = np.maximum(envelope.highest_stress, 0.0), envelope.highest_stress_time
    limits = [case.material(s.material).limits.value(sign) for s in segments]
    begins = 0.0 if envelope.position[0] > 0 else -sum(s.length for s in segments)
    owner = _owner(segments, envelope.position - begins)

    def at(index: int) -> StressAt:
        number = int(owner[index])
        return StressAt(
            float(values[index]),
            float(envelope.position[index]),
            float(times[index]),
            segments[number].name,
            limits[number],
        )

    shares = values / np.array([np.inf if v is None else v for v in limits])[owner]
    limited = any(v is not None for v in limits)
    worst = at(first_of_largest(shares, times)) if limited else None
    return StressFinding(sign, at(first_of_largest(values, times)), worst)


def _set(result: Result) -> SetFinding | None:
    if result.set is None:
        return None
    return SetFinding(
        result.set,
        result.max_toe_displacement,
        result.head_rebound,
        result.duration,
        result.case.member.length,
        not any(remark.kind in ("still_giving", "stopped") for remark in result.remarks),
    )


def _energy(result: Result) -> EnergyFinding | None:
    gauge = next((g for g in result.gauges.values() if g.on == "member"), None)
    if gauge is None or gauge.time.size == 0:
        return None
    passed = gauge.transferred_energy
    largest = int(np.argmax(passed))
    load, materials = result.case.load, result.case.materials
    source: Literal["ram", "striker", "load"] = "load"
    drop_energy = None
    if isinstance(load, Drop):
        source = "ram"
        source_energy = impact_energy(load, materials)
        if load.drop_height is not None:
            drop_energy = ram_mass(load, materials) * GRAVITY * load.drop_height
    elif isinstance(load, Striker):
        source = "striker"
        source_energy = sum(segment_mass(s, materials) for s in load.segments) * load.velocity**2 / 2
    else:
        work = result.ledger.parts.get("work_of_load", np.zeros(1))
        source_energy = float(np.max(work)) if len(work) else 0.0
    return EnergyFinding(
        gauge.name,
        gauge.position,
        float(passed[largest]),
        float(gauge.time[largest]),
        source,
        source_energy,
        drop_energy,
    )


def _happenings(result: Result) -> tuple[Happening, ...]:
    seen: dict[tuple[str, float], int] = {}
    found = []
    for event in result.events:
        key = (event.kind, event.position)
        found.append(Happening(event.kind, event.position, event.time, seen.get(key, 0)))
        seen[key] = seen.get(key, 0) + 1
    return tuple(found)
