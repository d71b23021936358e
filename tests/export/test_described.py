"""Tables of the report that say what was described: every number beside its name, by hand, in the units shown."""

from __future__ import annotations

from math import pi, sqrt

import pytest

from app.report.blocks import Table
from app.report.described import exact, gauge_table, ground_tables, load_rows, segment_table
from app.units import NO_BREAK, Units
from solver import Case, project_from_tree
from tests.project.valid import valid_tree

METRIC = Units()


@pytest.fixture(scope="module")
def drop() -> Case:
    """A taper of 6 m over a pipe of 4 m; the ground begins at 2 m: 5 m of clay, 4 m of sand, a toe of 300 kN."""
    tree = valid_tree()
    tree["cases"][0]["ground"]["toe"]["gap"] = 0.001
    return project_from_tree(tree).cases[0]


def column(table: Table, head: str) -> list[str]:
    at = table.head.index(head)
    return [row[at].replace(NO_BREAK, " ") for row in table.rows]


def test_a_taper_is_told_at_both_of_its_ends(drop):
    sections = column(segment_table(drop.member.segments, drop, METRIC, ""), "Section")
    assert sections == [
        "pipe: outer diameter 400 mm, wall 10.0 mm; at its far end outer diameter 350 mm, wall 10.0 mm",
        "pipe: outer diameter 350 mm, wall 10.0 mm",
    ]


def test_layers_lie_one_under_the_other(drop):
    shaft, toe = ground_tables(drop, METRIC)
    assert column(shaft, "From the struck end") == ["2.00 m to 7.00 m", "7.00 m to 11.0 m"]
    assert column(shaft, "Unit resistance") == ["20.0 kPa", "40.0 kPa to 60.0 kPa"]
    assert column(toe, "Gap") == ["1.00 mm"]


def test_shaft_and_toe_together_are_their_sum(drop):
    """Inside counts half: the perimeter is pi (d + (d - 20 mm)/2). Clay of 20 kPa lies on 4 m of the taper, whose
    diameter is 383 mm at 2 m and 350 mm at 6 m (mean 366.7 mm), and on 1 m of 350 mm; sand of 40 to 60 kPa over 4 m
    reaches 3 m deep to the toe, 47.5 kPa in the mean: 168 kN and 231 kN, with the toe's 300 kN 699 kN.
    """

    def perimeter(diameter: float) -> float:
        return pi * (diameter + (diameter - 0.02) / 2)

    clay = 20e3 * (4 * perimeter((0.4 - 0.05 / 3 + 0.35) / 2) + perimeter(0.35))
    sand = 47.5e3 * 3 * perimeter(0.35)
    shaft, toe = ground_tables(drop, METRIC)
    assert column(shaft, "Shaft resistance") == [
        METRIC.show(v, "force").replace(NO_BREAK, " ") for v in (clay, sand)
    ]
    assert column(toe, "Toe resistance") == ["300 kN"]
    assert column(toe, "Shaft and toe together") == [f"{(clay + sand + 300e3) / 1e3:.0f} kN"]


def test_each_cushion_stands_under_its_own_name(drop):
    """The pile cushion is 3e8 Pa x 0.1 m2 / 0.1 m = 300 kN/mm, the other 500 kN/mm as given."""
    rows = {row[0]: row[1].replace(NO_BREAK, " ") for row in load_rows(drop, METRIC)}
    assert "coefficient of restitution 0.8" in rows["Cushion"]
    assert rows["Cushion"].endswith("(loading stiffness 500 kN/mm)")
    assert "coefficient of restitution 0.5" in rows["Pile cushion"]
    assert rows["Pile cushion"].endswith("(loading stiffness 300 kN/mm)")


def test_a_gauge_says_how_long_a_wave_takes_to_the_far_end_and_back(drop):
    """Steel carries waves at sqrt(E/rho) = 5,172 m/s whatever its section: 2 x 9.2 m and 2 x 0.5 m."""
    times = column(gauge_table(drop, METRIC), "To the far end and back")
    speed = sqrt(210e9 / 7850)
    assert times == [f"{2 * way / speed * 1e3:.3g} ms" for way in (9.2, 0.5)]


@pytest.mark.parametrize(
    ("value", "dimension", "text"),
    [(0.05, "mass", "50.0 g"), (4000.0, "mass", "4.00 t"), (2e-5, "time", "20.0 µs"), (0.0125, "time", "12.5 ms")],
)  # fmt: skip
def test_a_number_has_the_unit_that_stands_beside_it(value, dimension, text):
    assert exact(value, dimension, METRIC).replace(NO_BREAK, " ") == text
