"""What follows from a part, as short lines under its form: every figure from `solver.model.derived`."""

from __future__ import annotations

import re
from collections.abc import Callable
from dataclasses import dataclass

from app.bench.forms.remarks import remarks
from app.limit_words import limit_lines
from app.units import Units
from app.words import LOAD_CAUTION, caution
from solver import Case, Project
from solver.answer.cautions import cautions_of
from solver.model import derived
from solver.model.load import Cushion, Drop, History, Striker
from solver.model.member import Segment

Lines = list[str]


@dataclass(frozen=True)
class Seen:
    """What the lines are made from."""

    project: Project
    case: Case
    units: Units


def derived_lines(project: Project, case: Case, units: Units, pointer: str) -> Lines:
    """Lines for a part by its pointer, none where nothing follows."""
    seen = Seen(project, case, units)
    entry = re.fullmatch(r"(.*)/(\d+)", pointer)
    if entry and entry.group(1) in OF_ENTRIES:
        return OF_ENTRIES[entry.group(1)](seen, int(entry.group(2)))
    return OF_PARTS[pointer](seen) if pointer in OF_PARTS else []


def caution_lines(case: Case, units: Units, pointer: str) -> Lines:
    """Cautions that the part itself gives reason for."""
    also = {"far_end": "ground/toe", "ground": "ground/shaft_total"}.get(pointer, pointer)
    material = (
        list(case.materials)[int(pointer.rpartition("/")[2])]
        if pointer.startswith("/mat") and pointer[-1].isdecimal()
        else None
    )
    found = [
        caution(c, units)
        for c in cautions_of(case)
        if c.pointer in (pointer, also) or (c.name == material and c.kind in ("wave_speed", "static_modulus"))
    ]
    if pointer == "load" and isinstance(case.load, Drop):
        found.append(LOAD_CAUTION)
    found += remarks(case, units, pointer)
    return found


def _load(seen: Seen) -> Lines:
    load, case, units = seen.case.load, seen.case, seen.units
    if isinstance(load, Drop):
        velocity = derived.impact_velocity(load, case.materials)
        energy = derived.impact_energy(load, case.materials)
        lines = [f"Strikes at {units.show(velocity, 'velocity')} with {units.show(energy, 'energy')}"]
        if load.ram is not None:
            lines.append(f"Mass {units.show(derived.ram_mass(load, case.materials), 'mass')}")
        if load.drop_height is None:
            height = derived.height_for_velocity(velocity)
            lines.append(f"As from a free fall of {units.show(height, 'length')}")
        return lines
    if isinstance(load, Striker):
        mass = sum(derived.segment_mass(s, case.materials) for s in load.segments)
        twice = 2 * sum(derived.travel_time(s, case.materials) for s in load.segments)
        return [
            f"Mass {units.show(mass, 'mass')}",
            f"A wave runs along it and back in {units.show(twice, 'time')}",
        ]
    if isinstance(load, History):
        values = load.samples.values
        low, high = (
            units.show(float(values.min()), load.quantity),
            units.show(float(values.max()), load.quantity),
        )
        return [f"From {low} to {high}"]
    return []


def _cushion(cushion: Cushion | None, units: Units) -> Lines:
    if cushion is None:
        return []
    loading = units.show(cushion.loading_stiffness, "stiffness")
    unloading = units.show(cushion.unloading_stiffness, "stiffness")
    back = f"{100 * derived.energy_returned(cushion):.0f} %"
    return [f"Stiffness {loading}, {unloading} on unloading", f"Gives back {back} of the energy put into it"]


def _train_cushion(field: str) -> Callable[[Seen], Lines]:
    def lines(seen: Seen) -> Lines:
        load = seen.case.load
        return _cushion(getattr(load, field), seen.units) if isinstance(load, Drop) else []

    return lines


def segment_lines(segment: Segment, case: Case, units: Units) -> Lines:
    """Area, impedance and travel time; both ends where it tapers."""
    materials = case.materials

    def ends(value: Callable[[float], float], dimension: str) -> str:
        first = units.show(value(0.0), dimension)
        return first if segment.end_section is None else f"{first} to {units.show(value(1.0), dimension)}"

    area = ends(lambda share: derived.section_at(segment, share).area, "area")
    impedance = ends(lambda share: derived.impedance(segment, materials, share), "impedance")
    time = units.show(derived.travel_time(segment, materials), "time")
    mass = units.show(derived.segment_mass(segment, materials), "mass")
    speed = units.show(derived.wave_speed(segment, materials), "velocity")
    return [f"Area {area}, mass {mass}", f"Impedance {impedance}", f"A wave passes in {time}, at {speed}"]


def _segment(seen: Seen, index: int) -> Lines:
    return segment_lines(seen.case.member.segments[index], seen.case, seen.units)


def _rod_segment(seen: Seen, index: int) -> Lines:
    return segment_lines(seen.case.ram_segments[index], seen.case, seen.units)


def _ground(seen: Seen) -> Lines:
    ground, units = seen.case.ground, seen.units
    if ground is None:
        return []
    shaft = derived.shaft_resistance(seen.case)
    lines = [f"Shaft resistance {units.show(shaft, 'force')}"]
    if ground.toe is not None:
        total = shaft + ground.toe.resistance
        lines.append(f"With the toe {units.show(total, 'force')}")
    length = seen.case.member.length
    if ground.layers and ground.surface + sum(layer.thickness for layer in ground.layers) < length * (
        1 - 1e-9
    ):
        bottom = ground.surface + sum(layer.thickness for layer in ground.layers)
        lines.append(
            f"No resistance between {units.show(bottom, 'length')} and the far end at {units.show(length, 'length')}"
        )
    return lines


def _layer(seen: Seen, index: int) -> Lines:
    ground, units = seen.case.ground, seen.units
    assert ground is not None
    top = ground.surface + sum(layer.thickness for layer in ground.layers[:index])
    bottom = top + ground.layers[index].thickness
    lines = [f"From {units.show(top, 'length')} to {units.show(bottom, 'length')} below the struck end"]
    level = ground.level_of_struck_end
    if level is not None:
        lines.append(
            f"Elevation {units.show(level - top, 'length')} to {units.show(level - bottom, 'length')}"
        )
    resistance = units.show(derived.layer_resistances(seen.case)[index], "force")
    return [*lines, f"Shaft resistance {resistance}"]


def _gauge(seen: Seen, index: int) -> Lines:
    case, units = seen.case, seen.units
    gauge = case.gauges[index]
    if gauge.on != "member":
        return []
    segment, share = derived.segment_at(case, gauge.position, gauge.side)
    impedance = derived.impedance(segment, case.materials, share)
    to_far_end = derived.time_between(case, gauge.position, case.member.length)
    return [
        f"In {segment.name}, impedance {units.show(impedance, 'impedance')}",
        f"To the far end and back in {units.show(2 * to_far_end, 'time')}",
    ]


def _run(seen: Seen) -> Lines:
    case, units = seen.case, seen.units
    passage = derived.time_between(case, 0.0, case.member.length)
    return [f"A wave runs along the member and back in {units.show(2 * passage, 'time')}"]


def _material(seen: Seen, index: int) -> Lines:
    material, units = seen.project.materials[index], seen.units
    used = [
        segment.name
        for case in seen.project.cases
        for segment in (*case.member.segments, *case.ram_segments)
        if material.name in (segment.material, getattr(segment.section, "fill", None))
    ]
    names = ", ".join(dict.fromkeys(used)) or "nothing"
    return [
        f"Wave speed {units.show(material.wave_speed, 'velocity')}",
        f"E {units.show(material.young_modulus, 'modulus')}, density {units.show(material.density, 'density')}",
        f"Used by {names}",
        *limit_lines(material, units),
    ]


OF_PARTS: dict[str, Callable[[Seen], Lines]] = {
    "load": _load,
    "load/cushion": _train_cushion("cushion"),
    "load/pile_cushion": _train_cushion("pile_cushion"),
    "ground": _ground,
    "run": _run,
}
OF_ENTRIES: dict[str, Callable[[Seen, int], Lines]] = {
    "member/segments": _segment,
    "load/segments": _rod_segment,
    "load/ram/segments": _rod_segment,
    "ground/layers": _layer,
    "gauges": _gauge,
    "/materials": _material,
}
