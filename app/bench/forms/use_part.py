"""Copying an entry of the parts library into a project, with the marks that tell where its values came from."""

from __future__ import annotations

from typing import Any

from app.bench.forms.kinds import NO_SOURCE, SIZE
from app.parts_library import Part
from app.provenance import confirm, forget, forget_missing, mark_typical
from app.tree import copied, value_at

Tree = dict[str, Any]
#: Numbers that matter too little to ask about.
NOT_MARKED = ("poisson_ratio",)
#: What stands in the way of a key of a part: the other way of telling the same thing.
OTHER_WAYS = {
    "cushion": ("stiffness",),
    "ram": ("ram",),
    "layer": ("model", "exponent"),
    "toe": ("model", "exponent"),
}


def use_part(tree: Tree, part: Part, pointer: str) -> None:
    """Put a part at its place: the cushion, load, layer, toe, section or material at `pointer`.

    For a material, `pointer` may also be a place that names one: the material then joins the project under its name,
    or the one that is there under that name with the same figures is taken.
    """
    if part.kind == "material" and not isinstance(value_at(tree, pointer), dict):
        _take_material(tree, part, pointer)
        return
    parent, key = pointer.rsplit("/", 1)
    place = value_at(tree, pointer)
    if part.kind == "section":
        forget(tree, pointer)
        value_at(tree, parent).update({key: dict(part.values), "end_section": None})
        place = value_at(tree, pointer)
    elif place is None:
        value_at(tree, parent)[key] = place = dict(part.values)
    for other in OTHER_WAYS.get(part.kind, ()):
        place[other] = None
    missing: dict[str, float] = {}
    if part.kind == "cushion":
        missing = {k: v for k, v in SIZE.items() if place.get(k) is None}
        place.update(missing)
    place.update(copied(dict(part.values)))
    forget_missing(tree)
    _mark(tree, part, pointer)
    for key in missing:
        mark_typical(tree, f"{pointer}/{key}", NO_SOURCE)


def _take_material(tree: Tree, part: Part, pointer: str) -> None:
    names = [material["name"] for material in tree["materials"]]
    name = part.name
    same = next((m for m in tree["materials"] if m["name"] == name), None)
    if same is None or any(same[k] != v for k, v in part.values.items()):
        name = free_name(part.name, names)
        limits = {"compression": None, "tension": None}
        material = {"name": name, "law": {"kind": "elastic"}, "limits": limits, **copied(dict(part.values))}
        tree["materials"].append(material)
        _mark(tree, part, f"/materials/{len(tree['materials']) - 1}")
    name_material(tree, pointer, name)


def name_material(tree: Tree, pointer: str, name: str) -> None:
    """Let a segment or a fill be of another material; both ends of a taper have the same fill."""
    parent, key = pointer.rsplit("/", 1)
    value_at(tree, parent)[key] = name
    if key == "fill":
        end = value_at(tree, f"{parent.removesuffix('/section')}/end_section")
        if end:
            end["fill"] = name


def _mark(tree: Tree, part: Part, pointer: str) -> None:
    for key, value in part.values.items():
        if isinstance(value, int | float) and key not in NOT_MARKED:
            mark_typical(tree, f"{pointer}/{key}", part.source)
            if part.own:
                confirm(tree, f"{pointer}/{key}")


def free_name(wanted: str, names: list[str]) -> str:
    """The name itself, or with the first number behind it that is not taken."""
    name, number = wanted, 2
    while name in names:
        name, number = f"{wanted} {number}", number + 1
    return name
