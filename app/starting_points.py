"""What a new project can begin with: a few small projects that are valid and solve at once, with invented values.

Typical values in them come from the parts library and are marked as such, with their sources.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

from app.parts_library import part_named
from app.provenance import mark_typical

Tree = dict[str, Any]


@dataclass(frozen=True)
class StartingPoint:
    """One choice of File > New."""

    name: str
    tells: str
    make: Callable[[], Tree]


def _project(title: str, sign: str, material: str, case: Tree) -> Tree:
    part = part_named("material", material)
    entry = {"name": material, **part.values, "law": {"kind": "elastic"}}
    entry["limits"] = {"compression": None, "tension": None}
    tree: Tree = {
        "format": "striketrace-project",
        "version": 1,
        "title": title,
        "notes": "",
        "display_units": "metric",
        "display_sign": sign,
        "materials": [entry],
        "cases": [case],
    }
    for key in ("young_modulus", "density"):
        mark_typical(tree, f"/materials/0/{key}", part.source)
    return tree


def driven_pile() -> Tree:
    """A steel pipe pile under a drop with cushion and cap, in two layers of ground."""
    pipe = {"shape": "pipe", "outer_diameter": 0.508, "wall": 0.0125}
    cushion = part_named("cushion", "oak, load across the grain")
    sand = part_named("layer", "sand or gravel (not cohesive)")
    clay = part_named("layer", "clay (cohesive)")
    toe = part_named("toe", "any ground, pile that displaces little")
    case = {
        "name": "First blow",
        "member": {
            "segments": [{"name": "Pile", "length": 20.0, "material": "steel", "section": pipe}],
            "lateral_inertia": False,
            "attachments": [],
        },
        "load": {
            "kind": "drop",
            "ram_mass": 5000.0,
            "drop_height": 1.0,
            "efficiency": 0.8,
            "cushion": {"area": 0.16, "thickness": 0.15, **cushion.values},
            "cap_mass": 600.0,
            "pile_cushion": None,
        },
        "far_end": {"kind": "ground"},
        "ground": {
            "surface": 4.0,
            "layers": [
                {"name": "Soft clay", "thickness": 8.0, "unit_resistance": 15e3, **clay.values},
                {"name": "Dense sand", "thickness": 10.0, "unit_resistance": 60e3, **sand.values},
            ],
            "toe": {"resistance": 900e3, **toe.values},
        },
        "gauges": [
            {"name": "Gauge 1", "position": 1.5},
            {"name": "Gauge 2", "position": 10.0},
            {"name": "Gauge 3", "position": 19.5},
        ],
        "run": {"duration": None, "element_length": None, "gravity": True, "blows": 1},
    }
    tree = _project("New pile", "compression", "steel", case)
    for place, part in (
        ("load/cushion", cushion),
        ("ground/layers/0", clay),
        ("ground/layers/1", sand),
        ("ground/toe", toe),
    ):
        for key in part.values:
            if key != "damping_law":
                mark_typical(tree, f"/cases/0/{place}/{key}", part.source)
    return tree


def rod_or_bar() -> Tree:
    """A steel striker thrown against a longer steel bar with a thinner end: one pulse, and its reflections."""
    thick, thin = {"shape": "solid_round", "diameter": 0.02}, {"shape": "solid_round", "diameter": 0.014}
    case = {
        "name": "First blow",
        "member": {
            "segments": [
                {"name": "Bar", "length": 1.5, "material": "steel", "section": thick},
                {"name": "Thin end", "length": 0.5, "material": "steel", "section": thin},
            ],
            "lateral_inertia": False,
            "attachments": [],
        },
        "load": {
            "kind": "striker",
            "velocity": 10.0,
            "segments": [{"name": "Striker rod", "length": 0.3, "material": "steel", "section": thick}],
        },
        "far_end": {"kind": "free"},
        "ground": None,
        "gauges": [{"name": "Gauge 1", "position": 0.75}, {"name": "Gauge 2", "position": 1.75}],
        "run": {"duration": 0.0012, "element_length": None, "gravity": False, "blows": 1},
    }
    return _project("New bar", "tension", "steel", case)


def slender_rod_by_echo() -> Tree:
    """A light tap on a long concrete rod with a neck: the neck and the far end send echoes back to the head."""
    full, neck = {"shape": "solid_round", "diameter": 0.6}, {"shape": "solid_round", "diameter": 0.48}
    material = "concrete 30 MPa, dynamic modulus"
    case = {
        "name": "Tap at the head",
        "member": {
            "segments": [
                {"name": "Upper", "length": 8.0, "material": material, "section": full},
                {"name": "Neck", "length": 1.2, "material": material, "section": neck},
                {"name": "Lower", "length": 8.8, "material": material, "section": full},
            ],
            "lateral_inertia": False,
            "attachments": [],
        },
        "load": {
            "kind": "pulse",
            "quantity": "force",
            "shape": "half_sine",
            "peak": 10e3,
            "duration": 0.001,
            "start": 0.0,
        },
        "far_end": {"kind": "free"},
        "ground": None,
        "gauges": [{"name": "Gauge 1", "position": 0.0}, {"name": "Gauge 2", "position": 9.0}],
        "run": {"duration": 0.02, "element_length": None, "gravity": False, "blows": 1},
    }
    return _project("New echo test", "compression", material, case)


STARTING_POINTS: tuple[StartingPoint, ...] = (
    StartingPoint(
        "Driven pile", "A ram falls on cushion, cap and pile; layered ground holds it.", driven_pile
    ),
    StartingPoint("Rod or bar", "A striker hits a bar of two diameters; both ends are free.", rod_or_bar),
    StartingPoint(
        "Slender rod read by its echo",
        "A light tap on a long rod with a neck; the echoes tell where it is.",
        slender_rod_by_echo,
    ),
)


def new_tree(name: str) -> Tree:
    """A fresh project tree for a choice by its name. Raises `KeyError` for a name that is no choice."""
    for point in STARTING_POINTS:
        if point.name == name:
            return point.make()
    raise KeyError(f"there is no starting point named '{name}'")
