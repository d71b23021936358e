"""Plain remarks in a form on what is allowed and hardly meant."""

from __future__ import annotations

import pytest

from app.bench.derived_text import caution_lines
from app.starting_points import driven_pile, slender_rod_by_echo
from app.units import Units
from solver import project_from_tree


@pytest.mark.parametrize(
    ("start", "longest", "told"),
    [
        (driven_pile, 0.1, ""),
        (driven_pile, 5.0, "Only about 4 elements along the member"),
        (driven_pile, 9.0, "longer than layer Soft clay (8.00 m)"),
        (slender_rod_by_echo, 0.5, ""),
        (slender_rod_by_echo, 1.5, "longer than segment Neck (1.20 m), which is then a single element"),
    ],
)
def test_an_element_length_that_is_too_long_is_told_where_it_is_typed(start, longest, told) -> None:
    tree = start()
    tree["cases"][0]["run"]["element_length"] = longest
    text = " ".join(lines_of(tree, "run"))
    assert told in text if told else text == ""


def test_a_run_that_ends_too_early_and_slips_of_a_unit_are_told_where_they_are_typed() -> None:
    tree = driven_pile()
    case = tree["cases"][0]
    assert lines_of(tree, "run") == lines_of(tree, "load/cushion") == lines_of(tree, "/materials/0") == []
    case["run"]["duration"] = 1e-4
    case["load"]["cushion"]["area"] = 0.2e-4  # 0.2 typed in a field of cm2, where m2 was meant
    case["load"]["drop_height"] = 1000.0
    case["member"]["segments"][0]["section"]["wall"] = 0.0125e-3
    case["ground"]["toe"]["quake"] = 2.5
    case["member"]["attachments"] = [{"position": 1.0, "kind": "mass", "value": 5000.0}]
    tree["materials"][0]["density"] = 7.85
    assert "ends before a wave has passed" in lines_of(tree, "run")[0]
    assert lines_of(tree, "load/cushion") == ["Area 0.200 cm² is unusually small: check its unit."]
    assert "Drop height 1000 m is unusually large: check its unit." in lines_of(tree, "load")
    assert "Wall 0.0125 mm is unusually small: check its unit." in lines_of(tree, "member/segments/0")
    assert lines_of(tree, "member/attachments/0") != []
    assert lines_of(tree, "far_end")[-1].startswith("Quake 2500 mm is unusually large")
    assert any("density" in line.casefold() for line in lines_of(tree, "/materials/0"))


def lines_of(tree, pointer: str) -> list[str]:
    lines = caution_lines(project_from_tree(tree).cases[0], Units(), pointer)
    return [line.replace("\u00a0", " ") for line in lines]
