"""A small valid project, as a tree of plain dicts, that the tests of this folder break or solve.

It holds one of each kind of thing that a breach can sit in: two materials, a taper, a joint, an attachment, a drop
with both cushions, layers and toe; a second case with a pulse, a third with a striker. All of it solves in a blink.
"""

from __future__ import annotations

import copy
from typing import Any

Tree = dict[str, Any]


def valid_tree() -> Tree:
    """A fresh copy, to be changed at will."""
    return copy.deepcopy(_VALID)


def short_tree() -> Tree:
    """One bar under one pulse, a fraction of a millisecond: for tests that solve."""
    tree = valid_tree()
    tree["cases"] = [tree["cases"][1]]
    return tree


_STEEL: Tree = {
    "name": "steel",
    "young_modulus": 210e9,
    "density": 7850.0,
    "poisson_ratio": 0.3,
    "law": {"kind": "elastic"},
    "limits": {
        "compression": {"value": 319.5e6, "basis": "0.9 of yield", "reason": None, "source": "invented"},
        "tension": 319.5e6,
    },
}
_COPPER: Tree = {
    "name": "copper",
    "young_modulus": 117e9,
    "density": 8940.0,
    "law": {"kind": "elastic_plastic", "yield_stress": 200e6, "hardening_modulus": 1e9},
}
_PIPE: Tree = {"shape": "pipe", "outer_diameter": 0.4, "wall": 0.01}
_BAR: Tree = {"shape": "solid_round", "diameter": 0.02}

_DROP: Tree = {
    "name": "Drop",
    "member": {
        "segments": [
            {
                "name": "Upper",
                "length": 6.0,
                "material": "steel",
                "section": _PIPE,
                "end_section": {"shape": "pipe", "outer_diameter": 0.35, "wall": 0.01},
            },
            {
                "name": "Lower",
                "length": 4.0,
                "material": "steel",
                "section": {"shape": "pipe", "outer_diameter": 0.35, "wall": 0.01},
                "joint_above": {"kind": "bonded"},
            },
        ],
        "lateral_inertia": False,
        "attachments": [{"position": 2.0, "kind": "mass", "value": 25.0}],
    },
    "load": {
        "kind": "drop",
        "ram_mass": 3000.0,
        "drop_height": 0.5,
        "efficiency": 0.8,
        "cushion": {"stiffness": 5e8, "restitution": 0.8},
        "cap_mass": 200.0,
        "pile_cushion": {"area": 0.1, "thickness": 0.1, "young_modulus": 3e8, "restitution": 0.5},
    },
    "far_end": {"kind": "ground"},
    "ground": {
        "surface": 2.0,
        "layers": [
            {
                "name": "Clay",
                "thickness": 5.0,
                "unit_resistance": 20e3,
                "quake": 0.0025,
                "damping": 0.6,
                "damping_law": "smith",
            },
            {
                "name": "Sand",
                "thickness": 4.0,
                "unit_resistance": 40e3,
                "unit_resistance_bottom": 60e3,
                "quake": 0.0025,
                "damping": 0.16,
                "damping_law": "power",
                "exponent": 0.2,
            },
        ],
        "toe": {"resistance": 300e3, "quake": 0.0025, "damping": 0.5, "damping_law": "viscous", "gap": 0.0},
        "inner_share": 0.5,
    },
    "gauges": [{"name": "Head", "position": 0.8}, {"name": "Toe", "position": 9.5}],
    "run": {"duration": 0.02, "element_length": 0.1, "gravity": True, "blows": 1},
}
_PULSE: Tree = {
    "name": "Pulse",
    "member": {"segments": [{"name": "Bar", "length": 1.0, "material": "steel", "section": _BAR}]},
    "load": {
        "kind": "pulse",
        "quantity": "force",
        "shape": "half_sine",
        "peak": 10e3,
        "duration": 1e-4,
        "start": 0.0,
    },
    "far_end": {"kind": "spring", "stiffness": 1e7},
    "gauges": [{"name": "Middle", "position": 0.5}],
    "run": {"duration": 5e-4, "element_length": 0.01},
}
_STRIKER: Tree = {
    "name": "Striker",
    "member": {
        "segments": [
            {"name": "Bar", "length": 1.0, "material": "steel", "section": _BAR},
            {
                "name": "Tip",
                "length": 0.2,
                "material": "copper",
                "section": _BAR,
                "joint_above": {"kind": "contact", "gap": 0.0},
            },
        ]
    },
    "load": {
        "kind": "striker",
        "velocity": 5.0,
        "segments": [{"name": "Striker", "length": 0.2, "material": "steel", "section": _BAR}],
    },
    "far_end": {"kind": "wall", "gap": 0.0001},
    "gauges": [
        {"name": "On the bar", "position": 0.5, "side": "near"},
        {"name": "On the striker", "position": 0.1, "on": "striker"},
    ],
    "run": {"duration": 4e-4, "element_length": 0.01},
}
_VALID: Tree = {
    "format": "striketrace-project",
    "version": 1,
    "title": "A project for tests",
    "notes": "Invented.",
    "display_units": "metric",
    "display_sign": "compression",
    "materials": [_STEEL, _COPPER],
    "cases": [_DROP, _PULSE, _STRIKER],
}
