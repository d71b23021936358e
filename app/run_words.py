"""Sentences that need more than the findings of one run: cracks, repeated blows, a finer mesh, another case; and the
details of the verdict in few words. Imports no Qt."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from app.units import Units
from app.words import SIGNS, STATES, Note, blows, graver, percent
from app.words import place as place_words
from solver.answer.findings import EnergyFinding, Findings, StressFinding
from solver.answer.result import Residual, Result
from solver.convergence import MeshCheck

#: Blows whose sets are all told; of more, the first and the last ones.
ALL_TOLD = 6
#: A change smaller than this is told as "less than".
SMALLEST = 0.001
#: A peak smaller than this share of the larger one is not compared: its changes are rounding.
COMPARED = 0.001
FIGURES = {
    "peak_compression": "peak compression",
    "peak_tension": "peak tension",
    "set": "the set",
    "energy": "the energy past the first gauge",
}


def of_the_run(result: Result, units: Units) -> tuple[Note, ...]:
    """What a run tells besides its findings: how far cracks opened, the set of every blow, the force left behind."""
    return (*_cracks(result, units), *_blows(result, units))


def locked_in(residual: Residual, units: Units) -> Note | None:
    """The largest force that the blows have left in the member, with its place."""
    if not residual.force.size or not np.any(residual.force):
        return None
    index = int(np.argmax(np.abs(residual.force)))
    force, place = float(residual.force[index]), float(residual.position[index])
    word = "compression" if force < 0 else "tension"
    count = len(residual.set_per_blow)
    return Note(
        f"After {count} blows {units.show(abs(force), 'force')} of {word} stays locked in at "
        f"{units.show(place, 'length')}.",
        position=place,
    )


def in_brief(findings: Findings, units: Units) -> tuple[str, ...]:
    """The details of each line of the verdict in so few words that they fit in one line of a narrow panel."""
    found = [_stress(findings.compression, units), _stress(findings.tension, units)]
    if findings.set is not None:
        early = "" if findings.set.last else "! ends too early · "
        found.append(early + blows(findings.set, units))
    if findings.energy is not None:
        found.append(_energy(findings.energy))
    found += [_stress(one, units) for one in graver(findings.striking)]
    return tuple(found)


def on_a_finer_mesh(check: MeshCheck) -> str:
    """What changes on elements half as long, figure by figure, in one sentence."""
    largest = max((abs(c.finer) for c in check.changes if c.figure.startswith("peak")), default=0.0)
    shares = {
        FIGURES[c.figure]: abs(c.share)
        for c in check.changes
        if c.share is not None and not (c.figure.startswith("peak") and abs(c.finer) < COMPARED * largest)
    }
    least, meshes = "less than 0.1 %", f"({check.finer_elements} elements for {check.elements})"
    if not shares:
        return f"On a finer mesh {meshes} there is nothing that could be compared."
    if len(shares) > 1 and all(share < SMALLEST for share in shares.values()):
        *first, last = shares
        return f"On a finer mesh {meshes} {', '.join(first)} and {last} change by {least}."
    parts = [f"{n} changes by {least if share < SMALLEST else percent(share)}" for n, share in shares.items()]
    return f"On a finer mesh {meshes}: {', '.join(parts)}."


@dataclass(frozen=True)
class Difference:
    """One headline figure of another case, and by what share it differs from the one looked at ("" = cannot say)."""

    name: str
    figure: str
    share: str


def differences(own: Findings, other: Findings, units: Units) -> tuple[Difference, ...]:
    """Peak compression and tension, set and energy of another run, against the one looked at."""
    rows = [
        ("compression", "stress", own.compression.peak.value, other.compression.peak.value),
        ("tension", "stress", own.tension.peak.value, other.tension.peak.value),
    ]
    if own.set is not None or other.set is not None:
        mine, its = (np.nan if one.set is None else one.set.value for one in (own, other))
        rows.append(("set", "small_length", mine, its))
    if own.energy is not None or other.energy is not None:
        mine, its = (np.nan if one.energy is None else one.energy.value for one in (own, other))
        rows.append(("energy", "energy", mine, its))
    return tuple(
        Difference(name, "none" if np.isnan(its) else units.show(its, dimension), _change(mine, its))
        for name, dimension, mine, its in rows
    )


def _change(own: float, other: float) -> str:
    """ "+12 %", "−26 %", "±0 %"."""
    if np.isnan(own) or np.isnan(other) or own == 0:
        return ""
    share = other / own - 1
    if abs(share) < SMALLEST / 2:
        return "±0 %"
    return f"{'+' if share > 0 else '−'}{percent(abs(share))}"


def _cracks(result: Result, units: Units) -> Iterator[Note]:
    for segment, opening in result.crack_openings.items():
        place = next((e for e in result.events if e.kind == "crack"), None)
        at = None if place is None else place.position
        words = f"Cracks in {segment} open by up to {units.show(opening, 'small_length')}."
        yield Note(words, position=at)


def _blows(result: Result, units: Units) -> Iterator[Note]:
    residual = result.residual
    if residual is None:
        return
    sets = [units.show(float(value), "small_length") for value in residual.set_per_blow]
    told = ", ".join(sets if len(sets) <= ALL_TOLD else [*sets[:3], "…", *sets[-2:]])
    repeats = "; it repeats." if residual.repeats else "; it does not repeat yet."
    yield Note(f"Set of {len(sets)} blows, one after the other: {told}{repeats}")


def _stress(of: StressFinding, units: Units) -> str:
    if of.worst is None:
        state = f"{SIGNS['no limit']} {STATES['no limit']}"
        return f"{state} · {_second_blow(of, units) or place_words(of.peak.position, units)}"
    share = "" if of.worst.share is None else f", {percent(of.worst.share)}"
    word = of.state
    if of.first is not None:
        return f"{SIGNS[of.state]} {word}{share} · {_second_blow(of, units)}"
    where = place_words(of.worst.position, units)
    return f"{SIGNS[of.state]} {word}{share} · {where}, {units.show(of.worst.time, 'time')}"


def _second_blow(of: StressFinding, units: Units) -> str:
    return "" if of.first is None else f"second blow; before it {units.show(of.first.value, 'stress')}"


def _energy(of: EnergyFinding) -> str:
    if of.share is None:
        return ""
    source = {
        "ram": "of the ram's energy",
        "striker": "of the striker's energy",
        "load": "of the load's work",
    }
    return f"{percent(of.share)} {source[of.source]}"
