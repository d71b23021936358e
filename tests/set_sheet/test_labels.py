"""Words of the picture stand on nothing else, whatever the size of letters and picture, and inside it."""

from itertools import combinations

import pytest

from app.set_sheet.chart import chart
from app.set_sheet.depth_chart import depth_chart
from app.set_sheet.scene import Letters, Line, Scene, Words, box_of, fitted, overlap, touches
from app.units import Units
from solver.studies import Sheet, plan_of, solve_sheet
from solver.studies.settings import DepthSettings
from tests.studies.piles import layer, pile

US = Units("us")
METRIC = Units(compression_positive=True)
#: Height of a line and mean width of a letter, px, of 9 and 14 pt on the screen.
LETTERS = {"9 pt": (15.0, 6.2), "14 pt": (22.0, 9.2)}


def letters(size: str) -> Letters:
    line, wide = LETTERS[size]
    return Letters(lambda text, level: wide * len(text) * (1.1 if level == "strong" else 1.0), line)


@pytest.fixture(scope="module")
def sheet() -> Sheet:
    """With limits that are passed on some lines and with resistances at which nothing moves."""
    return solve_sheet(plan_of(pile(elements=24, limit=150e6, height=0.4), highest=12e6))


@pytest.mark.parametrize("units", [METRIC, US], ids=["metric", "us"])
@pytest.mark.parametrize("size", LETTERS)
@pytest.mark.parametrize(("width", "height"), [(920, 600), (790, 540), (560, 340)])
def test_no_word_stands_on_another(sheet: Sheet, units: Units, size: str, width: int, height: int) -> None:
    assert any(c.over for c in sheet.cells)
    assert any(not c.moves for c in sheet.cells)
    scene = chart(sheet, units, "0.25 m", width, height, letters(size))
    words = [(item.text, box_of(item, letters(size))) for item in scene if isinstance(item, Words)]
    for (text, box), (other, its) in combinations(words, 2):
        assert not overlap(box, its), (text, other)
    for text, (left, top, right, bottom) in words:
        assert left >= 0, text
        assert top >= 0, text
        assert right <= width, text
        assert bottom <= height, text


@pytest.mark.parametrize("units", [METRIC, US], ids=["metric", "us"])
@pytest.mark.parametrize("size", LETTERS)
@pytest.mark.parametrize(("width", "height"), [(920, 600), (790, 540)])
def test_no_word_of_the_depths_stands_on_another(units: Units, size: str, width: int, height: int) -> None:
    layers = [layer("Soft clay with shells", 3.0, 20e3), layer("Dense sand", 20.0, 400e3)]
    case = pile(elements=24, limit=150e6, layers=layers)
    depths = DepthSettings().study(case)
    assert depths is not None
    assert depths.first_refusal is not None
    assert depths.first_over is not None
    scene = depth_chart(depths, case, units, width, height, letters(size))
    words = [(item.text, box_of(item, letters(size))) for item in scene if isinstance(item, Words)]
    for (text, box), (other, its) in combinations(words, 2):
        assert not overlap(box, its), (text, other)
    assert all(
        0 <= left and 0 <= top and right <= width and low <= height for _t, (left, top, right, low) in words
    )


@pytest.mark.parametrize("size", LETTERS)
def test_no_line_runs_through_what_is_written_between_the_lines(sheet: Sheet, size: str) -> None:
    scene = chart(sheet, METRIC, "0.25 m", 920, 600, letters(size))
    between = [w for w in words_of(scene) if w.text.startswith("✕") or w.text == "practically no set"]
    assert "practically no set" in [w.text for w in between]
    assert any(w.text.startswith("✕") for w in between)
    lines = [item for item in scene if isinstance(item, Line) and item.ink == "ink"]
    assert not [w.text for w in between for line in lines if touches(box_of(w, letters(size)), line)]


def words_of(scene: Scene) -> list[Words]:
    return [item for item in scene if isinstance(item, Words)]


def test_line_through_a_box_is_seen() -> None:
    box = (0.0, 0.0, 10.0, 5.0)
    assert touches(box, Line(((-5, -5), (15, 10)), "ink"))
    assert touches(box, Line(((5, -5), (5, 10)), "ink"))
    assert not touches(box, Line(((-5, 6), (15, 6)), "ink"))
    assert not touches(box, Line(((-5, 2), (-1, 2)), "ink"))


def test_text_is_the_first_that_fits_or_cut() -> None:
    here = letters("9 pt")
    assert fitted(("compression, limit 25.0 MPa", "compression"), 100, here) == "compression"
    assert fitted(("compression",), 40, here) == "compr…"
