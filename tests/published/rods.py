"""Cases that the checks solve, told in few words, in SI units."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any

import numpy as np
from numpy.typing import NDArray

from solver import Case, Result, project_from_tree, solve
from solver.model.load import GRAVITY

Array = NDArray[np.float64]

__all__ = [
    "AREA",
    "DENSITY",
    "GRAVITY",
    "LENGTH",
    "C",
    "E",
    "Z",
    "case_of",
    "material",
    "part",
    "pulse",
    "solved",
]

#: The round-number rod of most checks: c = 5000 m/s, Z = EA/c = 400 000 N s/m, L/c = 2 ms, 800 kg.
E, DENSITY, AREA, LENGTH = 200e9, 8000.0, 0.01, 10.0
C, Z = 5000.0, 400e3


def material(name: str, young_modulus: float = E, density: float = DENSITY, **more: Any) -> dict[str, Any]:
    """A material; the round-number rod's where nothing else is said."""
    return {"name": name, "young_modulus": float(young_modulus), "density": float(density), **more}


def part(length: float = LENGTH, area: float = AREA, of: str = "round", **more: Any) -> dict[str, Any]:
    """A segment of `length` (m), `area` (m2) and the material named `of`; its perimeter is 1 m."""
    section = more.pop("section", {"shape": "custom", "area": float(area), "perimeter": 1.0})
    return {"length": float(length), "material": of, "section": section, **more}


def pulse(
    shape: str, duration: float, peak: float = 1e6, quantity: str = "force", **more: Any
) -> dict[str, Any]:
    """A pulse at the struck end."""
    return {"kind": "pulse", "quantity": quantity, "shape": shape, "peak": peak, "duration": duration, **more}


def _named(segments: Sequence[Mapping[str, Any]]) -> list[dict[str, Any]]:
    return [{"name": f"part {i + 1}", **segment} for i, segment in enumerate(segments)]


def case_of(
    load: Mapping[str, Any],
    *segments: Mapping[str, Any],
    far_end: str | Mapping[str, Any] = "free",
    gauges: Mapping[str, float | Mapping[str, Any]] | None = None,
    duration: float | None = None,
    dx: float | None = None,
    materials: Sequence[Mapping[str, Any]] = (),
    ground: Mapping[str, Any] | None = None,
    attachments: Sequence[Mapping[str, Any]] = (),
    lateral_inertia: bool = False,
    **run: Any,
) -> Case:
    """A case, built through the same door as a project file; `dx` is the element length (m), None the program's own."""
    blow = dict(load)
    if "segments" in blow:
        blow["segments"] = _named(blow["segments"])
    if "ram" in blow:
        blow["ram"] = {"segments": _named(blow["ram"]["segments"])}
    places = {name: g if isinstance(g, Mapping) else {"position": g} for name, g in (gauges or {}).items()}
    case = {
        "name": "case",
        "member": {
            "segments": _named(segments or [part()]),
            "attachments": list(attachments),
            "lateral_inertia": lateral_inertia,
        },
        "load": blow,
        "far_end": {"kind": far_end} if isinstance(far_end, str) else dict(far_end),
        "ground": ground,
        "gauges": [{"name": name, **g} for name, g in places.items()],
        "run": {"duration": duration, "element_length": dx, **run},
    }
    tree = {"format": "striketrace-project", "version": 1, "title": "check"}
    return project_from_tree({**tree, "materials": [material("round"), *materials], "cases": [case]}).cases[0]


def solved(load: Mapping[str, Any], *segments: Mapping[str, Any], **rest: Any) -> Result:
    """Describe a case (see `case_of`) and solve it."""
    return solve(case_of(load, *segments, **rest))
