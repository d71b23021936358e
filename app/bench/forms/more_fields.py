"""Rows that show a value in another way than the file holds it: elevations, shares, names."""

from __future__ import annotations

from collections.abc import Callable

from pydantic import BaseModel

from app.bench.forms.limit_rows import limit_rows
from app.bench.forms.material_rows import material_rows
from app.bench.forms.meanings import OF_FIELDS
from app.bench.forms.spec import Context, NumberSpec, PointsSpec, Spec, TextSpec, Tree
from app.provenance import forget
from app.tree import value_at
from solver.model import derived
from solver.model.load import History, Pulse
from solver.model.material import Material
from solver.model.member import Attachment, Member, Segment
from solver.model.project import Gauge
from solver.model.quantity import Bounds
from solver.model.section import FilledPipe
from solver.model.surroundings import Ground, ShaftTotal

Rows = Callable[[Context, str], list[Spec]]


def _position_rows(field: str) -> Rows:
    """A distance from the struck end as an elevation too, where the level of the struck end is given."""

    def rows(context: Context, pointer: str) -> list[Spec]:
        ground = context.case.ground
        level = ground.level_of_struck_end if ground else None
        on = value_at(context.tree, f"{pointer}/on")
        if level is None or on not in (None, "member"):
            return []
        distance = value_at(context.tree, f"{pointer}/{field}")

        def write(tree: Tree, elevation: float | None) -> None:
            value_at(tree, pointer)[field] = None if elevation is None else level - elevation

        return [
            NumberSpec(
                f"{pointer}/{field}#elevation",
                "Elevation",
                "The same place, as a level.",
                value=level - distance,
                dimension="length",
                write=write,
            )
        ]

    return rows


def _surface_rows(context: Context, pointer: str) -> list[Spec]:
    length = context.case.member.length

    def write(tree: Tree, penetration: float | None) -> None:
        value_at(tree, pointer)["surface"] = None if penetration is None else length - penetration

    penetration = NumberSpec(
        f"{pointer}/surface#penetration",
        "Penetration",
        "Length of the member below the ground surface.",
        value=length - value_at(context.tree, f"{pointer}/surface"),
        dimension="length",
        bounds=Bounds(at_least=0.0, at_most=length),
        write=write,
    )
    return [penetration, *_position_rows("surface")(context, pointer)]


def _total_rows(context: Context, pointer: str) -> list[Spec]:
    """Shaft and toe together, and the toe's share of it."""
    ground = pointer.rsplit("/", 1)[0]
    shaft, toe = value_at(context.tree, f"{pointer}/resistance"), value_at(context.tree, f"{ground}/toe")
    if not toe or shaft + toe["resistance"] <= 0:
        return []
    total = shaft + toe["resistance"]
    share = toe["resistance"] / total

    def put(tree: Tree, new_total: float, new_share: float) -> None:
        values = value_at(tree, ground)
        values["shaft_total"]["resistance"], values["toe"]["resistance"] = derived.resistance_split(
            new_total, new_share
        )
        forget(tree, f"{ground}/toe/resistance")

    return [
        NumberSpec(
            f"{pointer}/resistance#total",
            "With the toe",
            "Resistance of shaft and toe together; the toe keeps its share.",
            value=total,
            dimension="force",
            bounds=Bounds(above=0.0),
            write=lambda tree, value: put(tree, value or 0.0, share),
        ),
        NumberSpec(
            f"{pointer}/resistance#share",
            "Toe's share",
            "Share of the toe in the resistance of shaft and toe together, 0 to 1; '30 %' is understood.",
            value=share,
            bounds=Bounds(at_least=0.0, at_most=1.0),
            write=lambda tree, value: put(tree, total, value or 0.0),
        ),
    ]


def _material_name(context: Context, pointer: str) -> list[Spec]:
    old = value_at(context.tree, f"{pointer}/name")

    def write(tree: Tree, name: str) -> None:
        value_at(tree, pointer)["name"] = name
        for case in tree["cases"]:
            _rename(case, old, name)

    return [TextSpec(f"{pointer}/name", "Name", OF_FIELDS[(Material, "name")], value=old, write=write)]


def _rename(node: object, old: str, new: str) -> None:
    """Every segment and fill that names the material follows its new name."""
    if isinstance(node, list):
        for inner in node:
            _rename(inner, old, new)
    elif isinstance(node, dict):
        for key, inner in node.items():
            if key in ("material", "fill") and inner == old:
                node[key] = new
            else:
                _rename(inner, old, new)


def _points(context: Context, pointer: str) -> list[Spec]:
    load = context.case.load
    assert isinstance(load, History)
    quantity = "force in N" if load.quantity == "force" else "velocity in m/s"
    return [
        PointsSpec(
            f"{pointer}/times",
            "Points",
            f"Time in s and {quantity} in two columns, linear between points and zero outside.",
            count=len(load.samples.times),
        )
    ]


def _is_upper_end(context: Context, pointer: str) -> bool:
    return not pointer.endswith("/end_section")


def _is_velocity(context: Context, pointer: str) -> bool:
    return bool(value_at(context.tree, f"{pointer}/quantity") == "velocity")


#: Fields that are shown only where they mean something.
ONLY_IF: dict[tuple[type[BaseModel], str], Callable[[Context, str], bool]] = {
    (Pulse, "release"): _is_velocity,
    (History, "release"): _is_velocity,
    (FilledPipe, "fill"): _is_upper_end,
    (Segment, "joint_above"): lambda context, pointer: not pointer.endswith("/segments/0"),
    (Gauge, "on"): lambda context, pointer: bool(context.case.ram_segments),
}
#: Rows in place of a field's own.
INSTEAD: dict[tuple[type[BaseModel], str], Rows] = {
    (Material, "name"): _material_name,
    (Material, "young_modulus"): material_rows,
    (Material, "limits"): limit_rows,
    (History, "times"): _points,
    (Member, "segments"): lambda context, pointer: [],
}
#: Rows behind a field's own.
MORE: dict[tuple[type[BaseModel], str], Rows] = {
    (Gauge, "position"): _position_rows("position"),
    (Attachment, "position"): _position_rows("position"),
    (Ground, "surface"): _surface_rows,
    (ShaftTotal, "resistance"): _total_rows,
}
