"""What is written reads back the same, and writing it again gives the same bytes; histories beside the project."""

from __future__ import annotations

import json
from typing import Any

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from solver import load_project, parse_project, project_from_tree, project_to_text, solve
from tests.project.valid import short_tree, valid_tree


def lost(given: Any, kept: Any, at: str = "") -> list[str]:
    """Where something that was given is not kept as it was; what was added as a default does not count."""
    if isinstance(given, dict) and isinstance(kept, dict):
        missing = [f"{at}/{key}" for key in given if key not in kept]
        return missing + [
            w for key in given if key in kept for w in lost(given[key], kept[key], f"{at}/{key}")
        ]
    if isinstance(given, list) and isinstance(kept, list) and len(given) == len(kept):
        return [w for i, (a, b) in enumerate(zip(given, kept, strict=True)) for w in lost(a, b, f"{at}/{i}")]
    return [] if given == kept else [at]


def test_nothing_is_lost_and_the_second_writing_is_the_first():
    tree = valid_tree()
    text = project_to_text(project_from_tree(tree))
    assert lost(tree, json.loads(text)) == []
    assert project_to_text(parse_project(text)) == text
    assert parse_project(text) == project_from_tree(tree)


def test_what_the_program_does_not_read_yet_is_kept():
    tree = valid_tree()
    tree["records"] = {"measured": [1, 2.5, None, {"deep": True}]}
    tree["studies"] = {"drops": {"from": 0.2, "to": 1.2}}
    tree["provenance"] = {"/materials/0/density": {"source": "a book", "state": "typical"}}
    tree["written_by"] = {"program": "another"}
    assert lost(tree, json.loads(project_to_text(project_from_tree(tree)))) == []


def test_optional_keys_are_not_written_where_nobody_gave_them():
    text = project_to_text(project_from_tree(valid_tree()))
    for key in ("written_by", "provenance", "records", "studies", "shaft_total"):
        assert f'"{key}"' not in text


@given(st.floats(min_value=5e-324, allow_nan=False, allow_infinity=False), st.text(max_size=40))
def test_every_number_and_every_text_reads_back_the_same(number: float, text: str):
    tree = short_tree()
    tree["materials"][0]["density"], tree["title"] = number, text
    written = project_to_text(project_from_tree(tree))
    project = parse_project(written.encode("utf-8").decode("utf-8"))
    assert (project.materials[0].density, project.title) == (number, text)
    assert project_to_text(project) == written


@pytest.mark.parametrize("mark", [b"", b"\xef\xbb\xbf"], ids=["plain", "with a byte order mark"])
@pytest.mark.parametrize("end", [b"\n", b"\r\n"], ids=["LF", "CRLF"])
def test_files_of_other_editors_are_read(mark: bytes, end: bytes, tmp_path):
    text = project_to_text(project_from_tree(valid_tree()))
    (tmp_path / "a.strike").write_bytes(mark + text.encode().replace(b"\n", end))
    assert project_to_text(load_project(tmp_path / "a.strike")) == text


def with_history(**keys: Any) -> dict[str, Any]:
    tree = short_tree()
    tree["cases"][0]["load"] = {"kind": "history", "quantity": "force", **keys}
    return tree


TIMES, VALUES = [0.0, 1e-5, 4e-5, 4e-5, 9e-5], [0.0, 5000.0, 7000.0, 3000.0, 0.0]


@pytest.mark.parametrize("end", ["\n", "\r\n"], ids=["LF", "CRLF"])
def test_a_history_from_a_file_is_the_history_of_its_points(end: str, tmp_path):
    rows = ["time in s,force in N", *(f"{t!r}, {v!r}," for t, v in zip(TIMES, VALUES, strict=True)), ""]
    (tmp_path / "blows").mkdir()
    (tmp_path / "blows" / "push.csv").write_bytes("\ufeff".encode() + end.join(rows).encode())
    path = tmp_path / "a.strike"
    path.write_text(json.dumps(with_history(file="blows/push.csv")), encoding="utf-8")
    from_file, from_points = load_project(path), project_from_tree(with_history(times=TIMES, values=VALUES))
    assert from_file.cases[0].load.samples == from_points.cases[0].load.samples
    forces = [solve(project.cases[0]).gauges["Middle"].force for project in (from_file, from_points)]
    assert np.array_equal(*forces)
    assert np.abs(forces[0]).max() > 1000  # the push arrives


def test_saving_keeps_the_name_of_the_file_and_not_its_points(tmp_path):
    (tmp_path / "push.csv").write_text("t,F\n0,0\n1e-5,1\n", encoding="utf-8")
    project = project_from_tree(with_history(file="push.csv"), tmp_path)
    load = json.loads(project_to_text(project))["cases"][0]["load"]
    assert load["file"] == "push.csv"
    assert load["times"] is None
    assert load["values"] is None
    path = tmp_path / "a.strike"
    path.write_text(project_to_text(project), encoding="utf-8")
    assert load_project(path) == project
