"""What the user must be told about a run: facts, and the sentences that tell them in whatever units are shown."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Literal

RemarkKind = Literal[
    "energy_open",
    "times_unfit",
    "pulse_in_few_steps",
    "few_elements",
    "large_strain",
    "mass_at_contact",
    "crumbled",
    "stopped",
    "not_at_rest",
    "in_the_air",
    "still_giving",
    "ram_returns",
    "layers_end",
    "no_rest",
    "not_cached",
]
#: Writes a value in SI with its unit, from the value and its dimension (a key of `SI_UNITS`).
Show = Callable[[float, str], str]


@dataclass(frozen=True)
class Remark:
    """`value` is what the kind is about, in SI: the share of energy that does not close, the worst Courant number, a
    number of steps or elements, a plastic strain, a time (s), a depth (m). `place` (m) is where; `name` a segment's
    name, or the sentence itself where it holds nothing to convert."""

    kind: RemarkKind
    value: float = 0.0
    place: float = 0.0
    name: str = ""


def in_si(value: float, dimension: str) -> str:
    """The units of the command line: metres, and milliseconds for times of a blow."""
    return f"{value * 1000:.4g} ms" if dimension == "time" else f"{value:.4g} m"


def sentence(of: Remark, show: Show = in_si) -> str:
    """One remark as a sentence; `show` puts values into the units of the reader."""
    match of.kind:
        case "energy_open":
            return f"The energy of this run does not close by {of.value:.1%}: judge it with care."
        case "times_unfit":
            return (
                "The travel times of the segments fit no common step: "
                f"the worst Courant number is {of.value:.3f}."
            )
        case "pulse_in_few_steps":
            return (
                f"The pulse lasts {of.value:.2g} time steps, too few for its shape: its impulse is right, its "
                "peaks are smeared. Give a shorter element length, or a longer pulse."
            )
        case "few_elements":
            return f"The viscosity of '{of.name}' allows it only {of.value:.0f} elements: compare with a finer mesh."
        case "large_strain":
            return (
                f"The plastic strain reaches {of.value:.0%} at {show(of.place, 'length')}, beyond a law of small "
                "strains: read the shortening of the whole, not the strain there."
            )
        case "mass_at_contact":
            return (
                f"A lumped mass touches at {show(of.place, 'length')}: it bounces without loss, so read forces there "
                "as means over its bounces, or give it as a short segment."
            )
        case "crumbled":
            return (
                f"'{of.name}' crumbled: {of.value:.0f} of its elements came off alone. What breaks so small depends on "
                "the mesh, so read its gauges and the place and time of the first crack rather than stresses after it."
            )
        case "stopped":
            return "This run was stopped early: it tells what happened so far."
        case "not_at_rest":
            return (
                "The member does not come to rest by itself; the run was ended after "
                f"{show(of.value, 'time')}."
            )
        case "in_the_air":
            return (
                "The member is in the air as the run ends and falls back on its toe: its set is that of the member "
                "laid down there. Give a longer duration to see it land."
            )
        case "still_giving":
            return (
                f"The ground still gave way when the run ended at {show(of.value, 'time')}: the set is not the last "
                "word. Give a longer duration, or leave it out to run until at rest."
            )
        case "ram_returns":
            return (
                f"The ram is in the air at the end and falls again at about {show(of.value, 'time')}: "
                "give a longer duration to see that blow too."
            )
        case "layers_end":
            return f"The layers end at {show(of.place, 'length')}: below it no shaft resistance acts."
        case "no_rest":
            return "No rest after the blow was found: the set is the plastic movement of the toe."
        case "not_cached":
            return of.name
