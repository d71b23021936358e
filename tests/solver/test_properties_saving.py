"""Saving and loading is the identity: the same bytes and the same project, whatever it holds."""

from __future__ import annotations

import json
from pathlib import Path

from hypothesis import given
from hypothesis import strategies as st

from solver import load_project, parse_project, project_from_tree, project_to_text, solve
from tests.solver.strategies import SHARES, Tree, cases, logarithmic, materials, project_tree, project_trees

TEXT = st.text(st.characters(exclude_categories=["Cs"]), max_size=20)
#: Numbers as awkward as a file may hold: all digits, very small, very large, whole.
AWKWARD = st.floats(1e-12, 1e12, allow_nan=False) | st.integers(1, 10**9).map(float) | st.just(0.1 + 0.2)


@st.composite
def limits(draw: st.DrawFn) -> Tree | float | None:
    if draw(st.booleans()):
        return draw(st.none() | AWKWARD)
    return {
        "value": draw(AWKWARD),
        "basis": draw(TEXT),
        "reason": draw(st.none() | TEXT),
        "source": draw(st.none() | TEXT),
    }


@st.composite
def full_projects(draw: st.DrawFn) -> Tree:
    """Two cases of all kinds, and everything beside them that a file may carry."""
    known = [draw(materials(f"material {i}")) for i in range(3)]
    for material in known:
        material["limits"] = {"compression": draw(limits()), "tension": draw(limits())}
        material["density"] = draw(AWKWARD)
    described = [draw(cases(known)) for _ in range(2)]
    for i, case in enumerate(described):
        case["name"] = f"{draw(TEXT)} {i}"
        case["run"] |= {"blows": draw(st.sampled_from([1, 3, {"most": 5, "tolerance": 1e-4}]))}
    more: Tree = {"notes": draw(TEXT), "display_sign": draw(st.sampled_from(["compression", "tension"]))}
    more["display_units"] = draw(st.sampled_from(["metric", "us"]))
    if draw(st.booleans()):
        more["provenance"] = {"/cases/0/load/peak": {"source": draw(TEXT), "state": "typical"}}
        more["written_by"], more["records"] = draw(TEXT), {"folder": draw(TEXT), "share": draw(SHARES)}
    return {**project_tree(known, *described, **more), "title": draw(TEXT)}


@given(full_projects())
def test_text_to_project_to_text(tree: Tree) -> None:
    project = project_from_tree(tree)
    text = project_to_text(project)
    again = parse_project(text)
    assert again == project
    assert project_to_text(again) == text
    assert text.endswith("}\n")
    json.loads(text)  # plain JSON: no NaN, no infinity


@given(full_projects())
def test_every_number_reads_back_the_same(tree: Tree) -> None:
    """What was given stands in the file again, bit for bit, at the same place."""
    saved = json.loads(project_to_text(project_from_tree(tree)))

    def holds(given_part: object, saved_part: object, place: str) -> None:
        if isinstance(given_part, dict):
            assert isinstance(saved_part, dict), place
            for key, value in given_part.items():
                if value is not None:
                    holds(value, saved_part[key], f"{place}/{key}")
        elif isinstance(given_part, list):
            assert isinstance(saved_part, list), place
            assert len(saved_part) == len(given_part), place
            for i, value in enumerate(given_part):
                holds(value, saved_part[i], f"{place}/{i}")
        else:
            assert saved_part == given_part, place

    holds(tree, saved, "")


def test_bytes_of_a_file_come_back(tmp_path: Path) -> None:
    """Through the disk, with letters beyond ASCII and line ends as written."""
    tree = project_tree(
        [{"name": "Stahl S355 – außen", "young_modulus": 2.1e11, "density": 7850.0}],
        {
            "name": "Fall 1,2 m",
            "member": {
                "segments": [
                    {
                        "name": "①",
                        "length": 1.0,
                        "material": "Stahl S355 – außen",
                        "section": {"shape": "solid_round", "diameter": 0.1},
                    }
                ]
            },
            "load": {
                "kind": "pulse",
                "quantity": "force",
                "shape": "half_sine",
                "peak": 1e5,
                "duration": 1e-3,
            },
            "far_end": {"kind": "free"},
        },
        notes="Zeile 1\nZeile 2\tµ",
    )
    first = tmp_path / "a.strike"
    first.write_bytes(project_to_text(project_from_tree(tree)).encode())
    loaded = load_project(first)
    assert project_to_text(loaded).encode() == first.read_bytes()
    assert loaded == project_from_tree(tree)


@given(project_trees(("elastic",), linear=True), logarithmic(1, 2))
def test_a_saved_project_has_the_same_answer(tree: Tree, factor: float) -> None:
    """Loaded again it is solved to the same bits."""
    tree["materials"][0]["young_modulus"] *= factor
    project = project_from_tree(tree)
    here, there = solve(project.cases[0]), solve(parse_project(project_to_text(project)).cases[0])
    assert here.peak_compression == there.peak_compression
    assert here.ledger.final == there.ledger.final
