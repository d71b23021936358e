"""Choices of segments, materials and attachments."""

from __future__ import annotations

from app.bench.forms.chooser import Chooser, Choosers, new_kind, options, options_of_union, start_value
from app.bench.forms.kinds import KINDS
from app.bench.forms.spec import Context, Option, Tree
from solver.model.material import Material
from solver.model.member import Attachment, Member, Segment


def _change_section(segment: Tree, key: str, context: Context) -> None:
    old = segment["section"]
    segment["end_section"] = None
    if key == "custom":
        of_case = (*context.case.member.segments, *context.case.ram_segments)
        section = next(s.section for s in of_case if s.name == segment["name"])
        segment["section"] = {"shape": "custom", "area": section.area, "perimeter": section.perimeter}
        return
    new = start_value(Segment, "section", key, context)
    width = next((old[k] for k in WIDTHS if k in old), None)
    if width is not None:
        scale = width / next(new[k] for k in WIDTHS if k in new)
        new = {k: v * scale if isinstance(v, float) else v for k, v in new.items()}
    segment["section"] = new | {k: v for k, v in old.items() if k in new and k != "shape"}


#: The dimension that says how wide a section is; a change of shape keeps it.
WIDTHS = ("outer_diameter", "diameter", "across_flats", "width", "depth")


def _change_taper(segment: Tree, key: str, context: Context) -> None:
    segment["end_section"] = dict(segment["section"]) if key == "tapered" else None


def _change_attachment(part: Tree, key: str, context: Context) -> None:
    part.update(kind=key, value=KINDS[(Member, "attachments")][key].value["value"])


OF_MEMBER: Choosers = {
    (Segment, "section"): Chooser(
        "Section",
        options_of_union(Segment, "section"),
        lambda segment: segment["section"]["shape"],
        _change_section,
        pick="section",
    ),
    (Segment, "end_section"): Chooser(
        "Along it",
        options(
            ("uniform", "uniform"), ("tapered", "tapers", "Dimensions change linearly to the lower end.")
        ),
        lambda segment: "tapered" if segment.get("end_section") else "uniform",
        _change_taper,
    ),
    (Segment, "joint_above"): Chooser(
        "Joint above",
        options_of_union(Segment, "joint_above"),
        lambda segment: segment["joint_above"]["kind"],
        new_kind(Segment, "joint_above"),
    ),
    (Material, "law"): Chooser(
        "Law",
        options_of_union(Material, "law"),
        lambda material: material["law"]["kind"],
        new_kind(Material, "law"),
    ),
    (Attachment, "kind"): Chooser(
        "Kind",
        tuple(Option(k, v.word.lower(), v.tells) for k, v in KINDS[(Member, "attachments")].items()),
        lambda part: part["kind"],
        _change_attachment,
    ),
}
