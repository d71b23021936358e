"""The page of published checks: says what the checks say, also when they fail."""

from __future__ import annotations

import re
import xml.etree.ElementTree as ET

import numpy as np
import pytest

from tests.published.registry import Check, all_checks, picture, value
from tests.verification import __main__ as command
from tests.verification import html_page, markdown_page
from tests.verification.figure import ticks
from tests.verification.page import Page, number, shown


def _check(found: float, name: str = "dalembert: made up") -> Check:
    x = np.linspace(0, 1, 50)

    def work():
        yield value("one", 1.0, found, "m")
        yield picture("A line & its <shadow>", "x", "y", x, x**2, x**2 + 0.01)

    words = {"title": f"Title of {name}", "model": "rod | rod", "source": "nobody", "formula": "a < b"}
    return Check(
        topic="dalembert", name=name, tolerance=1e-3, share_of="the value", why="because", work=work, **words
    )


def _broken() -> Check:
    def work():
        raise ValueError("no answer at 3 m")
        yield

    return Check("dalembert", "dalembert: broken", "Broken", "m", "s", "f", 1e-3, "the value", "w", work)


def test_a_page_holds_what_its_checks_gave():
    page = Page((shown(_check(1.0)), shown(_check(1.5, "dalembert: wrong")), shown(_broken())), 1.0)
    assert not page.holds
    assert page.counts.startswith("1 of 3 checks hold: 2 comparisons")
    text = markdown_page.text(page)
    assert "✕ fails: one: off by 0.5, allowed 0.001" in text
    assert "✕ fails: ValueError: no answer at 3 m" in text
    assert "rod \\| rod" not in text.split("## Overview")[0]
    assert text.rstrip().endswith(page.counts)
    assert "## What this page does not cover" in text


def test_figures_are_well_formed_and_follow_the_reader_colours():
    text = html_page.text(Page((shown(_check(1.0)),), 1.0))
    drawings = re.findall(r"<svg.*?</svg>", text, flags=re.S)
    assert len(drawings) == 1
    root = ET.fromstring(drawings[0])
    lines = root.findall("{http://www.w3.org/2000/svg}polyline")
    assert [len(line.get("points").split()) for line in lines] == [50, 50]
    assert "A line &amp; its &lt;shadow&gt;" in text
    assert not re.search(r"#[0-9a-fA-F]{3,6}\b(?![^<]*\")", drawings[0])


@pytest.mark.parametrize(
    ("limits", "first", "last"),
    [((0.0, 1.0), 0.0, 1.0), ((-3.1, 7.2), -2.0, 6.0), ((0.9995, 1.0002), 0.9996, 1.0002)],
)
def test_ticks_are_round_and_inside(limits, first, last):
    found = ticks(*limits)
    assert found[0] == pytest.approx(first)
    assert found[-1] == pytest.approx(last)
    assert 3 <= len(found) <= 9


@pytest.mark.parametrize(
    ("x", "text"), [(0.0, "0"), (735.75888e3, "735758.88"), (1e-10, "1.0000000e-10"), (float("nan"), "none")]
)
def test_numbers_keep_eight_digits(x, text):
    assert number(x) == text


def test_the_command_writes_both_pages_and_tells_a_failure_by_its_status(tmp_path, monkeypatch, capsys):
    few = [c for c in all_checks() if c.topic == "stress_limits"]
    monkeypatch.setattr("tests.published.registry.all_checks", lambda: few)
    assert command.main(["--out", str(tmp_path / "a b"), "--html"]) == 0
    assert sorted(p.name for p in (tmp_path / "a b").iterdir()) == ["verification.html", "verification.md"]
    assert "2 of 2 checks hold" in capsys.readouterr().out
    monkeypatch.setattr("tests.published.registry.all_checks", lambda: [*few, _broken()])
    assert command.main(["--out", str(tmp_path)]) == 1
    assert "✕ dalembert: broken" in capsys.readouterr().err
