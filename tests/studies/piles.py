"""Piles for the studies: described as a file would be, small enough to solve in some milliseconds."""

from typing import Any

from solver import Case, project_from_tree


def pile(
    *,
    length: float = 12.0,
    area: float = 0.01,
    modulus: float = 210e9,
    height: float = 1.0,
    ram: float = 3000.0,
    shaft: float = 400e3,
    toe: float = 400e3,
    distribution: str = "uniform",
    quake: float = 0.0025,
    toe_quake: float = 0.0025,
    damping: float = 0.16,
    toe_damping: float = 0.5,
    cushion: float = 4e8,
    restitution: float = 0.8,
    limit: float | None = 200e6,
    efficiency: float = 0.8,
    layers: list[dict[str, Any]] | None = None,
    elements: int = 60,
    gravity: bool = True,
) -> Case:
    """A steel pile in uniform or layered ground under a drop; SI units."""
    steel = {
        "name": "steel",
        "young_modulus": modulus,
        "density": 7850.0,
        "poisson_ratio": 0.3,
        "law": {"kind": "elastic"},
        "limits": {"compression": limit, "tension": limit},
    }
    total = {
        "resistance": shaft,
        "distribution": distribution,
        "quake": quake,
        "damping": damping,
        "damping_law": "smith",
    }
    ground: dict[str, Any] = {
        "surface": 2.0,
        "toe": {"resistance": toe, "quake": toe_quake, "damping": toe_damping, "damping_law": "smith"},
    }
    ground |= {"layers": layers} if layers is not None else {"shaft_total": total}
    case = {
        "name": "Pile",
        "member": {
            "segments": [
                {
                    "name": "Pile",
                    "length": length,
                    "material": "steel",
                    "section": {"shape": "custom", "area": area, "perimeter": 1.6},
                }
            ]
        },
        "load": {
            "kind": "drop",
            "ram_mass": ram,
            "drop_height": height,
            "efficiency": efficiency,
            "cushion": {"stiffness": cushion, "restitution": restitution},
            "cap_mass": 300.0,
        },
        "far_end": {"kind": "ground"},
        "ground": ground,
        "gauges": [{"name": "Head", "position": 1.0}, {"name": "Toe", "position": length - 0.5}],
        "run": {"duration": None, "element_length": length / elements, "gravity": gravity, "blows": 1},
    }
    tree = {
        "format": "striketrace-project",
        "version": 1,
        "title": "A pile",
        "materials": [steel],
        "cases": [case],
    }
    return project_from_tree(tree).cases[0]


def layer(name: str, thickness: float, unit: float, bottom: float | None = None) -> dict[str, Any]:
    found: dict[str, Any] = {
        "name": name,
        "thickness": thickness,
        "unit_resistance": unit,
        "quake": 0.0025,
        "damping": 0.16,
        "damping_law": "smith",
    }
    return found if bottom is None else found | {"unit_resistance_bottom": bottom}
