"""The report's section of results: what it says of signs, of cases without an answer, and of many gauges."""

from __future__ import annotations

from datetime import datetime

from app.report.blocks import Heading, Paragraph, Picture
from app.report.choices import ReportChoices
from app.report.outcome import Material, Solved, solved
from app.report.section_results import results
from app.units import Units
from solver import Project, project_from_tree, solve
from tests.export.conftest import bar_tree

COMPRESSION, TENSION = Units(compression_positive=True), Units()


def section(project: Project, *cases: Solved, units: Units = TENSION, figures: tuple[str, ...] = ()):
    """The blocks of the section."""
    choices = ReportChoices(figures=figures)
    return list(results(Material(project, cases, choices, units, "", datetime(2026, 12, 1), "bar.strike")))


def test_it_begins_with_the_sign_of_its_numbers(bar):
    project = bar[0]
    for units, word in ((COMPRESSION, "Compression"), (TENSION, "Tension")):
        first = section(project, units=units)[0]
        assert isinstance(first, Paragraph)
        assert first.text.startswith(f"{word} is positive in every figure")


def test_under_the_name_of_a_case_without_an_answer_stands_why(bar):
    project = bar[0]
    blocks = section(project, Solved(project.cases[0], None, "It is too long."))
    assert [type(b) for b in blocks[1:]] == [Heading, Paragraph]
    assert blocks[2].text == "! This case could not be computed: It is too long."


def test_more_gauges_than_one_plot_holds_go_on_in_the_next():
    """Eight gauges: six and two, each once."""
    names = tuple(f"G{i}" for i in range(8))
    tree = bar_tree(gauges=names)
    tree["cases"][0]["run"]["duration"] = 0.0005
    project = project_from_tree(tree)
    blocks = section(project, solved(project.cases[0], solve(project.cases[0])), figures=("velocity",))
    told = [b.caption for b in blocks if isinstance(b, Picture)]
    assert told == ["Velocity at G0, G1, G2, G3, G4 and G5.", "Velocity at G6 and G7."]
