"""The answer of a report in a line or two, as the command line and the first page tell it.

The bar carries a half-sine of 100 kN on a section of 1963.5 mm²: peaks of 50.9 MPa in compression, and as much in
tension once the wave has come back from the free end.
"""

from __future__ import annotations

import json
from typing import Any

import pytest

from app.command_line import main
from app.report.outcome import Solved, solved
from app.report.verdict import verdict_lines
from solver import project_from_tree, solve
from tests.export.conftest import bar_tree

SHARE = 50.93e6


def lines(**limits: float | None) -> tuple[str, ...]:
    tree = bar_tree()
    tree["materials"][0]["limits"] = {"compression": None, "tension": None, **limits}
    project = project_from_tree(tree)
    return verdict_lines(project, [solved(project.cases[0], solve(project.cases[0]))])


@pytest.mark.parametrize(
    ("limits", "told"),
    [
        (
            {"compression": 2 * SHARE, "tension": 4 * SHARE},
            "✓ Within the limits given: Pulse (compression 50 % of",
        ),
        (
            {"compression": 2 * SHARE, "tension": SHARE / 2},
            "✕ Over a limit: Pulse (tension 200 % of its limit).",
        ),
        ({"compression": 1.05 * SHARE, "tension": 4 * SHARE}, "! Near a limit: Pulse (compression 95 % of"),
        ({"compression": 2 * SHARE}, "– Not judged, for want of a limit: Pulse (tension)."),
        ({}, "– Not judged, for want of a limit: Pulse."),
    ],
)
def test_a_case_counts_as_its_worse_stress(limits: dict[str, float], told: str) -> None:
    (line,) = lines(**limits)
    assert line.startswith(told)


def test_what_was_not_computed_and_what_is_typical_is_counted() -> None:
    tree: dict[str, Any] = bar_tree(cases=3)
    mark = {"source": "a table", "state": "typical"}
    tree["provenance"] = {f"/cases/{n}/member/segments/0/length": mark for n in range(3)}
    tree["provenance"]["/materials/0/density"] = mark
    tree["provenance"]["/materials/0/young_modulus"] = mark | {"state": "confirmed"}
    project = project_from_tree(tree)
    told = verdict_lines(project, [Solved(project.cases[0], None, "too short")])
    assert told[0] == "! Not computed: Pulse."
    assert told[-1] == "! 2 values are typical ones, not confirmed for this site (in 4 places of the input)."


def test_the_command_tells_it_in_one_line(tmp_path, capsys) -> None:
    path = tmp_path / "bar.strike"
    path.write_text(json.dumps(bar_tree()), encoding="utf-8")
    out = tmp_path / "bar.html"
    assert main(["report", str(path), "--out", str(out), "--no-mesh-check"]) == 0
    told = capsys.readouterr().out
    assert told.count("\n") == 1
    assert told.startswith(f"{out}: 1 case. ✕ Over a limit: Pulse (tension 102 % of its limit)")
    assert "Over a limit: Pulse" in out.read_text(encoding="utf-8")
