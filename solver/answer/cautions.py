"""Where a case asks more of the model than rod theory and its parameters can give: facts, before any solving."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from typing import Literal

from solver.model.load import Pulse
from solver.model.project import Case
from solver.model.surroundings import Resistance

CautionKind = Literal["gauge_near_end", "short_pulse", "wave_speed", "static_modulus", "damping_unit"]

#: Distance from the struck end, in diameters, after which a blow has spread over the section (common practice).
DIAMETERS_TO_SPREAD = 1.5
#: Length of a pulse, in diameters, below which a rod shows dispersion that thin-rod theory leaves out
#: (common practice; Rayleigh's correction is 1 % at a wave of about 5 diameters, Kolsky 1963, from memory).
DIAMETERS_OF_PULSE = 10.0
#: A material with a density of concrete (kg/m3) that carries waves slower than this (m/s) was probably given its
#: static modulus (common practice: 3,500 to 4,500 m/s in sound concrete).
CONCRETE_DENSITY = (2200.0, 2600.0)
CONCRETE_SLOW = 3400.0
#: Wave speeds of rods (m/s) from plastics to ceramics (common practice: 1,400 m/s in polycarbonate, 5,200 in steel).
USUAL_SPEEDS = (500.0, 13000.0)
#: Damping factors outside these bounds (s/m) are likely to be s/ft or mistyped. Smith 1960 (from memory):
#: 0.05 s/ft = 0.16 s/m along the shaft, 0.15 s/ft = 0.49 s/m at the toe.
SHAFT_DAMPING = (0.1, 3.0)
TOE_DAMPING = (0.2, 3.0)


@dataclass(frozen=True)
class Caution:
    """One caution: `pointer` is the place in the case, `value` what was found and `bound` what it is held against.

    SI units: metres for `gauge_near_end` and `short_pulse`, m/s for `static_modulus`, s/m for `damping_unit`.
    """

    kind: CautionKind
    pointer: str
    name: str
    value: float
    bound: float


def cautions_of(case: Case) -> tuple[Caution, ...]:
    """All cautions of a case that knows its materials."""
    return (*_gauges(case), *_pulse(case), *_speeds(case), *_concrete(case), *_damping(case))


def _gauges(case: Case) -> Iterator[Caution]:
    width = case.member.segments[0].section.round_width
    bound = DIAMETERS_TO_SPREAD * width
    for index, gauge in enumerate(case.gauges):
        if gauge.on == "member" and gauge.position < bound:
            yield Caution("gauge_near_end", f"gauges/{index}", gauge.name, gauge.position, bound)


def _pulse(case: Case) -> Iterator[Caution]:
    if not isinstance(case.load, Pulse):
        return
    head = case.member.segments[0]
    length = case.load.duration * case.material(head.material).wave_speed
    bound = DIAMETERS_OF_PULSE * head.section.round_width
    if length < bound and not case.member.lateral_inertia:
        yield Caution("short_pulse", "load", head.name, length, bound)


def _concrete(case: Case) -> Iterator[Caution]:
    told = set()
    for index, segment in enumerate(case.member.segments):
        material = case.material(segment.material)
        low, high = CONCRETE_DENSITY
        slow = low <= material.density <= high and material.wave_speed < CONCRETE_SLOW
        if slow and material.name not in told:
            told.add(material.name)
            at = f"member/segments/{index}"
            yield Caution("static_modulus", at, material.name, material.wave_speed, CONCRETE_SLOW)


def _speeds(case: Case) -> Iterator[Caution]:
    """Waves faster or slower than any usual material carries them: most slips of a unit show here."""
    told = set()
    for index, segment in enumerate(case.member.segments):
        material = case.material(segment.material)
        low, high = USUAL_SPEEDS
        usual = low <= material.wave_speed <= high or material.law.kind == "large_strain"
        if not usual and material.name not in told:
            told.add(material.name)
            bound = low if material.wave_speed < low else high
            yield Caution("wave_speed", f"member/segments/{index}", material.name, material.wave_speed, bound)


def _damping(case: Case) -> Iterator[Caution]:
    ground = case.ground
    if ground is None:
        return
    parts: list[tuple[str, str, Resistance, tuple[float, float]]] = [
        (f"ground/layers/{i}", layer.name, layer, SHAFT_DAMPING) for i, layer in enumerate(ground.layers)
    ]
    if ground.shaft_total is not None:
        parts.append(("ground/shaft_total", "shaft", ground.shaft_total, SHAFT_DAMPING))
    if ground.toe is not None:
        parts.append(("ground/toe", "toe", ground.toe, TOE_DAMPING))
    for pointer, name, part, (low, high) in parts:
        if part.law != "smith" or not part.damping:
            continue
        if part.damping < low or part.damping > high:
            yield Caution("damping_unit", pointer, name, part.damping, low if part.damping < low else high)
