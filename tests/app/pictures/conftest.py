"""A Bench on a pile that is solved once; and one on a rod with two materials whose limits differ."""

from __future__ import annotations

from types import SimpleNamespace

import pytest

from solver import project_from_tree, solve

STEEL = {
    "name": "steel",
    "young_modulus": 210e9,
    "density": 7850.0,
    "limits": {"compression": 319e6, "tension": 319e6},
}
CONCRETE = {
    "name": "concrete",
    "young_modulus": 40e9,
    "density": 2450.0,
    "limits": {"compression": 30e6, "tension": 4e6},
}
PILE = {
    "name": "Drop 1.2 m",
    "member": {
        "segments": [
            {
                "name": "Upper",
                "length": 16.0,
                "material": "steel",
                "section": {"shape": "pipe", "outer_diameter": 0.61, "wall": 0.016},
            },
            {
                "name": "Lower",
                "length": 8.0,
                "material": "steel",
                "section": {"shape": "pipe", "outer_diameter": 0.61, "wall": 0.0127},
            },
        ]
    },
    "load": {
        "kind": "drop",
        "ram_mass": 4000.0,
        "drop_height": 1.2,
        "efficiency": 0.95,
        "cushion": {"stiffness": 1.6e9, "restitution": 0.8},
        "cap_mass": 610.0,
    },
    "far_end": {"kind": "ground"},
    "ground": {
        "surface": 6.0,
        "layers": [
            {
                "name": "Dense sand",
                "thickness": 20.0,
                "unit_resistance": 30e3,
                "quake": 0.0025,
                "damping": 0.16,
            }
        ],
        "toe": {"resistance": 900e3, "quake": 0.004, "damping": 0.5},
    },
    "gauges": [{"name": "Head", "position": 1.2}, {"name": "Toe", "position": 23.2}],
    "run": {"duration": 0.03},
}


def project_of(case, sign="compression", units="metric"):
    return project_from_tree(
        {
            "format": "striketrace-project",
            "version": 1,
            "title": "Test",
            "display_sign": sign,
            "display_units": units,
            "materials": [STEEL, CONCRETE],
            "cases": [case],
        }
    )


@pytest.fixture(scope="session")
def pile():
    """The pile's project and its result."""
    project = project_of(PILE)
    return SimpleNamespace(project=project, result=solve(project.cases[0]))


@pytest.fixture(scope="session")
def two_materials():
    """A concrete rod on a slim steel end: the steel has the larger stress, the concrete is nearer to its limit."""
    square = {"shape": "rectangle", "width": 0.4, "depth": 0.4}
    case = {
        "name": "Two materials",
        "member": {
            "segments": [
                {"name": "Shaft", "length": 12.0, "material": "concrete", "section": square},
                {
                    "name": "Tip",
                    "length": 4.0,
                    "material": "steel",
                    "section": {"shape": "custom", "area": 0.02, "perimeter": 1.0},
                },
            ]
        },
        "load": {"kind": "pulse", "quantity": "force", "shape": "half_sine", "peak": 3e6, "duration": 0.004},
        "far_end": {"kind": "free"},
        "gauges": [{"name": "Top", "position": 1.0}],
        "run": {"duration": 0.02},
    }
    project = project_of(case)
    return SimpleNamespace(project=project, result=solve(project.cases[0]))


@pytest.fixture
def open_bench(qtbot):
    """Opens a Bench on a project whose result is there already, at a size; closes its thread at the end."""
    from PySide6.QtWidgets import QWidget

    from app.bench.bench import Bench
    from app.document import Document
    from app.sight import Sight
    from app.solving import Solution

    opened = []

    def open_it(solved, width=1000, height=724):
        document = Document(solved.project)
        sight = Sight()

        def at_hand(case, **_how):
            return solved.result if case == solved.project.cases[0] else solve(case)

        solution = Solution(document, at_hand)
        # a window with a least size makes the offscreen platform complain; one without holds the Bench
        window = QWidget()
        window.resize(width, height)
        bench = Bench(document, sight, solution, window)
        bench.setGeometry(window.rect())
        qtbot.addWidget(window)
        window.show()
        qtbot.waitUntil(lambda: solution.state == "fresh")
        opened.append(solution)
        return SimpleNamespace(window=window, bench=bench, document=document, sight=sight, solution=solution)

    yield open_it
    for solution in opened:
        assert solution.close()
