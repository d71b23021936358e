"""What a person described, as rows of tables: labels from the model's declarations, numbers in the units shown."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from pydantic import BaseModel

from app.report.blocks import Table
from app.tree import parts_of
from app.units import NO_BREAK, Units
from solver import Case, Project
from solver.model import derived
from solver.model.load import Cushion
from solver.model.member import Segment
from solver.model.quantity import quantity_of

Row = tuple[str, ...]
#: Shapes whose dimensions are told by the labels of their fields.
UNTOLD = (
    "name",
    "kind",
    "shape",
    "section",
    "end_section",
    "joint_above",
    "segments",
    "ram",
    "times",
    "values",
)


#: Numbers are told with as few digits as stay this near to them, as a share; six at most.
NEAR = 5e-5


def exact(value: float, dimension: str, units: Units) -> str:
    """A number as it was given, with its unit. Digits that only come from changing units are left out."""
    unit = units.unit(dimension, value)
    number = float(units.number(value, dimension, value))
    short = next(
        (s for s in (float(f"{number:.{n}g}") for n in (3, 4, 5)) if abs(s - number) <= NEAR * abs(number)),
        number,
    )
    text = units.text(value * (short / number) if number else value, dimension, value)
    return f"{text}{NO_BREAK}{unit}" if unit else text


def as_given(project: Project, pointer: str, units: Units) -> tuple[str, str]:
    """The label of the value at a JSON pointer, and the value, in the units shown where it is a declared quantity."""
    node: Any = project
    parent, name = node, ""
    for part in parts_of(pointer):
        parent, name = node, part
        node = node[int(part)] if isinstance(node, tuple) and part.isdecimal() else getattr(node, part, None)
    quantity = None
    if isinstance(parent, BaseModel) and name in type(parent).model_fields:
        quantity = quantity_of(type(parent), name)
    label = quantity.label if quantity else name.replace("_", " ")
    if isinstance(node, int | float) and not isinstance(node, bool):
        return label, exact(node, quantity.dimension if quantity else "none", units)
    return label, "–" if isinstance(node, BaseModel) or node is None else str(node).replace("_", " ")


def rows_of(part: BaseModel, units: Units, dimension: str = "none") -> Iterator[tuple[str, str]]:
    """Label and value of every field that was given; `dimension` is that of fields whose own depends on others."""
    for name in type(part).model_fields:
        value = getattr(part, name)
        if name in UNTOLD or value is None:
            continue
        quantity = quantity_of(type(part), name)
        label = quantity.label if quantity else name.replace("_", " ").capitalize()
        if isinstance(value, bool):
            yield label, "yes" if value else "no"
        elif isinstance(value, int | float):
            own = quantity.dimension if quantity else "none"
            yield (
                label,
                exact(value, dimension if own == "none" and name in ("peak", "value") else own, units),
            )
        elif isinstance(value, str):
            yield label, value.replace("_", " ")


def in_one_line(part: BaseModel, units: Units, dimension: str = "none") -> str:
    """The fields of a part, one after the other: "outer diameter 610 mm, wall 16.0 mm"."""
    return ", ".join(
        f"{label[:1].lower()}{label[1:]} {text}" for label, text in rows_of(part, units, dimension)
    )


def segment_table(segments: tuple[Segment, ...], case: Case, units: Units, caption: str) -> Table:
    """Length, section, material and joint of each segment, with what follows from them."""
    rows = []
    for segment in segments:
        section = f"{segment.section.shape.replace('_', ' ')}: {in_one_line(segment.section, units)}"
        if segment.end_section is not None:
            section += f"; at its far end {in_one_line(segment.end_section, units)}"
        joint = segment.joint_above
        if joint.kind != "bonded":
            section += f"; joint above: {joint.kind.replace('_', ' ')}, {in_one_line(joint, units)}"
        rows.append(
            (
                segment.name,
                exact(segment.length, "length", units),
                section,
                segment.material,
                units.show(derived.section_at(segment, 0).area, "area"),
                units.show(derived.impedance(segment, case.materials), "impedance"),
                units.show(derived.wave_speed(segment, case.materials), "velocity"),
            )
        )
    head = ("Segment", "Length", "Section", "Material", "Area", "Impedance", "Wave speed")
    return Table(head, tuple(rows), (0.14, 0.1, 0.28, 0.14, 0.1, 0.13, 0.11), caption)


def material_table(project: Project, units: Units) -> Table:
    """Stiffness, density, law and limits of each material."""
    rows = []
    for material in project.materials:
        limits = []
        for sign in ("compression", "tension"):
            value = material.limits.value(sign)
            limits.append("none given" if value is None else exact(value, "stress", units))
        law = material.law.kind.replace("_", " ")
        told = in_one_line(material.law, units)
        rows.append(
            (
                material.name,
                exact(material.young_modulus, "modulus", units),
                exact(material.density, "density", units),
                units.show(material.wave_speed, "velocity"),
                f"{law}, {told}" if told else law,
                *limits,
            )
        )
    head = (
        "Material",
        "Young's modulus",
        "Density",
        "Wave speed",
        "Law",
        "Compression limit",
        "Tension limit",
    )
    return Table(head, tuple(rows), (0.18, 0.13, 0.13, 0.12, 0.18, 0.13, 0.13), "Materials")


def load_rows(case: Case, units: Units) -> tuple[Row, ...]:
    """The blow, with its train."""
    load = case.load
    dimension = getattr(load, "quantity", "none")
    rows: list[Row] = [("Kind", load.kind.replace("_", " ")), *rows_of(load, units, dimension)]
    if load.kind == "drop":
        velocity, energy = (
            derived.impact_velocity(load, case.materials),
            derived.impact_energy(load, case.materials),
        )
        rows.append(("Velocity as it strikes", units.show(velocity, "velocity")))
        rows.append(("Kinetic energy as it strikes", units.show(energy, "energy")))
        rows += _cushion("Cushion", load.cushion, units) + _cushion("Pile cushion", load.pile_cushion, units)
    elif load.kind == "history":
        samples = load.samples
        rows.append(("Points", str(len(samples.times))))
        rows.append(("Lasts", units.show(float(samples.times[-1] - samples.times[0]), "time")))
        rows.append(("Largest value", exact(float(samples.values.max()), load.quantity, units)))
    if case.run.initial_velocity is not None:
        rows.append(("Initial velocity of the member", exact(case.run.initial_velocity, "velocity", units)))
    return tuple(rows)


def _cushion(word: str, cushion: Cushion | None, units: Units) -> list[Row]:
    if cushion is None:
        return [(word, "none")]
    loading = units.show(cushion.loading_stiffness, "stiffness")
    return [(word, f"{in_one_line(cushion, units)} (loading stiffness {loading})")]


def ground_tables(case: Case, units: Units) -> Iterator[Table]:
    """Layers or total, and the toe."""
    ground = case.ground
    if ground is None:
        return
    if ground.layers:
        rows, top = [], ground.surface
        resistances = derived.layer_resistances(case)
        for layer, resistance in zip(ground.layers, resistances, strict=True):
            bottom = layer.unit_resistance_bottom
            unit = exact(layer.unit_resistance, "unit_resistance", units)
            rows.append(
                (
                    layer.name,
                    f"{exact(top, 'length', units)} to {exact(top + layer.thickness, 'length', units)}",
                    unit if bottom is None else f"{unit} to {exact(bottom, 'unit_resistance', units)}",
                    units.show(resistance, "force"),
                    _resistance(layer, units),
                )
            )
            top += layer.thickness
        head = ("Layer", "From the struck end", "Unit resistance", "Shaft resistance", "Quake and damping")
        yield Table(head, tuple(rows), (0.2, 0.2, 0.16, 0.14, 0.3), "Ground along the shaft")
    elif ground.shaft_total is not None:
        shaft = ground.shaft_total
        row: Row = (exact(shaft.resistance, "force", units), shaft.distribution, _resistance(shaft, units))
        yield Table(
            ("Shaft resistance", "Distribution", "Quake and damping"),
            (row,),
            (0.25, 0.25, 0.5),
            "Ground along the shaft",
        )
    if ground.toe is not None:
        toe = ground.toe
        total = units.show(derived.shaft_resistance(case) + toe.resistance, "force")
        row = (
            exact(toe.resistance, "force", units),
            exact(toe.gap, "small_length", units),
            _resistance(toe, units),
            total,
        )
        names = ("Toe resistance", "Gap", "Quake and damping", "Shaft and toe together")
        yield Table(names, (row,), (0.2, 0.14, 0.42, 0.24), "Ground under the toe")


def _resistance(part: BaseModel, units: Units) -> str:
    model = getattr(part, "model", None)
    if model is not None:
        return f"radiation: {in_one_line(model, units)}"
    told = [f"quake {exact(part.quake, 'small_length', units)}"]  # type: ignore[attr-defined]
    told.append(f"damping {exact(part.damping, 'smith_damping', units)} ({part.law})")  # type: ignore[attr-defined]
    if getattr(part, "exponent", None) is not None:
        told.append(f"exponent {part.exponent:g}")  # type: ignore[attr-defined]
    return ", ".join(told)


def gauge_table(case: Case, units: Units) -> Table:
    """Where each gauge stands."""
    rows = []
    for gauge in case.gauges:
        to_end = "–"
        if gauge.on == "member":
            to_end = units.show(2 * derived.time_between(case, gauge.position, case.member.length), "time")
        rows.append(
            (gauge.name, f"the {gauge.on}", exact(gauge.position, "length", units), gauge.side, to_end)
        )
    head = (
        "Gauge",
        "On",
        "Position, from the end where its rod begins",
        "Side of a jump",
        "To the far end and back",
    )
    return Table(head, tuple(rows), (0.28, 0.14, 0.24, 0.14, 0.2), "Gauges")
