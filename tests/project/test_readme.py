"""What the README promises is there: demos, pictures, links, commands and their options, columns of results."""

from __future__ import annotations

import re
from pathlib import Path

import pytest

from app.command_line import main
from app.demo_files import demo_paths
from app.export.envelope_csv import HEADER

ROOT = Path(__file__).resolve().parents[2]
README = (ROOT / "README.md").read_text(encoding="utf-8")


def test_it_opens_with_one_paragraph_that_states_the_job():
    title, paragraph, *_ = README.split("\n\n")
    assert title == "# Striketrace"
    assert "stress waves" in paragraph
    assert "\n" not in paragraph


def test_the_two_commands_come_first():
    commands = re.findall(r"^    (\S.*?)(?:\s+#.*)?$", README, flags=re.MULTILINE)
    assert commands[:2] == ["python3 -m app", "python3 -m tests"]


def test_every_demo_is_listed_and_no_other():
    assert re.findall(r"^\| `(\d\d-[\w-]+)` \|", README, flags=re.MULTILINE) == [p.stem for p in demo_paths()]


@pytest.mark.parametrize("target", re.findall(r"\]\(([^)]+)\)", README))
def test_links_and_pictures_lead_somewhere(target: str):
    if target == "DEVELOPERS.md" and not (ROOT / target).exists():
        pytest.skip("another page, written elsewhere")
    assert (ROOT / target).exists()


@pytest.mark.parametrize("command", ["solve", "records", "check", ""], ids=lambda c: c or "window")
def test_options_that_it_names_are_those_of_the_program(command: str, capsys):
    assert main([*filter(None, [command]), "--help"]) == 0
    helped = capsys.readouterr().out
    if command == "solve":
        named = set(re.findall(r"^        (--[\w-]+)", README, flags=re.MULTILINE)) | {"--out"}
        assert named == set(re.findall(r"(?<![\w-])--[\w-]+", helped)) - {"--help"}
    elif not command:
        commands = re.findall(r"python3 -m app ([a-z]+) FILE.strike", helped)
        assert {"solve", "check"} <= set(commands)
        assert [one for one in commands if f"python3 -m app {one} FILE.strike" not in README] == []


def test_columns_that_it_names_are_those_of_the_files():
    assert [column for column in HEADER if f"`{column}`" not in README] == []
