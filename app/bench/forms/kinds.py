"""Every kind that a part can be of, in words, each with a complete value to begin with.

One explicit dictionary of the model's unions: a new kind of the model is one entry here. `MATERIAL` stands where
the name of a material of the project belongs.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from pydantic import BaseModel

from app.parts_library import part_named
from solver.model.load import Pulse
from solver.model.material import Material
from solver.model.member import Member, Segment
from solver.model.project import Case, Gauge

MATERIAL = "<a material of the project>"
Tree = dict[str, Any]


@dataclass(frozen=True)
class Kind:
    """One kind: the word on screen, the value to begin with, and what it means."""

    word: str
    value: Any
    tells: str = ""


ROD = {
    "name": "Rod",
    "length": 0.3,
    "material": MATERIAL,
    "section": {"shape": "solid_round", "diameter": 0.02},
}
RAM_ROD = {
    "name": "Ram rod",
    "length": 1.5,
    "material": MATERIAL,
    "section": {"shape": "solid_round", "diameter": 0.6},
}
#: Of the power of velocity in the law of damping.
EXPONENT = 0.2
PULSE = {"quantity": "force", "shape": "half_sine", "peak": 1e6, "duration": 0.002, "start": 0.0}

#: By the field of the model that holds the union: its kinds, by the value of `kind` or `shape`.
KINDS: dict[tuple[type[BaseModel], str], dict[str, Kind]] = {
    (Case, "load"): {
        "drop": Kind(
            "Ram that falls",
            {
                "kind": "drop",
                "ram_mass": 4000.0,
                "drop_height": 1.0,
                "efficiency": 0.8,
                "cushion": {"stiffness": 1e9, "restitution": 0.8},
                "cap_mass": 0.0,
                "pile_cushion": None,
            },
            "A drop weight, with a cushion, a drive cap and a pile cushion where there are any. "
            "Diesel and vibratory hammers are not modelled.",
        ),
        "striker": Kind(
            "Striker rod",
            {"kind": "striker", "velocity": 10.0, "segments": [ROD | {"name": "Striker rod"}]},
            "A rod thrown against the struck end.",
        ),
        "pulse": Kind("Pulse", {"kind": "pulse", **PULSE}, "A force or velocity in closed form."),
        "history": Kind(
            "Recorded history",
            {
                "kind": "history",
                "quantity": "force",
                "times": [0.0, 0.001, 0.002],
                "values": [0.0, 1e5, 0.0],
            },
            "A force or velocity as points in time, pasted or from a file.",
        ),
        "none": Kind(
            "None, it moves already", {"kind": "none"}, "The member starts with a velocity of its own."
        ),
    },
    (Case, "far_end"): {
        "free": Kind(
            "Free", {"kind": "free"}, "Nothing holds the far end: a wave comes back with its sign changed."
        ),
        "fixed": Kind(
            "Fixed", {"kind": "fixed"}, "The far end cannot move: a wave comes back with its sign."
        ),
        "ground": Kind("Toe in the ground", {"kind": "ground"}, "Toe resistance, with quake and damping."),
        "spring": Kind("Spring", {"kind": "spring", "stiffness": 1e8}, "A spring to a fixed point."),
        "dashpot": Kind("Dashpot", {"kind": "dashpot", "coefficient": 1e6}, "A dashpot to a fixed point."),
        "matched": Kind(
            "Goes on for ever", {"kind": "matched"}, "The member goes on unchanged: nothing comes back."
        ),
        "wall": Kind("Rigid wall", {"kind": "wall", "gap": 0.0}, "A rigid wall, touching or beyond a gap."),
    },
    (Segment, "section"): {
        "pipe": Kind("Pipe", {"shape": "pipe", "outer_diameter": 0.5, "wall": 0.0125}),
        "solid_round": Kind("Solid round", {"shape": "solid_round", "diameter": 0.5}),
        "rectangle": Kind("Rectangle", {"shape": "rectangle", "width": 0.5, "depth": 0.5}),
        "octagon": Kind("Octagon", {"shape": "octagon", "across_flats": 0.5}),
        "h": Kind("H", {"shape": "h", "depth": 0.5, "flange_width": 0.5, "flange": 0.025, "web": 0.025}),
        "voided_square": Kind(
            "Square with a void", {"shape": "voided_square", "width": 0.5, "void_diameter": 0.25}
        ),
        "filled_pipe": Kind(
            "Filled pipe",
            {"shape": "filled_pipe", "outer_diameter": 0.5, "wall": 0.0125, "fill": MATERIAL},
            "A pipe filled with another material: stiffnesses and masses add.",
        ),
        "custom": Kind(
            "By area",
            {"shape": "custom", "area": 0.02, "perimeter": 1.6},
            "Any shape, by area and perimeter.",
        ),
    },
    (Segment, "joint_above"): {
        "bonded": Kind("Welded or glued", {"kind": "bonded"}, "Carries compression and tension."),
        "contact": Kind(
            "Touching only", {"kind": "contact", "gap": 0.0}, "Carries compression, opens in tension."
        ),
        "slack_splice": Kind(
            "Splice with slack",
            {"kind": "slack_splice", "slack": 0.002},
            "Carries compression at once, and tension after it has opened by its slack.",
        ),
    },
    (Material, "law"): {
        "elastic": Kind("Elastic", {"kind": "elastic"}),
        "viscoelastic": Kind(
            "Elastic with viscosity",
            {"kind": "viscoelastic", "viscosity": 1e5},
            "Kelvin-Voigt: a spring and a dashpot side by side (Kolsky 1963, from memory).",
        ),
        "elastic_plastic": Kind(
            "Yields",
            {
                "kind": "elastic_plastic",
                "yield_stress": 355e6,
                "hardening_modulus": 0.0,
                "hardening": "isotropic",
            },
            "Elastic up to its yield stress, then along a line of lower slope.",
        ),
        "brittle_tension": Kind(
            "Cracks in tension",
            {"kind": "brittle_tension", "tensile_strength": 3e6},
            "Opens at its tensile strength, closes again and carries compression.",
        ),
        "large_strain": Kind(
            "Large strain",
            {"kind": "large_strain"},
            "Incompressible neo-Hookean pad, its stiffness from Young's modulus.",
        ),
    },
    (Member, "attachments"): {
        "mass": Kind("Mass", {"position": 0.0, "kind": "mass", "value": 100.0}),
        "spring": Kind("Spring", {"position": 0.0, "kind": "spring", "value": 1e7}, "To a fixed point."),
        "dashpot": Kind("Dashpot", {"position": 0.0, "kind": "dashpot", "value": 1e4}, "To a fixed point."),
    },
}

OAK = part_named("cushion", "oak, load across the grain")
SAND = part_named("layer", "sand or gravel (not cohesive)")
UNDER_TOE = part_named("toe", "any ground, pile that displaces little")
STEEL = part_named("material", "steel")
SIZE = {"area": 0.16, "thickness": 0.15}
CUSHION = {**SIZE, **OAK.values}
RADIATION = {"kind": "radiation", "shear_modulus": 20e6, "soil_density": 1800.0, "poisson_ratio": 0.3}
TOE = {"resistance": 500e3, **UNDER_TOE.values}
SHAFT_TOTAL = {"resistance": 500e3, "distribution": "uniform", **SAND.values}
#: What is added to a list, without its name.
NEW_PARTS: dict[str, Tree] = {
    "segments": {
        "length": 5.0,
        "material": MATERIAL,
        "section": {"shape": "solid_round", "diameter": 0.5},
        "joint_above": {"kind": "bonded"},
    },
    "layers": {"thickness": 3.0, "unit_resistance": 30e3, **SAND.values},
    "gauges": {"position": 0.0},
    "attachments": {"position": 0.0, "kind": "mass", "value": 100.0},
    "materials": {
        "young_modulus": STEEL.values["young_modulus"],
        "density": STEEL.values["density"],
        "law": {"kind": "elastic"},
    },
}

#: The source of a mark on a number that only fills a field.
NO_SOURCE = "no source: a number to begin with"
#: Numbers above that stand for the behaviour of a material, cushion or ground, by key and value, with their source.
#: Sizes, masses and speeds of what is struck or strikes are the person's own to give, and not marked.
BEGINS: dict[tuple[str, float], str] = {
    **{
        (key, value): part.source
        for part in (STEEL, OAK, SAND, UNDER_TOE)
        for key, value in part.values.items()
        if isinstance(value, float) and key != "poisson_ratio"
    },
    ("exponent", EXPONENT): "Gibson and Coyle 1968 (from memory)",
    ("yield_stress", 355e6): "EN 10025, S355 (from memory)",
    **dict.fromkeys(
        (
            *SIZE.items(),
            ("efficiency", 0.8),
            ("stiffness", 1e9),
            ("restitution", 0.8),
            ("stiffness", 1e8),
            ("coefficient", 1e6),
            ("resistance", 500e3),
            ("unit_resistance", 30e3),
            ("shear_modulus", 20e6),
            ("soil_density", 1800.0),
            ("viscosity", 1e5),
            ("tensile_strength", 3e6),
        ),
        NO_SOURCE,
    ),
}

#: Words for values of choices, where the value itself is not the word.
CHOICE_WORDS: dict[tuple[type[BaseModel], str], dict[str, str]] = {
    (Pulse, "shape"): {
        "rectangle": "rectangle",
        "half_sine": "half sine",
        "haversine": "haversine (smooth)",
        "triangle": "triangle",
        "trapezoid": "trapezoid",
        "decay": "sudden, then decays",
    },
    (Gauge, "side"): {"near": "of the struck end", "far": "of the far end"},
}


def filled(value: Any, material: str) -> Any:
    """A copy of a value of `KINDS` with the name of a material in its place."""
    if isinstance(value, dict):
        return {key: filled(inner, material) for key, inner in value.items()}
    if isinstance(value, list):
        return [filled(inner, material) for inner in value]
    return material if value == MATERIAL else value


def words_of(model: type[BaseModel], field: str) -> dict[str, str]:
    """Words for the values of a choice; values that are words already are not in it."""
    return CHOICE_WORDS.get((model, field), {})
