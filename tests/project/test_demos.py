"""The demo projects: they save to the same bytes, solve without complaint, and show what their notes say."""

from __future__ import annotations

import re
from functools import cache
from math import floor, log10

import pytest

from app.command_line import main
from app.demo_files import demo_paths
from app.limit_words import what_it_rests_on
from app.unit_text import value_of
from app.units import Units
from solver import Result, findings_of, load_project, project_to_text, solve
from solver.answer.cautions import cautions_of
from tests.project.demo_claims import CLAIMS, Claim

DEMOS = demo_paths()
NAMES = [path.stem for path in DEMOS]
#: Cautions that a demo is there to show.
SHOWN_CAUTIONS = {"06": {"gauge_near_end"}, "11": {"short_pulse"}}
#: Warnings that are facts of a scenario, not faults of a run, by how they begin.
SHOWN_WARNINGS = ("The ram is in the air at the end", "The plastic strain reaches", "'Rod' cracked")
#: Energy that may fail to close, as a share: members that stay linear and touch nothing that yields, and all others.
LINEAR, OTHERS = 1e-10, 1e-2
LINEAR_DEMOS = ("05", "07", "08", "10", "11", "12")
DIMENSIONS = {"MPa": "stress", "ksi": "stress", "mm": "small_length", "in": "small_length", "m": "length"}
DIMENSIONS |= {"ft": "length", "ms": "time", "µs": "time", "kN": "force", "J": "energy", "m/s": "velocity"}
DIMENSIONS |= {"mm/s": "velocity"}


@cache
def results(number: str) -> tuple[Result, ...]:
    """All cases of the demo whose file name begins with a number, solved once for all tests."""
    path = next(path for path in DEMOS if path.name.startswith(number))
    return tuple(solve(case) for case in load_project(path).cases)


def test_there_are_enough_and_a_pile_comes_first():
    assert len(DEMOS) >= 9
    assert NAMES[0] == "01-pipe-pile-in-layered-ground"
    assert len(load_project(DEMOS[0]).cases) == 3


@pytest.mark.parametrize("path", DEMOS, ids=NAMES)
def test_saving_gives_the_same_bytes(path):
    assert project_to_text(load_project(path)).encode() == path.read_bytes()


def test_the_command_line_finds_them_valid(capsys):
    assert main(["check", *map(str, DEMOS)]) == 0
    assert capsys.readouterr().err == ""


@pytest.mark.parametrize("path", DEMOS, ids=NAMES)
def test_it_solves_without_complaint(path):
    number = path.name[:2]
    for result in results(number):
        assert result.finished
        bad = [text for text in result.warnings if not text.startswith(SHOWN_WARNINGS)]
        assert bad == []
        assert result.ledger.residual < (LINEAR if number in LINEAR_DEMOS else OTHERS)
        assert {one.kind for one in cautions_of(result.case)} <= SHOWN_CAUTIONS.get(number, set())
        assert result.gauges


@pytest.mark.parametrize("path", DEMOS, ids=NAMES)
def test_its_notes_say_what_to_see_in_few_words(path):
    project = load_project(path)
    assert 200 < len(project.notes) < 1000
    assert len(re.findall(r"\d", project.notes)) > 10
    if any(case.far_end.kind == "ground" for case in project.cases):
        assert project.display_sign == "compression"


@pytest.mark.parametrize("path", DEMOS, ids=NAMES)
def test_its_limits_tell_what_they_rest_on(path):
    for material in load_project(path).materials:
        for sign in ("compression", "tension"):
            told = what_it_rests_on(material.limits, sign, Units())
            assert bool(told) == (material.limits.value(sign) is not None)


def test_two_have_their_limits_by_a_published_expression():
    assert [n for n, p in zip(NAMES, DEMOS, strict=True) if load_project(p).version == 2] == NAMES[:2]


def test_one_is_read_in_us_units_and_tension_governs_it():
    project = load_project(DEMOS[1])
    assert project.display_units == "us"
    states = [findings_of(result).tension.state for result in results("02")]
    assert states == ["over", "within", "within"]
    assert all(findings_of(result).compression.state == "within" for result in results("02"))


@pytest.mark.parametrize("claim", CLAIMS, ids=lambda c: f"{c.demo} case {c.case} {c.words}")
def test_what_the_notes_tell_is_so(claim: Claim):
    result = results(claim.demo)[claim.case]
    path = next(path for path in DEMOS if path.name.startswith(claim.demo))
    assert re.search(rf"(?<![\d.]){re.escape(claim.words)}(?![\w/])", load_project(path).notes)
    number, unit = claim.words.split(" ")
    dimension = DIMENSIONS.get(unit, "none")
    told = float(number) if dimension == "none" else value_of(number, dimension, unit)
    step = told / float(number) * 10.0 ** -len(number.partition(".")[2])
    assert abs(claim.value(result)) == pytest.approx(told, abs=0.5001 * step), _digits(claim.value(result))


def _digits(value: float) -> str:
    return f"{value:.{max(0, 5 - floor(log10(abs(value))))}f}" if value else "0"


def test_the_numbers_of_the_notes_are_held_by_claims():
    """Most of them: those with a unit of stress or of set, which the solver alone can tell."""
    loose = {}
    for path in DEMOS:
        told = set(re.findall(r"(?<![\d.])\d[\d.]* (?:MPa|ksi|mm/s)(?![\w/])", load_project(path).notes))
        loose[path.name[:2]] = told - {claim.words for claim in CLAIMS if claim.demo == path.name[:2]}
    given = {"09": {"200 MPa"}, "12": {"4 MPa"}}  # what was put in: the yield stress and the strength
    assert {demo: words for demo, words in loose.items() if words} == given
