"""The cases that are measured, built through the same door as a project file."""

from __future__ import annotations

from typing import Any

from app.starting_points import driven_pile
from solver import Case, project_from_tree

#: Length of a wave's way through one element of the uniform rod: 10 m, 5000 m/s.
LENGTH, SPEED = 10.0, 5000.0
STEEL = {"name": "steel", "young_modulus": 200e9, "density": 8000.0}


def rod(
    law: dict[str, Any] | None = None,
    load: dict[str, Any] | None = None,
    duration: float = 0.1,
    elements: int | None = None,
    parts: int = 1,
    lateral: bool = False,
    **more: Any,
) -> Case:
    """A uniform rod of `parts` equal segments under a half-sine force; `more` overrides parts of the case."""
    material = {**STEEL, **({"law": law} if law else {})}
    section = (
        {"shape": "solid_round", "diameter": 0.1128}
        if lateral
        else {"shape": "custom", "area": 0.01, "perimeter": 1.0}
    )
    if lateral:
        material["poisson_ratio"] = 0.3
    joint = more.pop("joint", None)
    segments = [
        {"name": f"part {i}", "length": LENGTH / parts, "material": "steel", "section": section}
        | ({"joint_above": joint} if joint and i else {})
        for i in range(parts)
    ]
    pulse = {"kind": "pulse", "quantity": "force", "shape": "half_sine", "peak": 1e5, "duration": 0.001}
    case = {
        "name": "rod",
        "member": {"segments": segments, "attachments": [], "lateral_inertia": lateral},
        "load": load or pulse,
        "far_end": {"kind": "free"},
        "ground": None,
        "gauges": [],
        "run": {"duration": duration, "element_length": LENGTH / elements if elements else None},
    }
    return _case({**case, **more}, [material])


def pile(duration: float | None = 0.1, drop_height: float = 1.0, elements: int | None = None) -> Case:
    """The default pile: ram, cushion and cap, two layers and a toe of Smith's laws, three gauges."""
    tree = driven_pile()
    case = tree["cases"][0]
    case["load"]["drop_height"] = drop_height
    case["run"]["duration"] = duration
    if elements:
        case["run"]["element_length"] = 20.0 / elements
    return project_from_tree(tree).cases[0]


def layered(elements: int | None = 400, pulse: float = 0.001) -> Case:
    """Three layers whose travel times have no common divisor, under a haversine of `pulse` seconds."""
    materials = [
        {"name": "a", "young_modulus": 200e9, "density": 7850.0},
        {"name": "b", "young_modulus": 70e9, "density": 2700.0},
        {"name": "c", "young_modulus": 35e9, "density": 2400.0},
    ]
    lengths = {"a": 3.7, "b": 2.9, "c": 3.1}
    section = {"shape": "custom", "area": 0.01, "perimeter": 1.0}
    total = sum(lengths.values())
    case = {
        "name": "layered rod",
        "member": {
            "segments": [
                {"name": m, "length": length, "material": m, "section": section}
                for m, length in lengths.items()
            ],
            "attachments": [],
            "lateral_inertia": False,
        },
        "load": {
            "kind": "pulse",
            "quantity": "force",
            "shape": "haversine",
            "peak": 1e5,
            "duration": pulse,
        },
        "far_end": {"kind": "free"},
        "ground": None,
        "gauges": [{"name": "far end", "position": total}],
        "run": {"duration": 0.1, "element_length": total / elements if elements else None, "gravity": False},
    }
    return _case(case, materials)


def _case(case: dict[str, Any], materials: list[dict[str, Any]]) -> Case:
    tree = {"format": "striketrace-project", "version": 1, "title": "benchmark"}
    return project_from_tree({**tree, "materials": materials, "cases": [case]}).cases[0]
