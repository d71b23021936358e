"""What follows from a description by one formula: sections along a taper, impedance, travel time, energy, resistance.

Pure functions of the model in SI units; they serve the derived values under a form, and checks.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from math import sqrt
from typing import Literal

from solver.model.load import GRAVITY, Cushion, Drop
from solver.model.material import Material
from solver.model.member import Segment
from solver.model.project import Case, Gauge
from solver.model.section import AnySection
from solver.model.surroundings import Ground

Materials = Mapping[str, Material]


def far_face(case: Case) -> float:
    """Where the rod that strikes ends away from the member, m (0 or less): its struck face lies on the member at 0."""
    return -sum(s.length for s in case.ram_segments)


def place_of(case: Case, gauge: Gauge) -> float:
    """Place of a gauge along the axis of the member, m. On a rod that strikes, its position runs from the far face."""
    return gauge.position if gauge.on == "member" else far_face(case) + gauge.position


def section_at(segment: Segment, share: float) -> AnySection:
    """The section at `share` (0 to 1) of the segment's length: dimensions linear between the two ends."""
    if segment.end_section is None or share <= 0:
        return segment.section
    if share >= 1:
        return segment.end_section
    first, last = segment.section.model_dump(), segment.end_section.model_dump()
    between = {
        key: value if isinstance(value, str) else value + (last[key] - value) * share
        for key, value in first.items()
    }
    return type(segment.section).model_validate(between)


def axial_stiffness(section: AnySection, material: Material, materials: Materials) -> float:
    """EA of a section, N; pipe and fill add."""
    stiffness = material.young_modulus * section.area
    if section.shape == "filled_pipe":
        stiffness += materials[section.fill].young_modulus * section.fill_area
    return stiffness


def mass_per_length(section: AnySection, material: Material, materials: Materials) -> float:
    """rho A of a section, kg/m; pipe and fill add."""
    mass = material.density * section.area
    if section.shape == "filled_pipe":
        mass += materials[section.fill].density * section.fill_area
    return mass


def impedance(segment: Segment, materials: Materials, share: float = 0.0) -> float:
    """Z = sqrt(EA rho A) at `share` of the segment's length, N·s/m (thin rod; Kolsky 1963)."""
    section, material = section_at(segment, share), materials[segment.material]
    return sqrt(axial_stiffness(section, material, materials) * mass_per_length(section, material, materials))


def wave_speed(segment: Segment, materials: Materials, share: float = 0.0) -> float:
    """c = sqrt(EA / rho A) at `share` of the segment's length, m/s (thin rod; Kolsky 1963)."""
    section, material = section_at(segment, share), materials[segment.material]
    return sqrt(axial_stiffness(section, material, materials) / mass_per_length(section, material, materials))


def travel_time(segment: Segment, materials: Materials) -> float:
    """Time that a wave needs through the segment, s: L/c, or the integral of dx/c where c varies (tapered fill)."""
    return _stretch(segment, 0.0, 1.0, materials)


def _stretch(segment: Segment, first: float, last: float, materials: Materials) -> float:
    """Time through a part of a segment, s, given by shares of its length."""
    length = segment.length * (last - first)
    if segment.end_section is None or segment.section.shape != "filled_pipe":
        return length / wave_speed(segment, materials)
    points = 32  # Simpson's rule; c varies smoothly and little along a taper, so that 32 panels give 1e-9
    weights = [1 if i in (0, points) else 4 if i % 2 else 2 for i in range(points + 1)]
    slowness = sum(
        w / wave_speed(segment, materials, first + (last - first) * i / points) for i, w in enumerate(weights)
    )
    return length * slowness / (3 * points)


def segment_mass(segment: Segment, materials: Materials) -> float:
    """Mass of a segment, kg. Simpson's rule, exact because areas are quadratic along a linear taper."""
    material = materials[segment.material]
    top, middle, bottom = (
        mass_per_length(section_at(segment, share), material, materials) for share in (0.0, 0.5, 1.0)
    )
    return segment.length * (top + 4 * middle + bottom) / 6


def ram_mass(load: Drop, materials: Materials) -> float:
    """Mass of the ram, kg, as given or from its segments."""
    if load.ram_mass is not None:
        return load.ram_mass
    assert load.ram is not None
    return sum(segment_mass(segment, materials) for segment in load.ram.segments)


def impact_velocity(load: Drop, materials: Materials) -> float:
    """Velocity of the ram as it strikes, m/s: sqrt(2 g h efficiency), sqrt(2 energy / mass), or as given."""
    if load.impact_velocity is not None:
        return load.impact_velocity
    if load.energy is not None:
        return sqrt(2 * load.energy / ram_mass(load, materials))
    assert load.drop_height is not None
    assert load.efficiency is not None
    return sqrt(2 * GRAVITY * load.drop_height * load.efficiency)


def impact_energy(load: Drop, materials: Materials) -> float:
    """Kinetic energy of the ram as it strikes, m v^2/2, J."""
    return ram_mass(load, materials) * impact_velocity(load, materials) ** 2 / 2


def height_for_velocity(velocity: float, efficiency: float = 1.0) -> float:
    """Drop height that gives an impact velocity, v^2/(2 g efficiency), m."""
    return velocity**2 / (2 * GRAVITY * efficiency)


def shaft_resistance(case: Case) -> float:
    """Static resistance along the whole shaft, N: the total as given, or the sum of the layers."""
    ground = case.ground
    if ground is None:
        return 0.0
    if ground.shaft_total is not None:
        return ground.shaft_total.resistance
    return sum(layer_resistances(case))


def layer_resistances(case: Case) -> tuple[float, ...]:
    """Static shaft resistance of each layer, N: unit resistance times perimeter, integrated along the member.

    The perimeter is the outer one, and `inner_share` of the inner one for open pipes. What lies below the member's
    end resists nothing. Simpson's rule on each stretch, exact because both factors are linear there.
    """
    ground = case.ground
    if ground is None:
        return ()
    totals = []
    top = ground.surface
    for layer in ground.layers:
        bottom_value = layer.unit_resistance_bottom
        slope = 0.0 if bottom_value is None else (bottom_value - layer.unit_resistance) / layer.thickness
        total = 0.0
        for start, segment in _segments_with_start(case):
            a, b = max(top, start), min(top + layer.thickness, start + segment.length)
            if b <= a:
                continue
            values = [
                (layer.unit_resistance + slope * (x - top))
                * _rubbing_perimeter(segment, (x - start) / segment.length, ground)
                for x in (a, (a + b) / 2, b)
            ]
            total += (b - a) * (values[0] + 4 * values[1] + values[2]) / 6
        totals.append(total)
        top += layer.thickness
    return tuple(totals)


def energy_returned(cushion: Cushion) -> float:
    """Share of the energy put into a cushion that it gives back, e^2 (E. A. L. Smith 1960, from memory)."""
    return cushion.restitution**2


def segment_at(case: Case, position: float, side: Literal["near", "far"] = "near") -> tuple[Segment, float]:
    """The member's segment at a distance from the struck end, m, and the share of its length there.

    At the joint of two segments `side` decides, as for a gauge: the one nearer to the struck end, or the other.
    """
    for start, segment in _segments_with_start(case):
        end = start + segment.length
        if position < end or (position == end and side == "near"):
            return segment, max(0.0, position - start) / segment.length
    return case.member.segments[-1], 1.0


def time_between(case: Case, first: float, last: float) -> float:
    """Time that a wave needs along the member from one distance to another (m, `first` the smaller), s."""
    total = 0.0
    for start, segment in _segments_with_start(case):
        a, b = max(first, start), min(last, start + segment.length)
        if b > a:
            shares = (a - start) / segment.length, (b - start) / segment.length
            total += _stretch(segment, *shares, case.materials)
    return total


def resistance_split(total: float, toe_share: float) -> tuple[float, float]:
    """Shaft and toe resistance, N, from their total and the toe's share of it (0 to 1)."""
    return total * (1 - toe_share), total * toe_share


def _segments_with_start(case: Case) -> Iterator[tuple[float, Segment]]:
    start = 0.0
    for segment in case.member.segments:
        yield start, segment
        start += segment.length


def _rubbing_perimeter(segment: Segment, share: float, ground: Ground) -> float:
    section = section_at(segment, share)
    return section.perimeter + ground.inner_share * section.inner_perimeter
