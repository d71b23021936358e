"""Random rods whose segments all take whole numbers of one step: on them the method is exact, so that laws can be
held to round-off.
"""

from __future__ import annotations

from typing import Any

from hypothesis import strategies as st

from solver import Result, project_from_tree, solve
from tests.solver.strategies import Tree, between, logarithmic

#: Time of a wave through an element, s; positions of gauges are given in elements.
STEP = 5e-6


@st.composite
def materials(draw: st.DrawFn, name: str, laws: tuple[str, ...] = ("elastic",)) -> Tree:
    young, density = draw(logarithmic(1e10, 3e11)), draw(logarithmic(1000, 9000))
    kind = draw(st.sampled_from(laws))
    law: Tree = {"kind": kind}
    if kind == "elastic_plastic":
        law |= {
            "yield_stress": young * draw(logarithmic(1e-4, 1e-3)),
            "hardening_modulus": young * draw(between(0.1, 0.5)),
        }
        law["hardening"] = draw(st.sampled_from(["isotropic", "kinematic"]))
    elif kind == "brittle_tension":
        law["tensile_strength"] = young * draw(logarithmic(1e-5, 1e-3))
    return {"name": name, "young_modulus": young, "density": density, "law": law}


def speed(material: Tree) -> float:
    return float((material["young_modulus"] / material["density"]) ** 0.5)


def segment(name: str, material: Tree, elements: int, area: float, **more: Any) -> Tree:
    """A segment that a wave crosses in `elements` steps."""
    section = {"shape": "custom", "area": area, "perimeter": 1.0}
    length = elements * speed(material) * STEP
    return {"name": name, "length": length, "material": material["name"], "section": section, **more}


@st.composite
def rods(
    draw: st.DrawFn, known: list[Tree], name: str = "part", most: int = 4, tapers: bool = False
) -> list[Tree]:
    """Bonded segments of 12 to 32 elements, areas apart by up to a factor of 20."""
    found = []
    for i in range(draw(st.integers(1, most))):
        area = draw(logarithmic(0.002, 0.04))
        part = segment(f"{name} {i + 1}", draw(st.sampled_from(known)), draw(st.integers(12, 32)), area)
        if tapers and draw(st.booleans()):
            part["end_section"] = {**part["section"], "area": area * draw(between(0.6, 1.5))}
        found.append(part)
    return found


def in_steps(parts: list[Tree], known: list[Tree]) -> list[int]:
    """Number of elements of each segment."""
    by_name = {m["name"]: m for m in known}
    return [round(p["length"] / (speed(by_name[p["material"]]) * STEP)) for p in parts]


def place(parts: list[Tree], known: list[Tree], element: int) -> float:
    """Distance from the top of the node after so many elements, m."""
    passed = 0.0
    for part, count in zip(parts, in_steps(parts, known), strict=True):
        if element <= count:
            return passed + part["length"] * element / count
        element -= count
        passed += part["length"]
    raise ValueError("beyond the end of the rod")


@st.composite
def inner_nodes(draw: st.DrawFn, parts: list[Tree], known: list[Tree]) -> int:
    """A node inside a segment, counted in elements from the top."""
    counts = in_steps(parts, known)
    which = draw(st.integers(0, len(parts) - 1))
    return sum(counts[:which]) + draw(st.integers(1, counts[which] - 1))


def solved(known: list[Tree], parts: list[Tree], load: Tree, far_end: Tree, **case: Any) -> Result:
    """Solve a case of such rods on the mesh of `STEP`; fails where the program did not find that mesh."""
    by_name = {m["name"]: m for m in known}
    run = {"duration": 400 * STEP, **case.pop("run", {})}
    run["element_length"] = STEP * max(speed(by_name[p["material"]]) for p in parts)
    member = {"segments": parts, "attachments": case.pop("attachments", [])}
    described = {"name": "case", "member": member, "load": load, "far_end": far_end, "run": run, **case}
    head = {"format": "striketrace-project", "version": 1, "title": "commensurate"}
    result = solve(project_from_tree({**head, "materials": known, "cases": [described]}).cases[0])
    assert result.courant_worst == 1.0
    assert abs(result.time_step / STEP - 1) < 1e-9
    return result
