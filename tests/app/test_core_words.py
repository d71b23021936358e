"""Facts in words: the verdict first, each number with its unit, each state by a sign and a word."""

from __future__ import annotations

from dataclasses import replace
from typing import get_args

import pytest

from app.run_words import in_brief
from app.standing import time_left
from app.starting_points import driven_pile, rod_or_bar
from app.terms import TERMS
from app.units import Units
from app.words import (
    LIMIT_CAUTION,
    MODEL_CAUTION,
    as_text,
    caution,
    notes,
    percent,
    place,
    quality,
    verdict,
    warning,
)
from solver import project_from_tree
from solver.answer.cautions import Caution, CautionKind
from solver.answer.findings import (
    EnergyFinding,
    Findings,
    Happening,
    Quality,
    SetFinding,
    StressAt,
    StressFinding,
)
from solver.answer.remark import Remark, RemarkKind, sentence
from solver.answer.result import EventKind

METRIC, US = Units(), Units("us")
CASE = project_from_tree(driven_pile()).cases[0]


def stress(sign="compression", value=163e6, limit=None, worst=None):
    peak = StressAt(value, 16.0, 4.9e-3, "Upper", limit)
    return StressFinding(sign, peak, worst or (peak if limit else None))


def findings(**changes):
    usual = {
        "compression": stress(limit=319e6),
        "tension": stress("tension", 27e6),
        "set": SetFinding(6.5e-3, 9.1e-3, 3.2e-3, 0.04, 24.0),
        "energy": EnergyFinding("Head", 1.2, 41.4e3, 0.012, "ram", 44e3, 47.1e3),
        "happenings": (),
        "remarks": (),
        "cautions": (),
        "quality": Quality(400, 3600, 1.1e-5, 1.0, 2e-13, True, True),
    }
    return Findings(**(usual | changes))


def told(found, units=METRIC):
    return [(line.figure, line.name, line.detail.replace("\u00a0", " ")) for line in verdict(found, units)]


def plain(line):
    return line.replace("\u00a0", " ")


def test_the_verdict_in_metric_units():
    compression, tension, set_line, energy = verdict(findings(), METRIC)
    assert plain(compression.figure) == "163 MPa"
    assert plain(compression.detail) == "✓ within the limit, 51 % · at 16.0 m, 4.90 ms"
    assert (compression.time, compression.position) == (4.9e-3, 16.0)
    assert plain(tension.detail) == "– no limit given · at 16.0 m, 4.90 ms"
    assert plain(set_line.figure) == "6.50 mm"
    # 0.25 m / 6.5 mm = 38.46 blows
    assert plain(set_line.detail) == "38.5 blows per 0.25 m · toe moved 9.10 mm"
    assert (
        plain(energy.detail)
        == "94 % of the ram's energy at impact, 44.0 kJ\n88 % of the drop energy, 47.1 kJ"
    )


def test_blows_per_foot_in_us_units():
    # 0.3048 m / 6.5 mm = 46.89 blows
    assert plain(verdict(findings(), US)[2].detail).startswith("46.9 blows per foot")


@pytest.mark.parametrize(
    ("value", "says"),
    [
        (150e6, "✓ within the limit, 75 %"),
        (190e6, "! near the limit, 95 %"),
        (200e6, "! near the limit, 100 %"),
        (200.4e6, "✕ over the limit, 100.2 %"),
        (240e6, "✕ over the limit, 120 %"),
    ],
)
def test_a_state_is_a_sign_and_a_word(value, says):
    assert verdict(findings(compression=stress(value=value, limit=200e6)), METRIC)[0].detail.startswith(says)


def test_the_worst_place_is_told_where_it_is_not_the_place_of_the_peak():
    worst = StressAt(90e6, 20.0, 6e-3, "Lower", 80e6)
    line = verdict(findings(compression=stress(limit=319e6, worst=worst)), METRIC)[0]
    assert plain(line.detail) == "at 16.0 m, 4.90 ms\n✕ over the limit, 112 % in Lower, at 20.0 m, 6.00 ms"
    assert line.state == "over"


def test_no_tension_and_no_set_are_told_as_such():
    lines = told(findings(tension=stress("tension", 1e-9), set=SetFinding(0.0, 9e-3, None, 0.04, 24.0)))
    assert lines[1] == ("0 MPa", "peak tension", "no tension anywhere")
    assert lines[2][2] == "the toe does not stay down · toe moved 9.00 mm"


@pytest.mark.parametrize("kind", get_args(EventKind))
@pytest.mark.parametrize("make", [driven_pile, rod_or_bar])
def test_every_event_has_its_sentence(kind, make):
    case = project_from_tree(make()).cases[0]
    found = findings(set=None, happenings=(Happening(kind, 1.0, 0.02, 1),))
    (note,) = notes(found, case, METRIC)
    assert note.text.endswith(".")
    assert note.time == 0.02


def test_events_that_come_again_and_again_are_counted():
    many = tuple(Happening("toe_lift", 24.0, 0.01 * (i + 1), i) for i in range(5))
    first, second = notes(findings(set=None, happenings=many), CASE, METRIC)
    assert plain(first.text) == "The toe lifts off the ground at 10.0 ms."
    assert plain(second.text) == "The toe lifts off the ground again at 20.0 ms (5 times in all)."


@pytest.mark.parametrize("kind", get_args(CautionKind))
@pytest.mark.parametrize("units", [METRIC, US])
def test_every_caution_has_its_sentence(kind, units):
    text = caution(Caution(kind, "gauges/0", "Head", 0.4, 0.9), units)
    assert text.endswith((".", "?", ")"))
    assert "Head" in text or kind == "short_pulse"


def test_the_paragraph_for_a_report_carries_every_line_and_the_cautions():
    found = findings(remarks=(Remark("layers_end", place=9.144),))
    text = as_text(found, CASE, METRIC)
    for line in verdict(found, METRIC):
        assert line.figure in text
    for told in (
        "The layers end at 9.14\u00a0m: below it no shaft resistance acts.",
        MODEL_CAUTION,
        LIMIT_CAUTION,
    ):
        assert told in text
    assert "\n" not in text


@pytest.mark.parametrize("kind", get_args(RemarkKind))
def test_every_remark_of_the_solver_has_its_sentence_in_the_units_shown(kind):
    """The command line says it in SI, the window in what is chosen: 9.144 m are 30 ft, 0.5 s are 500 ms."""
    remark = Remark(kind, 0.5, 9.144, "The kernels are not kept.")
    plain, shown = sentence(remark), warning(remark, US)
    assert plain.endswith(".")
    assert shown.endswith(".")
    assert (
        ("9.144 m" in plain)
        == ("30.0\u00a0ft" in shown)
        == (kind in ("large_strain", "layers_end", "mass_at_contact"))
    )
    timed = kind in ("not_at_rest", "ram_returns", "still_giving")
    assert ("500 ms" in plain) == ("500\u00a0ms" in shown) == timed


def test_a_run_that_was_stopped_says_so_first():
    found = findings(quality=Quality(400, 100, 1.1e-5, 1.0, 2e-13, False, False))
    assert notes(found, CASE, METRIC)[0].text.startswith("Stopped before the end")
    assert "still moves" in quality(found.quality, METRIC)[-1]


def test_shares_and_times_left():
    assert [percent(s) for s in (0.51, 0.004, 1.12, 1.0, 0.999)] == [
        "51 %",
        "0.40 %",
        "112 %",
        "100 %",
        "99.90 %",
    ]
    assert [time_left(s) for s in (3.2, 89, 600, 9000)] == [
        "3 s left",
        "89 s left",
        "10 min left",
        "2.5 h left",
    ]


def test_every_term_is_one_or_two_plain_sentences():
    assert len({term.word for term in TERMS}) == len(TERMS)
    for term in TERMS:
        assert term.means.endswith("."), term.word
        assert len(term.means) < 240, term.word


def test_a_rod_that_strikes_comes_into_the_verdict_once_it_nears_its_limit():
    calm, grave = stress(value=50e6, limit=100e6), stress(value=110e6, limit=100e6)
    lines = verdict(findings(striking=(grave, calm)), METRIC)
    assert len(lines) == len(verdict(findings(), METRIC)) + 1
    assert lines[-1].state == "over"
    assert "which strikes" in lines[-1].name
    assert any(
        "which strikes, sees up to 50.0 MPa" in plain(n.text)
        for n in notes(findings(striking=(grave, calm)), CASE, METRIC)
    )


def test_a_peak_after_a_second_blow_shows_the_peak_before_it():
    late = replace(
        stress("tension", 6.66e6, limit=6.5e6),
        struck_again=0.171,
        first=StressAt(3.53e6, 3.5, 0.17, "Upper", 6.5e6),
    )
    line = verdict(findings(tension=late), METRIC)[1]
    assert "after a second blow, 171 ms; before it 3.53 MPa (54 %) at 3.50 m, 170 ms" in plain(line.detail)
    assert (
        plain(in_brief(findings(tension=late), METRIC)[1])
        == "✕ over, 102 % · second blow; before it 3.53 MPa"
    )


def test_a_set_that_is_read_too_early_says_so_beside_its_number():
    early = replace(findings().set, last=False)
    line = next(one for one in verdict(findings(set=early), METRIC) if one.name == "set per blow")
    assert line.detail.startswith("! not the last word: the run ends too early")
    assert in_brief(findings(set=early), METRIC)[2].startswith("! ends too early")


def test_a_set_of_next_to_nothing_is_not_counted_in_blows():
    line = verdict(findings(set=SetFinding(7e-6, 0.8e-3, 3e-3, 0.2, 24.0)), METRIC)[2]
    assert plain(line.detail).startswith("practically none, over 1000 blows per 0.25 m · toe moved")


@pytest.mark.parametrize(
    ("position", "units", "says"),
    [
        (0.0025, US, "0.008 ft"),
        (0.00012, METRIC, "0 m"),
        (0.25, METRIC, "0.250 m"),
        (-0.01, METRIC, "−0.010 m"),
    ],
)
def test_a_place_near_the_struck_end_has_no_more_digits_than_a_mesh(position, units, says):
    assert plain(place(position, units)) == says
