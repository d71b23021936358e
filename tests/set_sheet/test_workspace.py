"""The set sheet on the screen, by typing and clicking."""

from collections.abc import Iterator
from pathlib import Path

import pypdfium2
import pytest
from PySide6.QtCore import QPointF, Qt
from PySide6.QtWidgets import QFileDialog, QLabel
from pytestqt.qtbot import QtBot

from app.document import Document
from app.picture_files import PictureChoices, picture_file
from app.set_sheet.fields import NumbersField
from app.set_sheet.scene import Line, Mark, Scene, Words
from app.set_sheet.workspace import SetSheet
from app.words import MODEL_CAUTION
from solver import project_from_tree, solve
from tests.set_sheet.test_page_and_command import project

pytestmark = pytest.mark.qt_log_ignore("propagateSizeHints")  # of the offscreen screen
PATIENCE = 60_000


@pytest.fixture(scope="module", autouse=True)
def _compiled() -> None:
    """The first solve of a session may compile, which no one has to wait for with a time limit."""
    solve(project().cases[0].with_materials(project().materials))


@pytest.fixture
def shown(qtbot: QtBot) -> Iterator[SetSheet]:
    found = make(qtbot)
    yield found
    assert found.close_down()


def make(qtbot: QtBot, limit: float | None = 200e6, studies: dict | None = None) -> SetSheet:
    tree = project(limit, studies).model_dump(mode="json")
    document = Document(project_from_tree(tree))
    sheet = SetSheet(document)
    document.setParent(sheet)
    qtbot.addWidget(sheet)
    sheet.resize(1264, 700)
    sheet.show()
    wait(qtbot, sheet)
    return sheet


def wait(qtbot: QtBot, sheet: SetSheet) -> None:
    qtbot.waitUntil(lambda: sheet.solution.state in ("fresh", "refused"), timeout=PATIENCE)


def texts(scene: Scene) -> list[str]:
    return [item.text for item in scene if isinstance(item, Words)]


def test_fills_and_answers_by_itself(shown: SetSheet) -> None:
    assert shown.solution.sheet is not None
    assert shown.solution.sheet.complete
    assert shown.state.text() == "✓ up to date"
    assert shown.choices.stop_at.text().startswith("Stop when the mean set of the last 10 blows is")
    assert shown.choices.largest.text().startswith("Up to a drop height of")
    assert "drop height" in shown.choices.value.label.text()


def test_fields_end_in_one_line_and_say_what_is_usual(shown: SetSheet) -> None:
    """Those without a unit too; the usual depths, twelfths of 10 m, are told from the first to the last."""
    fields = [one.field for one in shown.choices.findChildren(NumbersField) if one.isVisible()]
    ends = {field.mapTo(shown.choices, field.rect().topRight()).x() for field in fields}
    assert len(fields) > 10
    assert len(ends) == 1
    assert shown.choices.to_depth.penetrations.field.placeholderText() == "0.833 to 10.0"
    labels = {one.label.text() for one in shown.choices.findChildren(NumbersField)}
    assert {"Quake of the shaft", "Energy of the blow"} <= labels


def test_what_the_numbers_are_stands_beside_them(shown: SetSheet) -> None:
    assert any(MODEL_CAUTION in label.text() and label.isVisible() for label in shown.findChildren(QLabel))


def test_lines_are_broken_exactly_where_a_limit_is_passed(shown: SetSheet) -> None:
    sheet = shown.solution.sheet
    assert sheet is not None
    frame = shown.chart.frame()
    scene = shown.chart.scene()
    heights = {round(frame.resistance.at(c.resistance), 6) for c in sheet.cells}
    lines = [
        i for i in scene if isinstance(i, Line) and len(i.points) == 2 and i.points[0][1] != i.points[1][1]
        and {round(p[1], 6) for p in i.points} <= heights
    ]  # fmt: skip
    over = sum(
        a.over or b.over for n in range(3) for a, b in zip(sheet.line(n), sheet.line(n)[1:], strict=False)
    )
    assert 0 < over < 27
    assert sum(bool(line.dash) for line in lines) == 4 * over  # set, compression, tension, energy
    assert len(lines) == 4 * 27
    assert sum(isinstance(i, Mark) for i in scene) == 4 * 30
    passed = sum(any(c.over for c in sheet.line(n)) for n in range(3))
    named = [t for t in texts(scene) if t.startswith("✕")]
    assert 0 < len(named) <= passed  # where a place is free of lines
    assert shown.told.text().count("limit passed at") == passed


def test_typed_range_and_values_solve_again_and_can_be_undone(shown: SetSheet, qtbot: QtBot) -> None:
    choices, document = shown.choices, shown._document
    type_into(qtbot, choices.lowest.field, "500")
    type_into(qtbot, choices.highest.field, "2 MN")
    type_into(qtbot, choices.values.field, "0.5  1,5")
    qtbot.waitUntil(
        lambda: shown.solution.plan is not None and len(shown.solution.plan.levels) == 2, timeout=PATIENCE
    )
    wait(qtbot, shown)
    plan = shown.solution.plan
    assert plan is not None
    assert (plan.resistances[0], plan.resistances[-1]) == (500e3, 2e6)
    assert sorted(level.value for level in plan.levels) == [0.5, 1.5]
    assert document.project.studies == {"set_sheet": {"lowest": 500e3, "highest": 2e6, "values": [0.5, 1.5]}}
    for _ in range(3):
        document.undo_stack.undo()
    assert not document.project.studies
    type_into(qtbot, choices.highest.field, "rubbish")
    assert choices.highest.problem.isVisibleTo(shown)


def test_edit_on_the_bench_solves_the_sheet_again_only_while_it_is_seen(
    shown: SetSheet, qtbot: QtBot
) -> None:
    before = shown.solution.sheet
    shown.hide()
    told: list[bool] = []
    shown.solution.changed.connect(lambda: told.append(True))
    shown._document.edit("Heavier ram", "load/ram_mass", 5000.0)
    assert not told
    assert shown.solution.sheet == before
    shown.show()
    qtbot.waitUntil(
        lambda: shown.solution.plan is not None and shown.solution.plan.case == shown._document.case,
        timeout=PATIENCE,
    )
    wait(qtbot, shown)
    sheet = shown.solution.sheet
    assert sheet is not None
    assert before is not None
    assert sheet.complete
    assert sheet.cells[0].set > before.cells[0].set


def test_measured_set_shows_a_band(shown: SetSheet, qtbot: QtBot) -> None:
    type_into(qtbot, shown.choices.measured.field, "5")
    qtbot.waitUntil(lambda: "in the middle" in shown.choices.shown.text(), timeout=PATIENCE)
    assert shown.choices.shown.text().startswith("A mean set of 5.00\u00a0mm ± 0.500\u00a0mm shows")


def test_point_nearest_to_the_pointer_is_read_out(shown: SetSheet) -> None:
    sheet = shown.solution.sheet
    assert sheet is not None
    cell = sheet.line(1)[4]
    frame = shown.chart.frame()
    at = QPointF(frame.set.at(cell.set or 0.0) + 1, frame.resistance.at(cell.resistance) - 2)
    assert shown.chart._nearest(at) == cell
    shown.chart.pointed.emit(cell)
    assert shown.told.text().startswith("0.7\u00a0m, ")
    shown.chart.pointed.emit(None)
    assert "within limits" in shown.told.text() or "limit passed" in shown.told.text()


def test_what_is_not_known_gives_bands_and_can_be_stopped(shown: SetSheet, qtbot: QtBot) -> None:
    choices = shown.choices
    choices.samples.setCurrentIndex(0)
    choices.samples.activated.emit(0)
    type_into(qtbot, choices.ranges.rows["cushion"].field, "1")
    type_into(qtbot, choices.ranges.rows["quake"].field, "0.5 2")
    studies = shown._document.project.studies
    assert studies is not None
    assert studies["set_sheet"]["samples"] == 200
    first = studies["set_sheet"]["unknowns"][0]
    assert (first["what"], first["low"], first["high"]) == ("quake", 0.5, 2.0)
    assert "cushion" not in [u["what"] for u in studies["set_sheet"]["unknowns"]]
    wait(qtbot, shown)
    qtbot.mouseClick(choices.work_out, Qt.MouseButton.LeftButton)
    assert choices.work_out.text() == "Stop"
    qtbot.mouseClick(choices.work_out, Qt.MouseButton.LeftButton)
    assert choices.work_out.text() == "Work out"
    qtbot.mouseClick(choices.work_out, Qt.MouseButton.LeftButton)
    qtbot.waitUntil(lambda: shown.solution.sampled is not None, timeout=PATIENCE)
    qtbot.waitUntil(lambda: "eight of ten of" in choices.samples_told.text(), timeout=PATIENCE)
    assert "A limit is passed" in choices.samples_told.text()


def test_down_to_depth_follows_a_factor_on_the_ground(shown: SetSheet, qtbot: QtBot) -> None:
    qtbot.mouseClick(shown.over_depth, Qt.MouseButton.LeftButton)
    qtbot.waitUntil(lambda: shown.by_depth.depths is not None, timeout=PATIENCE)
    before = shown.by_depth.depths
    assert before is not None
    assert len(before.points) == 12
    assert shown.told.text().startswith("At 10.0\u00a0m: 800\u00a0kN")
    assert texts(shown.to_depth.scene()).count("Driving time") == 1
    type_into(qtbot, shown.choices.to_depth.factors["shaft"].field, "0.5")
    type_into(qtbot, shown.choices.to_depth.penetrations.field, "5 10")
    qtbot.waitUntil(
        lambda: shown.by_depth.depths is not None and len(shown.by_depth.depths.points) == 2, timeout=PATIENCE
    )
    depths = shown.by_depth.depths
    assert depths is not None
    assert [(p.shaft, p.toe) for p in depths.points] == [(100e3, 400e3), (200e3, 400e3)]
    qtbot.waitUntil(lambda: shown.told.text().startswith("At 10.0\u00a0m: 600\u00a0kN"), timeout=PATIENCE)


def test_case_without_ground_is_refused_with_a_sentence(shown: SetSheet, qtbot: QtBot) -> None:
    def bare(tree: dict) -> None:
        tree["cases"][0]["ground"] = None
        tree["cases"][0]["far_end"] = {"kind": "free"}

    shown._document.edit_tree("No ground", bare)
    qtbot.waitUntil(lambda: shown.state.text().startswith("✕ A set needs ground"), timeout=PATIENCE)
    assert not shown.print_page.isEnabled()


def test_stop_keeps_what_is_there_and_solves_on(shown: SetSheet, qtbot: QtBot) -> None:
    shown.solution.solve_again()
    qtbot.waitUntil(lambda: shown.solution.state == "solving", timeout=PATIENCE)
    qtbot.mouseClick(shown.stop, Qt.MouseButton.LeftButton)
    assert shown.state.text().startswith("! Stopped")
    qtbot.mouseClick(shown.stop, Qt.MouseButton.LeftButton)
    qtbot.waitUntil(lambda: shown.solution.state == "fresh", timeout=PATIENCE)


def test_page_and_table_are_saved_where_asked(
    shown: SetSheet, qtbot: QtBot, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    qtbot.waitUntil(shown.print_page.isEnabled, timeout=PATIENCE)  # once depths are studied too
    for button, name, begins in (
        (shown.print_page, "page.pdf", b"%PDF"),
        (shown.export, "table.csv", b"# Set sheet"),
    ):
        monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_, n=name: (str(tmp_path / n), ""))
        with qtbot.waitSignal(shown.saving.told) as told:
            qtbot.mouseClick(button, Qt.MouseButton.LeftButton)
        assert told.args is not None
        assert name in told.args[0]
        assert (tmp_path / name).read_bytes().startswith(begins)


def type_into(qtbot: QtBot, field, text: str) -> None:
    field.setFocus()
    field.selectAll()
    qtbot.keyClicks(field, text)
    qtbot.keyClick(field, Qt.Key.Key_Return)
    field.clearFocus()


def test_the_chart_is_saved_as_a_picture_with_text(shown: SetSheet) -> None:
    document = pypdfium2.PdfDocument(picture_file(shown.chart.drawing(), PictureChoices("pdf")))
    text = document[0].get_textpage().get_text_range()
    document.close()
    drawn = texts(shown.chart.scene())
    assert sum(words in text for words in drawn) > 0.8 * len(drawn)
