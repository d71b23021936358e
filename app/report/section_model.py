"""The model and its assumptions in plain words; only what the cases at hand make use of."""

from __future__ import annotations

from collections.abc import Iterator

from app.report.blocks import Block, Bullets, Heading, Paragraph
from app.report.outcome import Material
from app.words import LOAD_CAUTION
from solver import Case

GENERAL = (
    "The member is a slender rod: plane sections stay plane, and stress and velocity are the same over each section. "
    "Waves run with c = √(E/ρ); force and velocity of a single wave are tied by the impedance Z = A √(E ρ) "
    "(thin-rod theory; Kolsky, Stress Waves in Solids).",
    "The equation of motion, ρ A ∂v/∂t = ∂F/∂x with the forces of the surroundings, is solved step by step in time "
    "(explicitly), with elements and a time step for which waves in a uniform rod are exact.",
    "At a gauge the down-going and the up-going force wave follow from force and velocity by d'Alembert's solution.",
    "Stresses are the mean over the section. Bending from an eccentric blow, and stress peaks at edges and welds, "
    "add to them.",
)
LAWS = {
    "viscoelastic": "A viscoelastic material adds a stress in proportion to the strain rate (Kelvin and Voigt).",
    "elastic_plastic": "An elastic-plastic material yields at its yield stress and hardens along a straight line.",
    "brittle_tension": "A brittle material cracks through where its tensile strength is reached; the crack closes "
    "again and carries compression.",
    "large_strain": "A pad of large strain follows the incompressible neo-Hookean law.",
}
ENDS = {
    "matched": "The far end is matched: nothing comes back from it.",
    "wall": "Beyond the far end stands a rigid wall, which carries compression only.",
}


def model(of: Material) -> Iterator[Block]:
    """Assumptions as a list, general ones first."""
    cases = [one.case for one in of.cases]
    yield Paragraph(
        "The computation rests on these assumptions; each is a simplification of what stands in the field."
    )
    yield Bullets(GENERAL)
    special = list(dict.fromkeys(_special(cases)))
    if special:
        yield Heading("For the cases of this report")
        yield Bullets(tuple(special))
    yield Heading("What the model does not hold")
    yield Paragraph(
        f"{LOAD_CAUTION} Lateral spreading of short pulses is left out unless lateral inertia is in the model. "
        "The ground has no memory of earlier driving: set-up, relaxation and pore pressure are not modelled. "
        "Temperature and fatigue are left out."
    )


def _special(cases: list[Case]) -> Iterator[str]:
    for case in cases:
        yield from _load(case)
        yield from _member(case)
        yield from _ground(case)
        if case.far_end.kind in ENDS:
            yield ENDS[case.far_end.kind]
        if case.run.gravity:
            yield "Gravity acts: forces and stresses include the static part at rest before the blow."
        if case.run.blows != 1:
            yield "Blows follow each other from the state of rest that the one before has left (residual stress)."


def _load(case: Case) -> Iterator[str]:
    load = case.load
    if load.kind == "drop":
        yield (
            "The ram strikes with the velocity that the table of the load gives; friction and losses before the "
            "impact are in its efficiency alone."
        )
        if load.cushion is not None or load.pile_cushion is not None:
            yield (
                "A cushion carries compression only. It loads along k and unloads along k/e², so that it gives back "
                "e² of its energy (E. A. L. Smith 1960; from memory)."
            )
    elif load.kind == "striker":
        yield "The striker is a rod of its own; its face and the struck end part when they would pull."
    elif load.kind in ("pulse", "history"):
        yield "The load is given at the struck end and does not depend on how the member answers."


def _member(case: Case) -> Iterator[str]:
    if case.member.lateral_inertia:
        yield "Lateral inertia is in the model (Rayleigh and Love): short waves run slower."
    if any(segment.joint_above.kind != "bonded" for segment in case.member.segments):
        yield "Joints that are not bonded carry compression, and tension only after the slack given."
    for segment in (*case.member.segments, *case.ram_segments):
        law = case.material(segment.material).law.kind
        if law in LAWS:
            yield LAWS[law]


def _ground(case: Case) -> Iterator[str]:
    ground = case.ground
    if ground is None:
        return
    parts = [*ground.layers, *(p for p in (ground.shaft_total, ground.toe) if p is not None)]
    if any(part.law == "radiation" for part in parts):
        yield (
            "Soil as an elastic half-space: toe after Lysmer and Richart 1966, shaft after Randolph and Simons 1986 "
            "(from memory)."
        )
    if any(part.law != "radiation" for part in parts):
        yield (
            "Static resistance of the ground grows in proportion to the movement up to the quake and stays constant "
            "beyond it; the toe resists compression only (E. A. L. Smith 1960; from memory)."
        )
    words = {
        "smith": "Damping by Smith: the static resistance that acts at the time, times J v.",
        "viscous": "Viscous damping: the ultimate static resistance, times J v.",
        "power": "Damping by a power of the velocity (Gibson and Coyle 1968; from memory).",
    }
    for part in parts:
        if part.law in words and part.damping:
            yield words[part.law]
