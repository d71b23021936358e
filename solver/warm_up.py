"""Compile all kernels ahead of need: `python -m solver.warm_up`. Kept on disk, they take their seconds once."""

from __future__ import annotations

from solver.model.file import project_from_tree
from solver.model.project import FORMAT, VERSION
from solver.run import solve


def warm_up() -> None:
    """Solve the smallest case there is. One kernel marches every case, so that this compiles it for all."""
    section = {"shape": "custom", "area": 0.01, "perimeter": 0.4}
    segment = {"name": "rod", "length": 1.0, "material": "any", "section": section}
    tree = {
        "format": FORMAT,
        "version": VERSION,
        "title": "warm-up",
        "materials": [{"name": "any", "young_modulus": 2e11, "density": 8000.0}],
        "cases": [
            {
                "name": "warm-up",
                "member": {"segments": [segment]},
                "load": {
                    "kind": "pulse",
                    "quantity": "force",
                    "shape": "rectangle",
                    "peak": 1.0,
                    "duration": 1e-3,
                },
                "far_end": {"kind": "fixed"},
                "run": {"duration": 1e-5, "element_length": 0.5, "gravity": True},
            }
        ],
    }
    solve(project_from_tree(tree).cases[0])


if __name__ == "__main__":
    warm_up()
