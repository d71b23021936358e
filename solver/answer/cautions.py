"""Where a case asks more of the model than rod theory and its parameters can give: facts, before any solving."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from typing import Literal

import numpy as np

from solver.model.load import Drop, Pulse
from solver.model.material import Material
from solver.model.member import Segment
from solver.model.project import Case
from solver.model.surroundings import Resistance
from solver.numerics.along import profile_along

CautionKind = Literal[
    "gauge_near_end",
    "short_pulse",
    "wave_speed",
    "static_modulus",
    "damping_unit",
    "stiff_cushion",
    "stiff_spring",
    "heavy_ram",
]
Suspect = Literal["", "density", "modulus"]

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
#: Densities (kg/m3) and moduli (Pa) of solids, from foam to osmium and from soft rubber to diamond (common practice):
#: what lies outside them is the likely slip behind an unusual wave speed.
USUAL_DENSITY = (100.0, 23_000.0)
USUAL_MODULUS = (1e6, 1.2e12)
#: A cushion stiffer than a plate of the member's own section and material this thick (m) is none, and a spring a fixed
#: place (a choice of this program: cushions are some centimetres of softer stuff).
STIFF_PLATE = 0.001
#: No ram is heavier (kg; common practice: the largest are of some hundred tonnes).
HEAVIEST_RAM = 500e3
#: Damping factors outside these bounds (s/m) are likely to be s/ft or mistyped. Smith 1960 (from memory):
#: 0.05 s/ft = 0.16 s/m along the shaft, 0.15 s/ft = 0.49 s/m at the toe.
SHAFT_DAMPING = (0.1, 3.0)
TOE_DAMPING = (0.2, 3.0)


@dataclass(frozen=True)
class Caution:
    """One caution: `pointer` is the place in the case, `value` what was found and `bound` what it is held against.

    SI units: metres for `gauge_near_end` and `short_pulse`, m/s for `wave_speed` and `static_modulus`, s/m for
    `damping_unit`, N/m for `stiff_cushion` and `stiff_spring`, kg for `heavy_ram`. `suspect` names the number that is
    likely to be wrong where it can be told, and `given` is its value.
    """

    kind: CautionKind
    pointer: str
    name: str
    value: float
    bound: float
    suspect: Suspect = ""
    given: float = 0.0


def cautions_of(case: Case) -> tuple[Caution, ...]:
    """All cautions of a case that knows its materials."""
    found = (_gauges, _pulse, _speeds, _concrete, _train, _springs, _damping)
    return tuple(caution for kind in found for caution in kind(case))


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
    striking = "load/segments" if case.load.kind == "striker" else "load/ram/segments"
    parts = [(f"member/segments/{i}", s) for i, s in enumerate(case.member.segments)]
    parts += [(f"{striking}/{i}", s) for i, s in enumerate(case.ram_segments)]
    for pointer, segment in parts:
        material = case.material(segment.material)
        usual = not _outside(material.wave_speed, USUAL_SPEEDS) or material.law.kind == "large_strain"
        if not usual and material.name not in told:
            told.add(material.name)
            low, high = USUAL_SPEEDS
            bound = low if material.wave_speed < low else high
            suspect, given = _suspect(material)
            yield Caution("wave_speed", pointer, material.name, material.wave_speed, bound, suspect, given)


def _suspect(of: Material) -> tuple[Suspect, float]:
    """Which of density and modulus is the one that no solid has, if it is one of them."""
    density, modulus = _outside(of.density, USUAL_DENSITY), _outside(of.young_modulus, USUAL_MODULUS)
    if density == modulus:
        return "", 0.0
    return ("density", of.density) if density else ("modulus", of.young_modulus)


def _outside(value: float, bounds: tuple[float, float]) -> bool:
    return not bounds[0] <= value <= bounds[1]


def _train(case: Case) -> Iterator[Caution]:
    """A ram that is too heavy and cushions that are too stiff to be meant."""
    load = case.load
    if not isinstance(load, Drop):
        return
    if load.ram_mass is not None and load.ram_mass > HEAVIEST_RAM:
        yield Caution("heavy_ram", "load", "ram", load.ram_mass, HEAVIEST_RAM)
    bound = _plate(case, case.member.segments[0])
    for key, name, cushion in (
        ("cushion", "cushion", load.cushion),
        ("pile_cushion", "pile cushion", load.pile_cushion),
    ):
        if cushion is not None and cushion.loading_stiffness > bound:
            yield Caution("stiff_cushion", f"load/{key}", name, cushion.loading_stiffness, bound)


def _springs(case: Case) -> Iterator[Caution]:
    """Springs to fixed ground that are as good as fixed."""
    given = [
        (f"member/attachments/{i}", "attached spring", one.value)
        for i, one in enumerate(case.member.attachments)
        if one.kind == "spring"
    ]
    if case.far_end.kind == "spring":
        given.append(("far_end", "spring at the far end", case.far_end.stiffness))
    bound = _plate(case, case.member.segments[-1])
    for pointer, name, stiffness in given:
        if stiffness > bound:
            yield Caution("stiff_spring", pointer, name, stiffness, bound)


def _plate(case: Case, segment: Segment) -> float:
    """Stiffness of a plate of the segment's own section and material, `STIFF_PLATE` thick, N/m."""
    axial, _, _ = profile_along(segment, case.materials, np.zeros(1))
    return float(axial[0]) / STIFF_PLATE


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
