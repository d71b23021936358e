"""The guide to the project file names every key, its unit and what must be given, as the program has them."""

from __future__ import annotations

import re
from pathlib import Path
from typing import get_args

import pytest
from pydantic import BaseModel

from app.demo_files import demo_paths
from solver.model import limits, load, material, member, project, section, surroundings
from solver.model.quantity import Described, quantity_of
from solver.model.section import Section

GUIDE = Path(__file__).resolve().parents[2] / "demo_projects" / "README.md"
#: Which description each heading of the guide is about.
HEADINGS: dict[str, type[BaseModel]] = {
    "The project": project.Project,
    "A mark of `provenance`": project.Provenance,
    "A material": material.Material,
    "A limit with its basis": material.Limit,
    "Expression `steel`": limits.SteelLimits,
    "Expression `prestressed_concrete`": limits.PrestressedConcreteLimits,
    "Expression `reinforced_concrete`": limits.ReinforcedConcreteLimits,
    "Expression `timber`": limits.TimberLimits,
    "Law `elastic`": material.Elastic,
    "Law `viscoelastic`": material.Viscoelastic,
    "Law `elastic_plastic`": material.ElasticPlastic,
    "Law `brittle_tension`": material.BrittleTension,
    "Law `large_strain`": material.LargeStrain,
    "A case": project.Case,
    "The member": member.Member,
    "A segment": member.Segment,
    "Joint `bonded`": member.Bonded,
    "Joint `contact`": member.Contact,
    "Joint `slack_splice`": member.SlackSplice,
    "An attachment": member.Attachment,
    "Shape `solid_round`": section.SolidRound,
    "Shape `pipe`": section.Pipe,
    "Shape `rectangle`": section.Rectangle,
    "Shape `octagon`": section.Octagon,
    "Shape `h`": section.HSection,
    "Shape `voided_square`": section.VoidedSquare,
    "Shape `filled_pipe`": section.FilledPipe,
    "Shape `custom`": section.Custom,
    "Load `pulse`": load.Pulse,
    "Load `history`": load.History,
    "Load `drop`": load.Drop,
    "A cushion": load.Cushion,
    "Load `striker`": load.Striker,
    "Load `none`": load.NoLoad,
    "Far end `free`": surroundings.Free,
    "Far end `fixed`": surroundings.Fixed,
    "Far end `spring`": surroundings.SpringEnd,
    "Far end `dashpot`": surroundings.DashpotEnd,
    "Far end `matched`": surroundings.MatchedEnd,
    "Far end `wall`": surroundings.Wall,
    "Far end `ground`": surroundings.GroundToe,
    "The ground": surroundings.Ground,
    "A layer": surroundings.Layer,
    "A shaft total": surroundings.ShaftTotal,
    "A toe": surroundings.Toe,
    "Model `radiation`": surroundings.Radiation,
    "A gauge": project.Gauge,
    "The run": project.Run,
    "Blows until the set repeats": project.RepeatedBlows,
}
#: Told in running text: both ends of `limits`, and the segments that a ram is made of.
IN_WORDS = {material.Limits, member.RodParts}
#: The table of what layers, shaft and toe have in common stands once, under "The ground".
SHARED = set(surroundings.Resistance.model_fields)

#: A row: its key, unit, what holds when it is left out, and the words.
Row = tuple[str, str, str, str]


def sections() -> dict[str, str]:
    """The text under each heading, without that of the headings below it."""
    parts = re.split(r"^#{2,3} (.+)$", GUIDE.read_text(encoding="utf-8"), flags=re.MULTILINE)
    return dict(zip(parts[1::2], parts[2::2], strict=True))


def rows(text: str) -> list[Row]:
    found = re.findall(r"^\| `(\w+)` \| (.*?) ?\| (.*?) ?\| (.*?) ?\|$", text, flags=re.MULTILINE)
    return [(key, unit.strip(), without.strip(), words) for key, unit, without, words in found]


def described() -> set[type[BaseModel]]:
    """Every description that a file can hold but for its studies, which are described in words."""
    pending: list[type[BaseModel]] = [Described]
    found = set()
    while pending:
        below = pending.pop().__subclasses__()
        found |= set(below)
        pending += below
    found = {model for model in found if model.__module__.startswith("solver.model.")}
    return found - {Section, surroundings.Resistance}


def own_keys(model: type[BaseModel]) -> set[str]:
    """The keys of a description, without the one that names its kind in a heading, and without shared ones."""
    keys = set(model.model_fields)
    for name in ("kind", "shape"):
        field = model.model_fields.get(name)
        if field is not None and len(get_args(field.annotation)) == 1:
            keys.discard(name)
    return keys - SHARED if issubclass(model, surroundings.Resistance) else keys


def test_every_description_has_a_heading():
    assert described() == set(HEADINGS.values()) | IN_WORDS
    assert [heading for heading in HEADINGS if heading not in sections()] == []


@pytest.mark.parametrize("heading", HEADINGS)
def test_the_table_under_a_heading_is_that_of_the_program(heading: str):
    model, text = HEADINGS[heading], sections()[heading]
    table = rows(text)
    keys = [row[0] for row in table]
    wanted = own_keys(model)
    if model is surroundings.Ground:
        assert {row[0] for row in table} == wanted | SHARED
    else:
        assert set(keys) == wanted
    assert len(keys) == len(set(keys))
    for key, unit, without, _ in table:
        owner = model if key in model.model_fields else surroundings.Layer
        declared = quantity_of(owner, key)
        assert unit == (declared.unit if declared else ""), key
        assert (without == "must be given") == owner.model_fields[key].is_required(), key
        assert without, key
        default = owner.model_fields[key].default
        if not owner.model_fields[key].is_required() and isinstance(default, bool | float | str | int):
            assert without.strip("`").strip('"') in (_told(default), "empty"), key
    if not wanted:
        assert "It has no further keys." in text


def _told(default: object) -> str:
    if isinstance(default, bool):
        return str(default).lower()
    return f"{default:g}" if isinstance(default, float) else str(default)


@pytest.mark.parametrize("heading", HEADINGS)
def test_every_choice_of_words_is_named(heading: str):
    model, text = HEADINGS[heading], sections()[heading]
    for name in own_keys(model):
        choices = [c for c in get_args(model.model_fields[name].annotation) if isinstance(c, str)]
        assert [choice for choice in choices if f'"{choice}"' not in text] == [], name


def test_kinds_and_shapes_stand_in_their_headings():
    for heading, model in HEADINGS.items():
        for name in ("kind", "shape"):
            field = model.model_fields.get(name)
            choices = get_args(field.annotation) if field else ()
            if len(choices) == 1:
                assert heading.endswith(f"`{choices[0]}`")


def test_the_limits_and_a_ram_of_segments_are_told_in_words():
    text = GUIDE.read_text(encoding="utf-8")
    assert all(f"`{key}`" in sections()["A material"] for key in material.Limits.model_fields)
    assert "an object with `segments`" in text
    assert demo_paths()  # "the projects in this folder"
