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
    lines = caution_lines(project_from_tree(tree).cases[0], Units(), "run")
    text = " ".join(lines).replace("\u00a0", " ")
    assert told in text if told else text == ""
