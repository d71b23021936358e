"""Projects that records and reports are made of: a small bar, and the same with everything unlucky in it."""

from __future__ import annotations

import copy

import pytest

from solver import project_from_tree, solve

UNLUCKY = "<b>Pier</b> & =1+1 \u202eשלום\u202c العربية 🙂\n# second line"


def bar_tree(title="Bar under a pulse", gauges=("Near", "Far"), cases=1):
    """A steel bar of 4 m under a half-sine of force, its gauges evenly along it."""
    section = {"shape": "solid_round", "diameter": 0.05}
    case = {
        "name": "Pulse",
        "member": {"segments": [{"name": "Bar", "length": 4.0, "material": "steel", "section": section}]},
        "load": {
            "kind": "pulse",
            "quantity": "force",
            "shape": "half_sine",
            "peak": 1e5,
            "duration": 4e-4,
            "start": 1e-4,
        },
        "far_end": {"kind": "free"},
        "gauges": [
            {"name": name, "position": 4.0 * (i + 1) / (len(gauges) + 1)} for i, name in enumerate(gauges)
        ],
        "run": {"duration": 0.004, "element_length": 0.05},
    }
    limits = {"compression": 60e6, "tension": 50e6}
    material = {"name": "steel", "young_modulus": 2.1e11, "density": 7850.0, "limits": limits}
    tree = {"format": "striketrace-project", "version": 1, "title": title, "materials": [material]}
    tree["cases"] = []
    for number in range(cases):
        one = copy.deepcopy(case)
        one["name"] = "Pulse" if number == 0 else f"Pulse {number + 1}"
        one["load"]["peak"] = 1e5 * (number + 1)
        tree["cases"].append(one)
    return tree


@pytest.fixture(scope="session")
def bar():
    """The project of one bar with its result."""
    project = project_from_tree(bar_tree())
    return project, solve(project.cases[0])
