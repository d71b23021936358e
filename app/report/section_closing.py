"""Limits with their sources, quality of the computation, cautions, and how to repeat it."""

from __future__ import annotations

import platform
from collections.abc import Iterator

import numpy

from app import __version__
from app.limit_words import SIGNS, TO_BE_CONFIRMED, published, what_it_rests_on
from app.report.blocks import Block, Bullets, Heading, Listing, Paragraph, Table
from app.report.described import exact
from app.report.outcome import Material, Solved
from app.units import Units
from app.words import (
    AXIAL_CAUTION,
    LIMIT_CAUTION,
    LOAD_CAUTION,
    MODEL_CAUTION,
    caution,
    percent,
    quality,
    warning,
)
from solver import MeshCheck, project_to_text
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
    for one in of.cases:
        if one.findings is None:
            continue
        yield Heading(f"Case: {one.case.name}", 3)
        yield Bullets(quality(one.findings.quality, of.units))
        for remark in one.findings.remarks:
            yield Paragraph(f"! {warning(remark, of.units)}", "caution")
        if one.mesh is not None:
            yield _mesh(one.mesh, of.units)
        else:
            yield Paragraph("The check on a finer mesh was not made.")


FIGURES = {
    "peak_compression": ("Peak compression", "stress"),
    "peak_tension": ("Peak tension", "stress"),
    "set": ("Set per blow", "small_length"),
    "energy": ("Energy past the first gauge", "energy"),
}


def _mesh(check: MeshCheck, units: Units) -> Table:
    rows = []
    for change in check.changes:
        word, dimension = FIGURES.get(change.figure, (change.figure.replace("_", " "), "none"))
        share = change.share
        told = "–" if share is None else f"{_sign(share)}{percent(abs(share))}"
        rows.append((word, units.show(change.value, dimension), units.show(change.finer, dimension), told))
    head = ("Figure", f"{check.elements} elements", f"{check.finer_elements} elements", "Change")
    return Table(head, tuple(rows), (0.34, 0.22, 0.22, 0.22), "Check on elements half as long")


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
    typical = sum(mark.state == "typical" for mark in (of.project.provenance or {}).values())
    if typical:
        yield Paragraph(
            f"! {typical} values of the input are typical ones that nobody has confirmed.", "caution"
        )


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
    yield Listing(project_to_text(of.project))
