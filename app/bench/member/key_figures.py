"""The one key figure of each part, as short text for its row in the outline."""

from __future__ import annotations

from app.units import NO_BREAK, Units
from solver import Case, Project
from solver.model import derived
from solver.model.load import Cushion, Drop, History, Pulse, Striker
from solver.model.material import Material
from solver.model.member import Segment
from solver.model.project import Gauge
from solver.model.section import AnySection

NOTHING = "none"


def case_load_figure(case: Case, units: Units) -> str:
    """ "4.0 t, falls 1.20 m", or what else tells the blow best."""
    load = case.load
    if isinstance(load, Drop):
        mass = units.show(derived.ram_mass(load, case.materials), "mass")
        if load.drop_height is not None:
            return f"{mass}, falls {units.show(load.drop_height, 'length')}"
        if load.energy is not None:
            return f"{mass}, {units.show(load.energy, 'energy')}"
        return f"{mass} at {units.show(load.impact_velocity or 0.0, 'velocity')}"
    if isinstance(load, Striker):
        length = sum(segment.length for segment in load.segments)
        return f"{units.show(length, 'length')} at {units.show(load.velocity, 'velocity')}"
    if isinstance(load, Pulse):
        return f"{units.show(load.peak, load.quantity)}, {units.show(load.duration, 'time')}"
    if isinstance(load, History):
        lasts = load.samples.times[-1] - load.samples.times[0]
        return f"{len(load.samples.times)} points, {units.show(lasts, 'time')}"
    return f"starts at {units.show(case.run.initial_velocity or 0.0, 'velocity')}"


def cushion_figure(cushion: Cushion | None, units: Units) -> str:
    """Its stiffness while loading."""
    return NOTHING if cushion is None else units.show(cushion.loading_stiffness, "stiffness")


def segment_figure(segment: Segment, units: Units) -> str:
    """ "16.0 m, 610 × 16 mm": its length and what the section is bought by."""
    size = section_size(segment.section, units)
    if segment.end_section is not None:
        size = f"{size} to {section_size(segment.end_section, units)}"
    return f"{units.show(segment.length, 'length')}, {size}"


def section_size(section: AnySection, units: Units) -> str:
    """The dimensions as they are called on site, the unit once: "610 × 16 mm", "Ø 50 mm"."""

    def size(before: str, *values: float) -> str:
        numbers = " × ".join(f"{units.number(value, 'small_length'):.4g}" for value in values)
        return f"{before}{numbers}{NO_BREAK}{units.unit('small_length')}"

    match section.shape:
        case "pipe" | "filled_pipe":
            return size("", section.outer_diameter, section.wall)
        case "solid_round":
            return size("Ø ", section.diameter)
        case "rectangle":
            return size("", section.width, section.depth)
        case "octagon":
            return size("octagon ", section.across_flats)
        case "h":
            return size("H ", section.depth, section.flange_width)
        case "voided_square":
            return size("□ ", section.width)
        case _:
            return units.show(section.area, "area")


def ground_figure(case: Case, units: Units) -> str:
    """Number of layers and their shaft resistance."""
    ground = case.ground
    if ground is None:
        return NOTHING
    total = units.show(derived.shaft_resistance(case), "force")
    if ground.shaft_total is not None:
        return f"shaft {total}"
    if not ground.layers:
        return "no layers"
    return f"{_count(len(ground.layers), 'layer')}, {total}"


def layer_figure(case: Case, index: int, units: Units) -> str:
    """Thickness and resistance of one layer."""
    assert case.ground is not None
    thickness = units.show(case.ground.layers[index].thickness, "length")
    return f"{thickness}, {units.show(derived.layer_resistances(case)[index], 'force')}"


def far_end_figure(case: Case, units: Units) -> str:
    """What holds the far end, with its figure."""
    end = case.far_end
    match end.kind:
        case "ground":
            toe = case.ground.toe if case.ground else None
            if toe is None:
                return NOTHING
            resistance = units.show(toe.resistance, "force")
            return f"{resistance}, quake {units.show(toe.quake, 'small_length')}" if toe.quake else resistance
        case "spring":
            return f"spring {units.show(end.stiffness, 'stiffness')}"
        case "dashpot":
            return f"dashpot {units.show(end.coefficient, 'impedance')}"
        case "wall":
            return f"wall, gap {units.show(end.gap, 'small_length')}" if end.gap else "rigid wall"
        case "matched":
            return "goes on for ever"
        case _:
            return end.kind


def gauges_figure(case: Case) -> str:
    """Their names."""
    return ", ".join(gauge.name for gauge in case.gauges) or NOTHING


def gauge_figure(gauge: Gauge, units: Units) -> str:
    """Where it stands."""
    place = units.show(gauge.position, "length")
    return place if gauge.on == "member" else f"{place} on the {gauge.on}"


def attachments_figure(case: Case, units: Units) -> str:
    """How many, or the value of the only one."""
    attachments = case.member.attachments
    if len(attachments) != 1:
        return _count(len(attachments), "attachment") if attachments else NOTHING
    only = attachments[0]
    dimension = {"mass": "mass", "spring": "stiffness", "dashpot": "impedance"}[only.kind]
    return f"{only.kind} {units.show(only.value, dimension)}"


def run_figure(case: Case, units: Units) -> str:
    """How long it lasts, and how many blows where there are several."""
    run = case.run
    lasts = "until at rest" if run.duration is None else units.show(run.duration, "time")
    if run.blows == 1:
        return lasts
    blows = f"{run.blows} blows" if isinstance(run.blows, int) else "until the set repeats"
    return f"{blows}, {lasts}" if isinstance(run.blows, int) else blows


def materials_figure(project: Project) -> str:
    """Their names."""
    return ", ".join(material.name for material in project.materials) or NOTHING


def material_figure(material: Material, units: Units) -> str:
    """Its wave speed."""
    return units.show(material.wave_speed, "velocity")


def _count(number: int, what: str) -> str:
    return f"{number} {what}" if number == 1 else f"{number} {what}s"
