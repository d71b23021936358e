"""What the sheet says of its points, in words, in the table for the rig and in files: points made by hand."""

from __future__ import annotations

import csv
from dataclasses import replace
from math import sqrt

import pytest

from app.set_sheet.files import sheet_csv
from app.set_sheet.rig_table import shown_at
from app.set_sheet.words import blows_text, criterion, over_lines, reading
from app.units import NO_BREAK, Units
from solver.answer.findings import StressAt, StressFinding
from solver.studies import Cell, Sheet, plan_of
from tests.studies.piles import pile

METRIC = Units()
CASE = pile(elements=24)
PLAN = plan_of(CASE, resistances=(400e3, 800e3, 1200e3, 1600e3), values=(1.0,))
LIMIT = 200e6


def stress(sign: str, value: float, position: float) -> StressFinding:
    at = StressAt(value, position, 0.003, "Pile", LIMIT)
    return StressFinding(sign, at, at)


def cell(row: int, set_m: float, compression: float = 100e6, tension: float = 20e6, **more: object) -> Cell:
    """One point: compression at 1 m, tension at 7 m, held against 200 MPa."""
    found = {
        "compression": stress("compression", compression, 1.0),
        "tension": stress("tension", tension, 7.0),
    }
    rest = {"at_rest": True, **found, **more}
    return Cell(row, 0, PLAN.resistances[row], PLAN.levels[0], set=set_m, **rest)


def plainly(text: str) -> str:
    return text.replace(NO_BREAK, " ").replace("\u202f", " ")


def test_each_column_of_the_file_holds_what_its_head_says() -> None:
    """A set of 0.1 mm is practically none: 10,000 blows a metre would be a number that nobody can hold on to."""
    sheet = Sheet(PLAN, (cell(0, 0.020), cell(1, 0.0001, tension=220e6)))
    lines = sheet_csv(sheet, "Trial").splitlines()
    assert any("all of the resistance is varied" in line for line in lines)
    first, second = csv.DictReader(line for line in lines if not line.startswith("#"))
    expected = {
        "total_resistance_N": 400e3,
        "varied_value": 1.0,
        "set_m": 0.020,
        "blows_per_metre": 50.0,
        "peak_compression_Pa": 100e6,
        "peak_compression_position_m": 1.0,
        "peak_tension_Pa": 20e6,
        "peak_tension_position_m": 7.0,
        "largest_share_of_limit": 0.5,
        "share_position_m": 1.0,
    }
    assert {key: float(first[key]) for key in expected} == expected
    assert second["blows_per_metre"] == ""
    assert float(second["largest_share_of_limit"]) == pytest.approx(1.1)
    assert float(second["share_position_m"]) == 7.0


def test_the_file_says_where_only_the_toe_is_varied() -> None:
    plan = plan_of(CASE, resistances=(500e3, 800e3), values=(1.0,), vary="toe")
    assert "the resistance of the toe is varied" in sheet_csv(Sheet(plan, ()), "Trial")


@pytest.mark.parametrize(("per", "blows"), [("0.25 m", "12.5"), ("m", "50.0"), ("ft", "15.2")])
def test_blows_are_counted_for_the_length_that_is_named(per: str, blows: str) -> None:
    """20 mm a blow: 250/20, 1000/20 and 304.8/20."""
    assert blows_text(cell(0, 0.020), per) == blows


def test_the_sentence_for_the_rig_forbids_a_blow_that_passes_a_limit() -> None:
    allowed, passed = criterion(cell(1, 0.010), METRIC), criterion(cell(1, 0.010, compression=210e6), METRIC)
    assert plainly(allowed).startswith("Stop when the mean set of the last 10 blows is 10 mm or less")
    assert plainly(passed).startswith("Do not drive with a drop height of 1 m: a limit is passed at 800 kN")


def test_a_passed_limit_is_told_from_the_lowest_resistance_to_the_highest() -> None:
    cells = [cell(0, 0.020), cell(1, 0.015, compression=210e6), cell(2, 0.010, compression=230e6)]
    told = over_lines(cells, METRIC)
    assert told is not None
    assert [plainly(words) for words in told] == [
        "compression limit passed at",
        "800 to 1200 kN, in Pile 1.00 m",
    ]


def test_a_point_that_had_to_be_settled_says_so() -> None:
    settled = "not at rest by itself"
    assert settled in reading(cell(0, 0.020, at_rest=False), "m", METRIC)
    assert settled not in reading(cell(0, 0.020), "m", METRIC)


def test_between_two_points_the_set_is_read_on_a_logarithmic_scale() -> None:
    """20 mm at 400 kN and 5 mm at 800 kN: their geometric mean, 10 mm, stands half way, at 600 kN. Below 0.25 mm there
    is practically no set, so that nothing is read there.
    """
    sheet = Sheet(PLAN, (cell(0, 0.020), cell(1, 0.005), cell(2, 0.0001)))
    assert shown_at(sheet, 0, sqrt(0.020 * 0.005)).resistance == pytest.approx(600e3, rel=1e-12)
    assert shown_at(sheet, 0, 0.001).resistance is None


def test_a_reading_beside_a_passed_limit_is_marked() -> None:
    """Between a point within the limit and one over it nobody knows where it is passed."""
    within, over = cell(0, 0.020), cell(1, 0.005, compression=210e6)
    assert shown_at(Sheet(PLAN, (within, over)), 0, 0.010).over
    assert not shown_at(Sheet(PLAN, (within, replace(over, compression=within.compression))), 0, 0.010).over
