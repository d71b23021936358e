"""What is wrong under `/studies` is told by `check` with its place, and what belongs to others is left alone."""

from pathlib import Path

import pytest

from app.command_line import main
from solver import project_to_text
from tests.set_sheet.test_page_and_command import project

WRONG = [
    ({"set_sheet": {"hihgest": 1.0}}, "/studies/set_sheet/hihgest: is not a key that is known here"),
    ({"set_sheet": {"lowest": 5e6, "highest": 1e6}}, "/studies/set_sheet/lowest: must be below 'highest'"),
    (
        {"set_sheet": {"values": [1.0, 2.0, 3.0, 4.0, 5.0]}},
        "/studies/set_sheet/values: needs at most 4 entries",
    ),
    ({"set_sheet": {"pointer": "load/energy"}}, "/studies/set_sheet/pointer: fits no case of the project"),
    ({"set_sheet": {"count": "ten"}}, "/studies/set_sheet/count: must be a whole number, not 'ten'"),
    (
        {"set_sheet": {"unknowns": [{"what": "quake", "low": 2.0, "high": 1.0}]}},
        "/studies/set_sheet/unknowns/0",
    ),
    ({"depth": {"factors": {"Clay": 0.5}}}, "/studies/depth/factors/Clay: fits no case of the project"),
    (
        {"depth": {"penetrations": [40.0]}},
        "a penetration of 40 m is more than the length of any member, 12 m",
    ),
    ({"set_shet": {}}, "/studies/set_shet: is no study that is known here: did you mean 'set_sheet'?"),
    (
        {"report": {"papr": "A4"}},
        "/studies/report/papr: is not a key that is known here (did you mean 'paper'?)",
    ),
    ({"report": {"paper": "A3"}}, "/studies/report/paper: is not understood: read as 'A4'"),
]


@pytest.mark.parametrize(("studies", "told"), WRONG, ids=[told[:40] for _s, told in WRONG])
def test_fault_is_told_with_its_place(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], studies: dict, told: str
) -> None:
    file = tmp_path / "pile.strike"
    file.write_text(project_to_text(project(studies=studies)), encoding="utf-8")
    assert main(["check", str(file)]) == 2
    assert told in capsys.readouterr().err


def test_choices_that_fit_and_studies_of_others_are_valid(tmp_path: Path) -> None:
    studies = {
        "set_sheet": {"per": "ft", "values": [0.5, 1.0]},
        "depth": {"factors": {"toe": 0.5}},
        "report": {"paper": "Letter", "sections": ["summary", "results"]},
        "of_a_newer_program": {"x": 1},
    }
    file = tmp_path / "pile.strike"
    file.write_text(project_to_text(project(studies=studies)), encoding="utf-8")
    assert main(["check", str(file)]) == 0
