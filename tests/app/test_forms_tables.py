"""Tables of segments, layers and gauges: typing, pasting from a spreadsheet, filling, adding and removing rows."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st
from PySide6.QtCore import QItemSelectionModel, Qt
from PySide6.QtGui import QGuiApplication
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QTableView, QWidget

from app.bench.tables.pasted import cells_of
from app.bench.tables.tables import Tables
from app.document import Document
from app.sight import Sight
from app.starting_points import driven_pile, rod_or_bar, slender_rod_by_echo
from solver import project_from_tree

Tree = dict[str, Any]


@dataclass
class Desk:
    """The drawer on screen, open at one table."""

    document: Document
    sight: Sight
    tables: Tables
    window: QWidget
    qtbot: Any

    def column(self, heading: str) -> int:
        return [c.heading for c in self.tables.model.content.columns].index(heading)

    def text(self, row: int, heading: str) -> str:
        return self.tables.model.index(row, self.column(heading)).data()

    def go_to(self, row: int, heading: str) -> None:
        self.tables.view.setCurrentIndex(self.tables.model.index(row, self.column(heading)))

    def type_at(self, row: int, heading: str, text: str) -> None:
        self.go_to(row, heading)
        self.tables.view.edit(self.tables.view.currentIndex())
        editor = (
            self.tables.view.indexWidget(self.tables.view.currentIndex()) or self.tables.view.focusWidget()
        )
        editor.selectAll()
        QTest.keyClicks(editor, text)
        QTest.keyClick(editor, Qt.Key.Key_Return)
        self.qtbot.waitUntil(lambda: self.tables.view.state() != QTableView.State.EditingState)

    def paste_at(self, row: int, heading: str, text: str) -> None:
        self.go_to(row, heading)
        QGuiApplication.clipboard().setText(text)
        self.tables.paste()

    @property
    def case(self):
        return self.document.case


@pytest.fixture
def desk(qtbot) -> Callable[[Tree, str], Desk]:
    def make(tree: Tree, table: str) -> Desk:
        document, sight = Document(project_from_tree(tree)), Sight()
        window = QWidget()
        window.resize(1100, 260)
        tables = Tables(document, sight, window)
        tables.setGeometry(window.rect())
        qtbot.addWidget(window)
        window.show()
        qtbot.waitExposed(window)
        tables.open_table(table)
        return Desk(document, sight, tables, window, qtbot)

    return make


def test_a_table_shows_the_fields_of_every_shape(desk) -> None:
    tree = slender_rod_by_echo()
    tree["cases"][0]["member"]["segments"][1]["section"] = {
        "shape": "pipe",
        "outer_diameter": 0.5,
        "wall": 0.02,
    }
    at = desk(tree, "member/segments")
    assert [at.text(row, "Length") for row in range(3)] == ["8.00", "1.20", "8.80"]
    assert [at.text(row, "Wall") for row in range(3)] == [None, "20.0", None]
    assert at.tables.model.headerData(at.column("Wall"), Qt.Orientation.Horizontal) == "Wall\nmm"


def test_a_cell_takes_typing_in_any_unit(desk) -> None:
    at = desk(slender_rod_by_echo(), "member/segments")
    at.type_at(1, "Length", "6 ft")
    assert at.case.member.segments[1].length == pytest.approx(1.8288)
    assert at.document.undo_stack.undoText() == "Set length of Neck"


def test_a_pasted_block_is_one_step_and_adds_the_rows_it_needs(desk) -> None:
    at = desk(driven_pile(), "ground/layers")
    at.paste_at(0, "Name", "Fill\t2\t10\nClay\t5,5\t20\nSand\t6\t55\n")
    layers = at.case.ground.layers
    assert [(layer.name, layer.thickness, layer.unit_resistance) for layer in layers] == [
        ("Fill", 2.0, 10e3),
        ("Clay", 5.5, 20e3),
        ("Sand", 6.0, 55e3),
    ]
    assert at.document.undo_stack.count() == 1
    at.document.undo_stack.undo()
    assert [layer.name for layer in at.case.ground.layers] == ["Soft clay", "Dense sand"]


def test_headings_of_a_pasted_sheet_make_no_row_and_their_units_hold(desk) -> None:
    at = desk(driven_pile(), "ground/layers")
    at.paste_at(0, "Name", "Name\tThickness (ft)\tUnit resistance [ksf]\nFill\t10\t1\nClay\t20\t2\n")
    assert [layer.name for layer in at.case.ground.layers] == ["Fill", "Clay"]
    # exact: feet
    assert [layer.thickness for layer in at.case.ground.layers] == pytest.approx([3.048, 6.096])
    assert at.case.ground.layers[0].unit_resistance == pytest.approx(47880.26, rel=1e-6)  # 1000 lbf/ft²


def test_headings_name_their_columns_wherever_the_block_is_put(desk) -> None:
    at = desk(rod_or_bar(), "gauges")  # between name and position these have "On"
    at.paste_at(0, "Name", "Name\tPosition (in)\nA\t36\nB\t60\n")
    assert [(g.name, g.on) for g in at.case.gauges] == [("A", "member"), ("B", "member")]
    assert [g.position for g in at.case.gauges] == pytest.approx([0.9144, 1.524])


def test_headings_that_the_table_does_not_have_are_refused_as_a_whole(desk) -> None:
    at = desk(rod_or_bar(), "gauges")
    before = at.document.project
    at.paste_at(0, "Name", "Gauge\tDistance [ft]\nA\t3\nB\t5\n")
    assert at.document.project == before
    assert not at.document.rejected
    assert "no column 'Gauge'" in at.tables.note.text()
    assert "Name, On, Position" in at.tables.note.text()


def test_a_first_row_that_is_not_the_headings_of_its_columns_stays(desk) -> None:
    at = desk(driven_pile(), "ground/layers")
    at.paste_at(0, "Name", "Thickness\t2\nName\t3\n")
    assert [layer.name for layer in at.case.ground.layers] == ["Thickness", "Name"]


def test_cells_that_make_no_sense_say_why_and_the_others_are_taken(desk) -> None:
    at = desk(driven_pile(), "gauges")
    at.paste_at(0, "Position", "2\nnowhere\n18\n")
    assert [g.position for g in at.case.gauges] == [2.0, 10.0, 18.0]
    assert at.text(1, "Position") == "✕ nowhere"
    assert at.tables.note.text().startswith(
        "✕ One cell was not taken. Position, row 2: 'nowhere' is no number"
    )
    at.go_to(1, "Position")
    assert "no number" in at.tables.note.text()
    at.type_at(1, "Position", "11")
    assert not at.document.rejected
    assert at.case.gauges[1].position == 11.0


def test_a_block_that_the_project_refuses_changes_nothing_and_says_why(desk) -> None:
    at = desk(driven_pile(), "gauges")
    at.paste_at(0, "Position", "2\n30\n")
    assert [g.position for g in at.case.gauges] == [1.5, 10.0, 19.5]
    told = at.tables.note.text().replace("\u00a0", " ")
    assert "'Gauge 2' at 30.0 m lies beyond the member's end" in told


def test_a_block_that_is_refused_leaves_no_red_cells_of_the_block_before(desk) -> None:
    at = desk(driven_pile(), "gauges")
    at.paste_at(0, "Position", "2\nnowhere\n18\n")
    at.paste_at(0, "Position", "2\n30\n")
    assert at.text(1, "Position") == "10.0"


def test_one_value_fills_all_selected_cells(desk) -> None:
    at = desk(driven_pile(), "ground/layers")
    column = at.column("Quake")
    at.go_to(0, "Quake")
    chosen = at.tables.view.selectionModel()
    chosen.select(at.tables.model.index(1, column), QItemSelectionModel.SelectionFlag.Select)
    QGuiApplication.clipboard().setText("3")
    at.tables.paste()
    assert [layer.quake for layer in at.case.ground.layers] == [0.003, 0.003]
    assert not any(p.endswith("/quake") and "layers" in p for p in at.document.project.provenance)


def test_what_is_copied_can_be_pasted_back(desk) -> None:
    at = desk(driven_pile(), "ground/layers")
    at.tables.view.selectAll()
    at.tables.copy()
    before = at.document.project
    at.go_to(0, "Name")
    at.tables.paste()
    assert at.document.project.cases == before.cases


def test_a_choice_is_pasted_by_its_word_and_its_numbers_with_it(desk) -> None:
    at = desk(slender_rod_by_echo(), "member/segments")
    tree = at.document.tree
    assert "Diameter" in [c.heading for c in at.tables.model.content.columns]
    at.paste_at(0, "Section", "Octagon\t")
    assert at.case.member.segments[0].section.shape == "octagon"
    assert tree["cases"][0]["member"]["segments"][0]["section"]["diameter"] == pytest.approx(
        at.case.member.segments[0].section.across_flats
    )
    at.paste_at(0, "Section", "Triangle")
    assert "is not among the choices" in at.document.problem_at("member/segments/0/section#kind")


def test_rows_are_added_and_removed_and_follow_the_selection(desk, qtbot) -> None:
    at = desk(driven_pile(), "gauges")
    at.go_to(0, "Name")
    assert at.sight.selection == "gauges/0"
    qtbot.mouseClick(at.tables.buttons["add"], Qt.MouseButton.LeftButton)
    assert len(at.case.gauges) == 4
    qtbot.waitUntil(lambda: at.tables.view.currentIndex().row() == 1)
    qtbot.mouseClick(at.tables.buttons["remove"], Qt.MouseButton.LeftButton)
    assert [g.name for g in at.case.gauges] == ["Gauge 1", "Gauge 2", "Gauge 3"]
    at.sight.set(selection="gauges/2")
    assert at.tables.view.currentIndex().row() == 2


def test_tabs_offer_the_lists_that_the_case_has(desk) -> None:
    at = desk(slender_rod_by_echo(), "member/segments")
    shown = [tab.text() for tab in at.tables.tabs.values() if not tab.isHidden()]
    assert shown == ["Segments", "Gauges", "Attachments", "Materials"]


@pytest.mark.parametrize(
    ("text", "cells"),
    [
        ("1\t2\n3\t4\n", [["1", "2"], ["3", "4"]]),
        ("1;2\r\n3;4", [["1", "2"], ["3", "4"]]),
        ("1,5\n2,5\n", [["1,5"], ["2,5"]]),
        ("0.1, 20\n0.2, 30", [["0.1", "20"], ["0.2", "30"]]),
        ('"a\tb"\t2', [["a\tb", "2"]]),
        ("", []),
    ],
)
def test_blocks_are_read_as_spreadsheets_write_them(text: str, cells: list[list[str]]) -> None:
    assert cells_of(text) == cells


@given(
    st.lists(st.lists(st.text("abc 12.5-", min_size=1).map(str.strip), min_size=2, max_size=4), min_size=1)
)
def test_any_block_of_tabs_comes_back_as_its_cells(block: list[list[str]]) -> None:
    """Empty lines at the end are no rows."""
    while block and not any(block[-1]):
        block = block[:-1]
    assert cells_of("\n".join("\t".join(line) for line in block)) == block
