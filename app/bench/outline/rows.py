"""The rows of the outline, in the order in which the blow passes the parts, each with its one key figure."""

from __future__ import annotations

from dataclasses import dataclass

from app.bench.member.key_figures import (
    attachments_figure,
    case_load_figure,
    cushion_figure,
    far_end_figure,
    gauge_figure,
    gauges_figure,
    ground_figure,
    layer_figure,
    material_figure,
    materials_figure,
    run_figure,
    segment_figure,
)
from app.units import Units
from solver import Case, Project
from solver.model.load import Drop, Striker


@dataclass(frozen=True)
class Row:
    """One row. `pointer` is the selection that it stands for; `level` 1 is an entry of the group above it.

    `list_pointer` and `index` say which entry of which list it is, for adding, removing and moving.
    """

    pointer: str
    icon: str
    name: str
    figure: str = ""
    level: int = 0
    list_pointer: str = ""
    index: int = -1
    adds_to: str = ""


def rows_of(project: Project, case: Case, units: Units, selection: str) -> list[Row]:
    """All rows that are shown; the entries of a group only while the group or one of them is selected."""
    found = [*_load_rows(case, units, selection), *_segment_rows(case, units)]
    found += _ground_rows(case, units, selection)
    toe = case.far_end.kind == "ground"
    found.append(
        Row("far_end", "toe" if toe else "far_end", "Toe" if toe else "Far end", far_end_figure(case, units))
    )
    found += _group(
        selection,
        Row("gauges", "gauge", "Gauges", gauges_figure(case), adds_to="gauges"),
        [("gauge", gauge.name, gauge_figure(gauge, units)) for gauge in case.gauges],
    )
    attachments = case.member.attachments
    found += _group(
        selection,
        Row(
            "member/attachments",
            "attachment",
            "Attachments",
            attachments_figure(case, units),
            adds_to="member/attachments",
        ),
        [("attachment", a.kind.capitalize(), units.show(a.position, "length")) for a in attachments],
    )
    found.append(Row("run", "run", "Run", run_figure(case, units)))
    found += _group(
        selection,
        Row("/materials", "material", "Materials", materials_figure(project), adds_to="/materials"),
        [("material", material.name, material_figure(material, units)) for material in project.materials],
    )
    return found


def _load_rows(case: Case, units: Units, selection: str) -> list[Row]:
    load = case.load
    figure = case_load_figure(case, units)
    if isinstance(load, Drop):
        ram = Row("load", "ram", "Ram", figure, adds_to="load/ram/segments" if load.ram else "")
        parts = [("segment", s.name, segment_figure(s, units)) for s in load.ram.segments] if load.ram else []
        found = _group(selection, ram, parts, opened_by="load", within="load/ram/segments")
        found.append(Row("load/cushion", "cushion", "Cushion", cushion_figure(load.cushion, units)))
        cap = units.show(load.cap_mass, "mass") if load.cap_mass else "none"
        found.append(Row("load/cap_mass", "cap", "Drive cap", cap))
        pile = cushion_figure(load.pile_cushion, units)
        return [*found, Row("load/pile_cushion", "pile_cushion", "Pile cushion", pile)]
    if isinstance(load, Striker):
        striker = Row("load", "striker", "Striker", figure, adds_to="load/segments")
        parts = [("segment", s.name, segment_figure(s, units)) for s in load.segments]
        return _group(selection, striker, parts, opened_by="load", within="load/segments")
    name = {"pulse": "Pulse", "history": "History", "none": "No load"}[load.kind]
    return [Row("load", load.kind, name, figure)]


def _segment_rows(case: Case, units: Units) -> list[Row]:
    return [
        Row(
            f"member/segments/{i}",
            "taper" if segment.end_section else "segment",
            segment.name,
            segment_figure(segment, units),
            list_pointer="member/segments",
            index=i,
        )
        for i, segment in enumerate(case.member.segments)
    ]


def _ground_rows(case: Case, units: Units, selection: str) -> list[Row]:
    ground = case.ground
    adds = "ground/layers" if ground and ground.shaft_total is None else ""
    row = Row("ground", "ground", "Ground", ground_figure(case, units), adds_to=adds)
    layers = ground.layers if ground else ()
    return _group(
        selection,
        row,
        [("ground", layer.name, layer_figure(case, i, units)) for i, layer in enumerate(layers)],
        within="ground/layers",
    )


def _group(
    selection: str,
    head: Row,
    entries: list[tuple[str, str, str]],
    opened_by: str = "",
    within: str = "",
) -> list[Row]:
    """The head of a group, and its entries where the group is open."""
    within = within or head.pointer
    opened = selection in (opened_by or head.pointer, within) or selection.startswith(within + "/")
    if not opened:
        return [head]
    return [head] + [
        Row(f"{within}/{i}", icon, name, figure, level=1, list_pointer=within, index=i)
        for i, (icon, name, figure) in enumerate(entries)
    ]


def row_for(rows: list[Row], selection: str) -> Row | None:
    """The row that a selection means: its own, that of the toe, or that of the part around it."""
    wanted = ALIASES.get(selection, selection)
    by_pointer = {row.pointer: row for row in rows}
    while wanted:
        if wanted in by_pointer:
            return by_pointer[wanted]
        wanted = wanted.rpartition("/")[0]
    return by_pointer.get("load") if selection.startswith("load") else None


#: Selections that other pictures may make, and the rows that show them.
ALIASES = {
    "ground/toe": "far_end",
    "ground/shaft_total": "ground",
    "ground/layers": "ground",
    "load/ram": "load",
    "load/ram/segments": "load",
    "load/segments": "load",
    "member": "member/segments/0",
    "member/segments": "member/segments/0",
}
