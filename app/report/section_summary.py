"""The summary: the verdict of every case, side by side."""

from __future__ import annotations

from collections.abc import Iterator

from app.report.blocks import Block, Paragraph, Table
from app.report.outcome import Material, Solved
from app.report.verdict import short_name
from app.units import Units
from app.words import Line, verdict


def summary(of: Material) -> Iterator[Block]:
    """One row a case, in the words of the verdict on the screen."""
    yield Paragraph("The verdict of each case; the sections that follow say what it rests on.")
    shown = [solved for solved in of.cases if solved.findings is not None]
    if shown:
        yield _verdicts(shown, of.units)
    for one in of.cases:
        if one.findings is None:
            yield Paragraph(f"! Case '{one.case.name}' could not be computed: {one.refusal}", "caution")
        elif one.result is not None and not one.result.finished:
            yield Paragraph(f"! Case '{one.case.name}' was stopped before its end.", "caution")


def _verdicts(cases: list[Solved], units: Units) -> Table:
    found = {one.case.name: list(verdict(one.findings, units)) for one in cases if one.findings is not None}
    columns: list[tuple[str, str]] = [
        ("peak compression", "Peak compression"),
        ("peak tension", "Peak tension"),
    ]
    if any(line.name == "set per blow" for lines in found.values() for line in lines):
        columns.append(("set per blow", "Set per blow"))
    if any(line.name.startswith("past gauge") for lines in found.values() for line in lines):
        columns.append(("past gauge", "Energy past the first gauge"))
    rows = tuple(
        (short_name(name), *(_cell(lines, key) for key, _ in columns)) for name, lines in found.items()
    )
    wide = {"set per blow": 0.85, "past gauge": 1.05}
    weights = [0.75, *(wide.get(key, 1.2) for key, _ in columns)]
    shares = tuple(weight / sum(weights) for weight in weights)
    return Table(("Case", *(word for _, word in columns)), rows, shares, "Verdict of each case")


def _cell(lines: list[Line], name: str) -> str:
    line = next((one for one in lines if one.name.startswith(name)), None)
    if line is None:
        return "–"
    detail = line.detail.partition("\n")[0] if name == "past gauge" else line.detail
    return f"{line.figure}\n{detail}"
