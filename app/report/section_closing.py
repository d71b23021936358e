"""Limits with their sources, quality of the computation, cautions, and how to repeat it."""

from __future__ import annotations

import platform
from collections.abc import Iterator

import numpy

from app import __version__
from app.limit_words import SIGNS, TO_BE_CONFIRMED, published, what_it_rests_on
from app.report.blocks import Block, Bullets, Heading, Listing, Paragraph, Table
from app.report.described import exact
from app.report.input_text import input_text
from app.report.outcome import Material, Solved
from app.report.verdict import short_name, typical_lines
from app.units import Units
from app.words import (
    AXIAL_CAUTION,
    LIMIT_CAUTION,
    LOAD_CAUTION,
    MODEL_CAUTION,
    caution,
    percent,
    warning,
)
from solver.answer.cautions import cautions_of
from solver.model.limits import ARTICLE, TO_CONFIRM

EXPRESSIONS = (
    ("Steel", "0.9 φ f_y", "0.9 φ f_y"),
    (
        "Prestressed concrete",
        "φ (0.85 f'c − f_pe)",
        "φ (0.095 √f'c + f_pe), in ksi; φ f_pe where severely corrosive",
    ),
    ("Reinforced concrete", "0.85 φ f'c", "0.7 φ f_y on the area of the reinforcement"),
    ("Timber", "φ F_co, φ = 1.15", "φ F_co, φ = 1.15"),
)


def limits(of: Material) -> Iterator[Block]:
    """What each limit rests on, beside the published expressions."""
    rows = []
    for material in of.project.materials:
        for sign in SIGNS:
            value, own = material.limits.value(sign), getattr(material.limits, sign)
            if value is None:
                rows.append((material.name, sign, "– no limit given", "", ""))
                continue
            by_rule = published(material.limits, sign)
            rests = what_it_rests_on(material.limits, sign, of.units) or "given by hand, basis not given"
            source = by_rule.source if by_rule else getattr(own, "source", None)
            rows.append(
                (material.name, sign, exact(value, "stress", of.units), rests, source or "source not given")
            )
    yield Paragraph(f"! {TO_BE_CONFIRMED}", "caution")
    names = ("Material", "Stress", "Limit", "Basis and reason", "Source")
    yield Table(names, tuple(rows), (0.18, 0.12, 0.15, 0.3, 0.25), "Limits used in this report (magnitudes)")
    yield Heading("Published expressions for driving stresses")
    yield Paragraph(
        f"{ARTICLE}, {TO_CONFIRM}. φ is the resistance factor for driving, 1.0 unless said; f_y is the yield stress, "
        "f'c the strength of the concrete, f_pe its effective prestress, F_co the strength of the timber "
        "parallel to the grain."
    )
    head = ("Member", "Compression", "Tension")
    yield Table(head, EXPRESSIONS, (0.26, 0.32, 0.42), "Largest stress allowed while driving")


def quality_section(of: Material) -> Iterator[Block]:
    """Mesh, step, energy that does not close, the check on a finer mesh, warnings."""
    yield Paragraph(
        "These figures judge the computation, not the model: how fine it is, whether the energy put in is found "
        "again, and what changes where elements are half as long."
    )
    solved = [one for one in of.cases if one.findings is not None]
    yield _runs(solved, of.units)
    checked = [one for one in solved if one.mesh is not None]
    if checked:
        yield _meshes(checked, of.units)
    unchecked = [one.case.name for one in solved if one.mesh is None]
    if unchecked:
        yield Paragraph(f"The check on a finer mesh was not made for: {', '.join(unchecked)}.")
    for one in solved:
        assert one.findings is not None
        if one.findings.remarks:
            yield Heading(f"Case: {one.case.name}", 3)
        for remark in one.findings.remarks:
            yield Paragraph(f"! {warning(remark, of.units)}", "caution")


def _runs(cases: list[Solved], units: Units) -> Table:
    """How each case was computed."""
    rows = []
    for one in cases:
        assert one.findings is not None
        run = one.findings.quality
        ends = "at rest" if run.at_rest else "still moves"
        rows.append(
            (
                short_name(one.case.name),
                str(run.elements),
                f"{run.steps} of {units.show(run.time_step, 'time')}",
                f"{run.courant_worst:.4f}",
                f"{100 * run.energy_residual:.2g} %",
                ends if run.finished else "stopped",
            )
        )
    head = ("Case", "Elements", "Steps", "Worst Courant number", "Energy that does not close", "At the end")
    return Table(head, tuple(rows), (0.26, 0.12, 0.18, 0.14, 0.16, 0.14), "Mesh, step and energy")


FIGURES = {
    "peak_compression": ("Peak compression", "stress"),
    "peak_tension": ("Peak tension", "stress"),
    "set": ("Set per blow", "small_length"),
    "energy": ("Energy past the first gauge", "energy"),
}


def _meshes(cases: list[Solved], units: Units) -> Table:
    """Each figure of a verdict beside that of elements half as long."""
    rows = []
    for one in cases:
        assert one.mesh is not None
        for change in one.mesh.changes:
            word, dimension = FIGURES.get(change.figure, (change.figure.replace("_", " "), "none"))
            shown = units.show(change.value, dimension), units.show(change.finer, dimension)
            rows.append((short_name(one.case.name), word, *shown, _change(change.share)))
    head = ("Case", "Figure", "As solved", "Finer", "Change")
    return Table(head, tuple(rows), (0.3, 0.24, 0.15, 0.15, 0.16), "Check on elements half as long")


def _change(share: float | None) -> str:
    if share is None:
        return "–"
    if abs(share) < UNSEEN:
        return f"below {100 * UNSEEN:g} %"
    return f"{_sign(share)}{percent(abs(share))}"


#: Changes below this share are not told in numbers.
UNSEEN = 1e-5


def _sign(share: float) -> str:
    return "+" if share > 0 else "−" if share < 0 else ""


def cautions(of: Material) -> Iterator[Block]:
    """Those that go with every report, then those that the cases give reason for."""
    yield Bullets((MODEL_CAUTION, AXIAL_CAUTION, LIMIT_CAUTION, LOAD_CAUTION))
    for one in of.cases:
        found = [caution(c, of.units) for c in cautions_of(one.case)]
        missing = _without_limit(one)
        if missing:
            found.append(f"No limit of stress is given for {missing}.")
        if found:
            yield Heading(f"Case: {one.case.name}", 3)
            yield Bullets(tuple(f"! {text}" for text in found))
    yield from (Paragraph(line, "caution") for line in typical_lines(of.project))


def _without_limit(one: Solved) -> str:
    names = dict.fromkeys(segment.material for segment in one.case.member.segments)
    missing = [
        name for name in names if any(one.case.material(name).limits.value(sign) is None for sign in SIGNS)
    ]
    return ", ".join(f"'{name}'" for name in missing)


def appendix(of: Material) -> Iterator[Block]:
    """How to repeat the computation, and the whole input as text."""
    yield Heading("How to repeat this")
    name = of.file_name or "project.strike"
    yield Paragraph(f"Save the text below as {name} (in UTF-8), install Striketrace {__version__}, and run:")
    date = of.date.isoformat(timespec="seconds")
    yield Listing(
        f'striketrace solve "{name}" --out results\n'
        f'striketrace report "{name}" --out report.pdf --date {date}'
    )
    yield Paragraph(
        f"Input: SHA-256 {of.hash}. The same input and the same version give the same numbers, and for the same date "
        f"the same bytes of this report. Computed with Python {platform.python_version()} and numpy "
        f"{numpy.__version__}."
    )
    histories = [
        one.case.load.file for one in of.cases if one.case.load.kind == "history" and one.case.load.file
    ]
    if histories:
        yield Paragraph(f"The input reads these files as well: {', '.join(dict.fromkeys(histories))}.")
    yield Heading("The input")
    yield Paragraph("SI units throughout, tension positive, as the file holds it.", "small")
    yield Listing(input_text(of.project))
