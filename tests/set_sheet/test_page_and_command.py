"""The command line writes what the Python interface gives; the page can be read by a PDF library of other people."""

import csv
import json
from pathlib import Path

import pypdfium2
import pytest

from app.command_line import main
from app.set_sheet.answer_words import told_of
from app.set_sheet.files import Answers
from app.set_sheet.page_words import assumed
from app.set_sheet.printed import Page, page_pdf
from app.set_sheet.rig_table import sets_to_read, shown_at
from app.units import Units
from solver import project_to_text
from solver.model.load import Drop
from solver.model.project import Project
from solver.studies import plan_of, solve_sheet
from solver.studies.settings import DepthSettings, SheetSettings
from tests.studies.piles import pile


def project(limit: float | None = 200e6, studies: dict | None = None, units: str = "metric") -> Project:
    case = pile(elements=24, limit=limit)
    return Project(
        format="striketrace-project",
        version=1,
        title="Trial <pile> № 7",
        display_units=units,
        display_sign="compression",
        materials=tuple(case.materials.values()),
        cases=(case,),
        studies=studies,
    )


@pytest.fixture
def written(tmp_path: Path) -> Path:
    file = tmp_path / "pile.strike"
    file.write_text(project_to_text(project()), encoding="utf-8")
    assert main(["sheet", str(file), "--case", "Pile", "--out", str(tmp_path / "out"), "--quiet"]) == 0
    return tmp_path / "out"


def test_csv_and_json_hold_the_sheet(written: Path) -> None:
    lines = (written / "sheet.csv").read_text(encoding="utf-8").splitlines()
    rows = list(csv.DictReader(line for line in lines if not line.startswith("#")))
    sheet = solve_sheet(plan_of(pile(elements=24)))
    assert len(rows) == len(sheet.cells) == 30
    for row, cell in zip(rows, sheet.cells, strict=True):
        assert float(row["total_resistance_N"]) == cell.resistance
        assert float(row["set_m"]) == cell.set
        assert (row["blows_per_metre"] == "") == (not cell.moves)
        assert float(row["largest_share_of_limit"]) == cell.share
    tree = json.loads((written / "sheet.json").read_text(encoding="utf-8"))
    assert [p["set_m"] for p in tree["points"]] == [c.set for c in sheet.cells]
    assert tree["stop_at"]["total_resistance_N"] == 800e3
    assert tree["largest_blow"]["outcome"] == "found"


def test_first_page_has_the_sentence_and_the_table(written: Path) -> None:
    document = pypdfium2.PdfDocument(str(written / "sheet.pdf"))
    assert len(document) == 2
    text = " ".join(document[0].get_textpage().get_text_bounded().split())
    for words in (
        "Set sheet: Pile",
        "Trial <pile> № 7",
        "Stop when the mean set of the last 10 blows is",
        "10 blows move it by",
        "What is assumed",
        "for a licensed engineer to judge",
        "compression limit passed at",
        ", in Pile ",
        "That is for this resistance alone: in easier driving before it, tension can be larger.",
    ):
        assert words in text, words


def test_page_csv_and_json_tell_of_depth(written: Path) -> None:
    lines = (written / "depth.csv").read_text(encoding="utf-8").splitlines()
    rows = list(csv.DictReader(line for line in lines if not line.startswith("#")))
    told = json.loads((written / "sheet.json").read_text(encoding="utf-8"))["depth"]
    alone = DepthSettings().study(pile(elements=24))
    assert alone is not None
    for row, point, cell in zip(rows, told["points"], alone.points, strict=True):
        assert float(row["penetration_m"]) == point["penetration_m"] == cell.penetration
        assert float(row["toe_resistance_N"]) == point["toe_resistance_N"] == cell.toe
        assert float(row["set_m"]) == point["set_m"] == cell.cell.set
        assert (row["refuses"] == "true") == cell.refuses
    first = alone.first_over
    assert told["first_limit_passed_m"] == (None if first is None else first.penetration)
    document = pypdfium2.PdfDocument(str(written / "sheet.pdf"))
    text = " ".join(document[1].get_textpage().get_text_bounded().split())
    for words in ("Down to depth: Pile", "Below the ground surface, m", "Blows so far", "Driving time"):
        assert words in text, words
    assert ("refuses from" in text) == (alone.first_refusal is not None)


def test_long_names_and_many_layers_stay_on_the_page() -> None:
    """A name of 290 letters without a blank, and 200 layers: every letter lies within the margins, 42 points left and
    right, and nothing but the foot (at 24 points) below 36."""
    layers = [
        {
            "name": f"Layer {i}",
            "thickness": 0.05,
            "unit_resistance": 20e3,
            "quake": 0.002 + 1e-5 * i,
            "damping": 0.2 + 1e-3 * i,
        }
        for i in range(200)
    ]
    case = pile(elements=24, layers=layers).model_copy(update={"name": "P" * 290})
    sheet = solve_sheet(plan_of(case))
    units = Units()
    pdf = page_pdf(Page(sheet, "Title" * 60, units, told_of(Answers(), sheet, units)))
    page = pypdfium2.PdfDocument(pdf)[0]
    text = page.get_textpage()
    boxes = [text.get_charbox(i) for i in range(text.count_chars()) if text.get_text_range(i, 1).strip()]
    assert min(left for left, *_ in boxes) > 40
    assert max(right for _, _, right, _ in boxes) < page.get_width() - 40
    assert all(bottom > 36 or 18 < bottom < 30 for _, bottom, _, _ in boxes)
    words = " ".join(text.get_text_bounded().split())
    assert words.count("P") >= 290
    assert "Quake and damping factor of 201 layers and toe: 2.00" in words.replace("\xa0", " ")


def test_a_pile_cushion_stands_among_what_is_assumed() -> None:
    case = pile(elements=24)
    assert isinstance(case.load, Drop)
    assert case.load.cushion is not None
    soft = case.load.cushion.model_copy(update={"stiffness": 2e8, "restitution": 0.45})
    load = case.load.model_copy(update={"pile_cushion": soft, "cap_mass": 500.0})
    case = case.model_copy(update={"load": load})
    words = " ".join(assumed(solve_sheet(plan_of(case)), Units())).replace("\xa0", " ")
    assert "Cushion 400 kN/mm, coefficient of restitution 0.8; pile cushion 200 kN/mm" in words
    assert "restitution 0.45; cap 0.500 t" in words


def test_the_same_input_gives_the_same_bytes(tmp_path: Path) -> None:
    file = tmp_path / "pile.strike"
    file.write_text(project_to_text(project()), encoding="utf-8")
    for folder in ("one", "two"):
        assert main(["sheet", str(file), "--out", str(tmp_path / folder), "--quiet"]) == 0
    for name in ("sheet.csv", "sheet.json", "sheet.pdf", "depth.csv"):
        assert (tmp_path / "one" / name).read_bytes() == (tmp_path / "two" / name).read_bytes()


def test_samples_are_told_in_the_files(tmp_path: Path) -> None:
    file = tmp_path / "pile.strike"
    file.write_text(project_to_text(project()), encoding="utf-8")
    assert main(["sheet", str(file), "--out", str(tmp_path), "--samples", "60", "--quiet"]) == 0
    told = json.loads((tmp_path / "sheet.json").read_text(encoding="utf-8"))["not_known"]
    assert told["samples"] == 60
    assert len(told["lines"][0]["set_m"]) == 10
    document = pypdfium2.PdfDocument(str(tmp_path / "sheet.pdf"))
    assert "eight of ten of" in " ".join(document[0].get_textpage().get_text_bounded().split())


def test_a_measured_set_is_told_with_its_band(tmp_path: Path) -> None:
    file = tmp_path / "pile.strike"
    studies = {"set_sheet": {"measured_set": 0.006, "reading_error": 0.001}}
    file.write_text(project_to_text(project(studies=studies)), encoding="utf-8")
    assert main(["sheet", str(file), "--out", str(tmp_path), "--quiet"]) == 0
    band = json.loads((tmp_path / "sheet.json").read_text(encoding="utf-8"))["measured_set"][
        "total_resistance_N"
    ]
    assert band["least"] < band["middle"] < band["most"]
    document = pypdfium2.PdfDocument(str(tmp_path / "sheet.pdf"))
    assert "A mean set of 6.00" in " ".join(document[0].get_textpage().get_text_bounded().split())


def test_long_sheet_stays_on_its_page_in_other_units(tmp_path: Path) -> None:
    studies = {"set_sheet": {"values": [0.25, 0.5, 1.0, 1.5], "per": "ft", "count": 20}}
    file = tmp_path / "pile.strike"
    file.write_text(project_to_text(project(None, studies, "us")), encoding="utf-8")
    assert main(["sheet", str(file), "--out", str(tmp_path / "out"), "--quiet"]) == 0
    document = pypdfium2.PdfDocument(str(tmp_path / "out" / "sheet.pdf"))
    text = " ".join(document[0].get_textpage().get_text_bounded().split())
    assert len(document) == 2
    assert "Blows per ft" in text
    assert "1 of 2" in text
    page = document[0].get_textpage()
    bottoms = [page.get_rect(i)[1] for i in range(page.count_rects())]
    assert sum(bottom < 34 for bottom in bottoms) == 2  # the foot of the page: version and number
    assert "whether it survives is not judged" in text


def test_what_cannot_be_is_said_with_its_status(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    file = tmp_path / "pile.strike"
    out = str(tmp_path / "out")
    file.write_text(project_to_text(project()), encoding="utf-8")
    assert main(["sheet", str(file), "--case", "Other", "--out", out]) == 2
    assert "no case named 'Other'" in capsys.readouterr().err
    file.write_text(project_to_text(project(studies={"set_sheet": {"hihgest": 1.0}})), encoding="utf-8")
    assert main(["sheet", str(file), "--out", out]) == 2
    assert "/studies/set_sheet/hihgest" in capsys.readouterr().err
    file.write_text(
        project_to_text(project(studies={"set_sheet": {"pointer": "load/energy"}})), encoding="utf-8"
    )
    assert main(["sheet", str(file), "--out", out]) == 1
    assert "'load/energy' is not a number" in capsys.readouterr().err
    assert main(["sheet", str(file), "--samples", "3", "--out", out]) == 2
    assert "takes 50 to 5000 samples, not 3" in capsys.readouterr().err
    assert not (tmp_path / "out").exists()
    file.write_text(project_to_text(project()), encoding="utf-8")
    assert main(["sheet", str(file), "--out", str(file)]) == 2
    assert f"The folder {file} cannot be made" in capsys.readouterr().err


def test_table_for_the_rig_gives_the_points_of_the_sheet_back() -> None:
    sheet = solve_sheet(SheetSettings().plan(pile(elements=24)))
    for line in range(3):
        for cell in sheet.line(line)[1:-1]:
            if cell.set is not None and cell.moves:
                shown = shown_at(sheet, line, cell.set)
                assert shown.resistance == pytest.approx(cell.resistance, rel=1e-9)
    sets = sets_to_read(sheet, 1e-3)
    assert sets == sorted(sets)
    assert 3 <= len(sets) <= 9
