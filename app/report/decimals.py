"""A report with decimal commas: in every number that the program wrote, and in no name that a person gave."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterable
from dataclasses import replace

from app import __version__
from app.report.blocks import Block, Bullets, Heading, Listing, Paragraph, Picture, Report, Table
from app.report.figures.marks import Figure, Text
from solver import Project

#: A number with one point; "10.7.8" and "0.1.0" are no such numbers.
POINT = re.compile(r"(?<![\d.])(\d+)\.(\d+)(?![\d.]*\.\d|\d)")


def with_commas(report: Report, project: Project) -> Report:
    """The report with a comma for every decimal point, but in names, notes and listings."""
    change = _changer(_names(project))
    sections = tuple(
        replace(section, blocks=tuple(_block(block, change) for block in section.blocks))
        for section in report.sections
    )
    return replace(report, sections=sections)


def _names(project: Project) -> Iterable[str]:
    yield from (__version__, project.title, project.notes)
    for material in project.materials:
        yield material.name
        for limit in (material.limits.compression, material.limits.tension):
            yield from (getattr(limit, key, None) or "" for key in ("basis", "reason", "source"))
    for case in project.cases:
        yield case.name
        yield from (s.name for s in (*case.member.segments, *case.ram_segments))
        yield from (g.name for g in case.gauges)
        yield from (layer.name for layer in (case.ground.layers if case.ground else ()))
    yield from (mark.source for mark in (project.provenance or {}).values())


def _changer(names: Iterable[str]) -> Callable[[str], str]:
    kept = sorted({name for name in names if POINT.search(name)}, key=len, reverse=True)
    whole = re.compile("|".join(map(re.escape, kept))) if kept else None

    def change(text: str) -> str:
        if whole is None:
            return POINT.sub(r"\1,\2", text)
        found, at = [], 0
        for name in whole.finditer(text):
            found += [POINT.sub(r"\1,\2", text[at : name.start()]), name.group()]
            at = name.end()
        return "".join(found) + POINT.sub(r"\1,\2", text[at:])

    return change


def _block(block: Block, change: Callable[[str], str]) -> Block:
    match block:
        case Heading() | Listing():
            return block
        case Paragraph():
            return replace(block, text=change(block.text))
        case Bullets():
            return Bullets(tuple(map(change, block.items)))
        case Table():
            rows = tuple(tuple(map(change, row)) for row in block.rows)
            return replace(block, rows=rows, caption=change(block.caption))
        case Picture():
            return Picture(_figure(block.figure, change), change(block.caption))


def _figure(figure: Figure, change: Callable[[str], str]) -> Figure:
    marks = tuple(replace(m, text=change(m.text)) if isinstance(m, Text) else m for m in figure.marks)
    return replace(figure, marks=marks)
