"""Results of each case: the verdict in words, then the pictures."""

from __future__ import annotations

from collections.abc import Iterator

from app.report.blocks import Block, Bullets, Heading, Paragraph, Picture
from app.report.figures.envelope import stress_envelope
from app.report.figures.traces import (
    MOST_CURVES,
    energy_over_time,
    force_pair,
    gauge_traces,
    set_over_time,
)
from app.report.figures.xt import xt_diagram
from app.report.outcome import Material, Solved
from app.units import Units
from app.words import notes, verdict
from solver import Result

TRACES = {"stress": "stress", "velocity": "velocity", "displacement": "small_length"}


def results(of: Material) -> Iterator[Block]:
    """A part for each case."""
    units = of.units
    positive = "compression" if units.sign < 0 else "tension"
    yield Paragraph(
        f"{positive.capitalize()} is positive in every figure and table; velocities and displacements are positive "
        "towards the far end. Time 0 is the beginning of the blow."
    )
    for one in of.cases:
        yield Heading(f"Case: {one.case.name}")
        if one.result is None or one.findings is None:
            yield Paragraph(f"! This case could not be computed: {one.refusal}", "caution")
            continue
        yield from _told(one, units)
        for key in of.choices.figures:
            yield from _figure(key, one.result, units)


def _told(one: Solved, units: Units) -> Iterator[Block]:
    assert one.findings is not None
    lines = []
    for line in verdict(one.findings, units):
        detail = line.detail.replace("\n", "; ")
        lines.append(
            f"{line.name[:1].upper()}{line.name[1:]}: {line.figure}{f' ({detail})' if detail else ''}"
        )
    yield Bullets(tuple(lines))
    told = notes(one.findings, one.case, units)
    if told:
        yield Bullets(tuple(note.text for note in told))


def _figure(key: str, result: Result, units: Units) -> Iterator[Block]:
    gauges = [g for g in result.gauges.values() if len(g.time) > 1]
    on_member = [g for g in gauges if g.on == "member"]
    if key == "envelope" and len(result.envelope.position):
        yield Picture(
            stress_envelope(result, units),
            "Envelope: the most compressive and the most tensile stress of the whole run at each place; "
            "broken lines are the limits of the material there.",
        )
    elif key == "force_pair" and on_member:
        gauge = on_member[0]
        yield Picture(
            force_pair(result, gauge, units),
            f"Force and impedance × velocity at gauge {gauge.name}. Where they part, waves come up from below: "
            "the area between is twice the up-going wave.",
        )
    elif key in TRACES:
        for first in range(0, len(gauges), MOST_CURVES):
            some = gauges[first : first + MOST_CURVES]
            figure = gauge_traces(result, some, key, TRACES[key], units)
            yield Picture(figure, f"{key.capitalize()} at {_listed([g.name for g in some])}.")
    elif key == "xt" and len(result.fields.time) > 1:
        yield Picture(
            xt_diagram(result, units),
            "Stress over time and distance. A wave is a slanting band, its slope the wave speed.",
        )
    elif key == "set" and len(result.fields.time) > 1:
        yield Picture(set_over_time(result, units), "Movement of the struck end and of the toe or far end.")
    elif key == "energy" and len(result.ledger.time) > 1:
        yield Picture(
            energy_over_time(result, units), "Where the energy is: put in, in motion, stored, and lost."
        )


def _listed(names: list[str]) -> str:
    return names[0] if len(names) == 1 else f"{', '.join(names[:-1])} and {names[-1]}"
