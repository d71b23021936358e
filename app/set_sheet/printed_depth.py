"""The page about depth: what happens on the way down, as picture and table. Imports no Qt."""

from __future__ import annotations

from math import isfinite

from app.report.lettering import BOLD, REGULAR
from app.set_sheet.depth_chart import depth_chart
from app.set_sheet.depth_words import limit_passed_words, refusal_words
from app.set_sheet.paper import Writer
from app.set_sheet.words import blows_text, force_text, set_text
from app.units import Units
from app.words import percent
from solver import Case
from solver.studies.depth import DepthPoint, Depths

PICTURE = (700.0, 480.0)
#: Rows of the table; of more depths every second, third ... is printed.
MOST_ROWS = 18
WIDTHS = (0.9, 1, 1, 1.1, 1, 1.25, 1.1, 1, 0.9, 0.8)


def write_depths(paper: Writer, depths: Depths, case: Case, title: str, units: Units, per: str) -> None:
    paper.text(f"Down to depth: {case.name}", BOLD, 15)
    paper.text(title, REGULAR, 9.5)
    paper.box(_first_of_all(depths, units), (_how_long(depths, units),))
    paper.picture(
        lambda width, height, letters: depth_chart(depths, case, units, width, height, letters), *PICTURE
    )
    _table(paper, depths, units, per)
    paper.list(
        "What is assumed",
        [
            "The ground stays where it is and the member goes down; each depth is one blow, solved until the member is "
            "at rest. Resistances are those while driving, with the factors of the study.",
            "Blows and time are counted from the first depth, with the mean of blows per length between two depths.",
        ],
    )


def _first_of_all(depths: Depths, units: Units) -> str:
    refusal, limit = refusal_words(depths, units), limit_passed_words(depths, units)
    words = refusal if depths.first_refusal is None else f"✕ {refusal}"
    return f"{words[:1].upper()}{words[1:]}. {limit[:1].upper()}{limit[1:]}."


def _how_long(depths: Depths, units: Units) -> str:
    counted = [
        (point, blows, seconds)
        for point, blows, seconds in zip(depths.points, depths.blows, depths.seconds, strict=True)
        if isfinite(blows)
    ]
    point, blows, seconds = counted[-1]
    first = units.show(depths.points[0].penetration, "length")
    deep = units.show(point.penetration, "length")
    return f"From {first} to {deep}: {blows:.0f} blows, {seconds / 60:.0f} minutes of driving."


def _table(paper: Writer, depths: Depths, units: Units, per: str) -> None:
    head = ["Depth", "Shaft", "Toe", "Set per blow", f"Blows per {per}", "Compression", "Tension"]
    head += ["Of the limit", "Blows so far", "Minutes"]
    every = -(-len(depths.points) // MOST_ROWS)
    last = len(depths.points) - 1
    rows = []
    for index, point in enumerate(depths.points):
        if index % every == 0 or index == last:
            so_far, seconds = depths.blows[index], depths.seconds[index]
            counted = [f"{so_far:.0f}", f"{seconds / 60:.0f}"] if isfinite(so_far) else ["–", "–"]
            rows.append([*_row(point, units, per), *counted])
    paper.rows(head, rows, WIDTHS)


def _row(point: DepthPoint, units: Units, per: str) -> list[str]:
    cell = point.cell
    peaks = [units.show(f.peak.value, "stress") if f else "–" for f in (cell.compression, cell.tension)]
    share = "–" if cell.share is None else percent(cell.share) + (" ✕" if cell.over else "")
    return [
        units.show(point.penetration, "length"),
        force_text(point.shaft, units),
        force_text(point.toe, units),
        set_text(cell, units),
        blows_text(cell, per),
        *peaks,
        share,
    ]
