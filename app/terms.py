"""The terms on the screen, each in a sentence, with the source where the sentence is a formula or a convention.

A source marked "from memory" was not looked up when it was written down.
"""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass
from html import escape


@dataclass(frozen=True)
class Term:
    """A word on the screen and what it means. `also`: other words under which the screen has it."""

    word: str
    means: str
    source: str = ""
    also: tuple[str, ...] = ()


TERMS = (
    Term("Member", "What is struck: one rod of segments, from the struck end to the far end."),
    Term(
        "Segment", "A length of the member with one material and one section, or a linear taper between two."
    ),
    Term(
        "Wave speed",
        "c = √(E/ρ), the speed of a wave of stress along a thin rod.",
        "Kolsky 1963 (from memory)",
    ),
    Term(
        "Impedance",
        "Z = A √(E ρ) = E A / c: the force of a wave that runs one way, for each unit of its velocity.",
        "d'Alembert's solution of the wave equation",
    ),
    Term("Travel time", "The time in which a wave runs along a length: length over wave speed."),
    Term(
        "2L/c",
        "The time in which a wave runs from a gauge to the far end and back.",
        "common practice",
    ),
    Term(
        "Down-going and up-going wave",
        "The two waves that a force F and a velocity v at one place are made of: (F − Z v)/2 runs towards the far end, "
        "(F + Z v)/2 towards the struck end (tension positive; v positive towards the far end).",
        "d'Alembert's solution of the wave equation",
        also=("waves", "up-going wave", "down-going wave"),
    ),
    Term(
        "Force pair",
        "Force, and impedance × velocity, at one gauge. The two agree while all that passes runs towards the far end; "
        "the gap between them is twice the up-going wave.",
        "d'Alembert's solution of the wave equation",
    ),
    Term("Stress", "Force over the area of the section: its mean, without what bending adds."),
    Term("Velocity", "How fast a place of the member moves; positive towards the far end."),
    Term(
        "Displacement",
        "How far a place has moved since the blow, from where it stood at rest; positive towards the far end.",
    ),
    Term(
        "x-t diagram",
        "Stress over distance and time as a picture: a wave is a slanting line in it.",
        also=("through time and along the member",),
    ),
    Term("At the cursor", "What every gauge reads at the moment at which the cursor stands."),
    Term("Findings", "What a run comes to: peaks with their limits, set, energy, and what happened in it."),
    Term(
        "Envelope",
        "The most compressive and the most tensile stress that each place sees during the whole run.",
        also=("along the member", "peak compression", "peak tension"),
    ),
    Term("Efficiency", "The share of the drop energy, mass × g × height, that the ram has when it strikes."),
    Term(
        "Coefficient of restitution",
        "e: a cushion gives back e² of the energy that is put into it.",
        "E. A. L. Smith 1960 (from memory)",
    ),
    Term(
        "Quake",
        "The movement at which the static resistance of the ground is fully mobilised.",
        "E. A. L. Smith 1960 (from memory)",
    ),
    Term(
        "Damping factor",
        "J in R (1 + J v): dynamic resistance for each unit of static resistance and of velocity. 1 s/ft is 3.28 s/m.",
        "E. A. L. Smith 1960 (from memory)",
    ),
    Term("Set", "The movement of the toe that stays after a blow."),
    Term(
        "Rebound",
        "The part of the largest movement of the struck end that does not stay.",
        also=("rebounds",),
    ),
    Term(
        "Energy past a gauge",
        "−∫ F v dt (tension positive): the work that has gone past it towards the far end.",
        also=("energy", "past gauge"),
    ),
    Term(
        "Courant number",
        "Wave speed × time step / element length: 1 carries a wave exactly, more than 1 is not stable.",
        "Courant, Friedrichs and Lewy 1928 (from memory)",
    ),
    Term(
        "Limit",
        "The largest stress allowed, as you gave it with the material. It comes from the governing code.",
    ),
)


def about(text: str) -> list[Term]:
    """Terms that stand in a text, as whole words."""
    return [term for term in TERMS if any(_stands(word, text) for word in (term.word, *term.also))]


def _stands(word: str, text: str) -> bool:
    return re.search(rf"(?<!\w){re.escape(word)}(?!\w)", text, re.IGNORECASE) is not None


def as_rich_text() -> str:
    """All terms, one paragraph each, for a label."""
    return rich_text(TERMS)


def rich_text(terms: Sequence[Term]) -> str:
    """Terms, one paragraph each."""
    return "".join(
        f"<p><b>{escape(t.word)}</b><br>{escape(t.means)}"
        + (f"<br><i>{escape(t.source)}</i></p>" if t.source else "</p>")
        for t in terms
    )
