"""What the run refuses: models that do not go together, and states that are no answer."""

from __future__ import annotations

from typing import Protocol

import numpy as np
from numpy.typing import NDArray

from solver.errors import SolveError
from solver.model.project import Case
from solver.model.surroundings import Resistance
from solver.numerics.arrays import Extremes, Frames
from solver.numerics.balance import growing_share, moving_share, residual_of
from solver.numerics.chain import Chain, segments_of
from solver.numerics.equilibrium import State
from solver.numerics.laying import Stretch
from solver.numerics.stability import SMALLEST_STRETCH

#: Share of the energy that a wave of two elements' length may grow to; short pulses alone stay below it.
GROWN = 0.05
#: Least exponent N of the power law: below it |v|^N is a jump that no step resolves.
LEAST_EXPONENT = 0.05
#: Share of the largest energy that may fail to close before a run is refused.
REFUSED = 0.05


class Watched(Protocol):
    """What is looked at of a march on its way."""

    chain: Chain
    state: State
    extremes: Extremes
    start_row: NDArray[np.float64]
    steps: int
    stride: int

    def frames(self) -> Frames:
        """Pictures and ledger so far."""
        ...


def refuse_unsupported(case: Case) -> None:
    """Raise `SolveError` for combinations that this program does not solve."""
    if case.member.lateral_inertia:
        _refuse_with_inertia(case)
    if case.run.blows != 1 and case.ground is None:
        raise SolveError(
            "Repeated blows need ground, which holds the member at rest between them: set 'blows' to 1."
        )
    for name, part in _resistances(case):
        if part.exponent is not None and part.exponent < LEAST_EXPONENT:
            raise SolveError(
                f"The exponent of damping of {name}, {part.exponent:g}, is not solved: give at least {LEAST_EXPONENT}."
            )
    for segment in segments_of(case)[0]:
        law = case.material(segment.material).law
        if (
            law.kind == "elastic_plastic"
            and law.hardening_modulus >= case.material(segment.material).young_modulus
        ):
            raise SolveError(
                f"The hardening modulus of '{segment.material}' must be below its Young's modulus: yielding softens."
            )
        if segment.section.shape == "filled_pipe" and (
            law.kind != "elastic" or case.material(segment.section.fill).law.kind != "elastic"
        ):
            raise SolveError(
                f"Segment '{segment.name}' is a filled pipe: both of its materials must be elastic."
            )


def _resistances(case: Case) -> list[tuple[str, Resistance]]:
    """Layers, shaft and toe, each with what it is called in a sentence."""
    ground = case.ground
    if ground is None:
        return []
    found: list[tuple[str, Resistance]] = [(f"layer '{layer.name}'", layer) for layer in ground.layers]
    found += [("the shaft", ground.shaft_total)] if ground.shaft_total else []
    found += [("the toe", ground.toe)] if ground.toe else []
    return found


def _refuse_with_inertia(case: Case) -> None:
    if getattr(case.load, "release", False):
        raise SolveError(
            "Lateral inertia is not solved with a velocity load that lets go: leave 'release' off."
        )
    lead = "Lateral inertia is solved for a bonded elastic member"
    if case.ground is not None or case.far_end.kind in ("wall", "ground"):
        raise SolveError(f"{lead} without ground or wall: switch it off, or choose another far end.")
    if case.load.kind in ("drop", "striker"):
        raise SolveError(
            f"{lead} under a pulse, a history or an initial velocity: switch it off, or replace the {case.load.kind}."
        )
    for segment in case.member.segments:
        material = case.material(segment.material)
        if segment.joint_above.kind != "bonded":
            raise SolveError(f"{lead}: the joint above '{segment.name}' is not bonded.")
        if segment.section.polar_radius_squared is None:
            raise SolveError(
                f"{lead} of known shape: '{segment.name}' is a {segment.section.shape.replace('_', ' ')}."
            )
        if material.poisson_ratio is None:
            raise SolveError(f"Lateral inertia needs Poisson's ratio of '{material.name}'.")


def refuse_bad_state(march: Watched) -> float:
    """Raise `SolveError` where the state is no answer: not finite, turned inside out, or with energy from nothing.

    Returns the share of the energy that does not close.
    """
    chain, motion = march.chain, march.state.motion
    seconds = march.steps * chain.dt
    bad = ~np.isfinite(motion.u) | ~np.isfinite(motion.v)
    if bad.any():
        place = chain.position[int(np.argmax(bad))]
        raise SolveError(
            f"The solution ran away before {seconds * 1000:.4g} ms (first at {place:.4g} m) and is not shown. "
            "Shorter elements, or softer springs and cushions, may help."
        )
    for part in chain.stretches:
        _refuse_inside_out(march, part)
    rows = march.frames().ledger
    share, frame = residual_of(march.start_row, rows)
    if share > REFUSED:
        place = chain.position[int(np.argmax(np.abs(motion.v)))]
        when = frame * march.stride * chain.dt
        raise SolveError(
            f"The energy of this run does not close by {share:.0%} at {when * 1000:.4g} ms (fastest at {place:.4g} m), "
            "so it is not shown. Shorter elements may help."
        )
    grown, frame = growing_share(march.start_row, rows)
    if any(part.material.law.kind == "brittle_tension" for part in chain.stretches):
        # cracks jump in a single step and may leave such a wave at once
        moving, moving_frame = moving_share(march.start_row, rows)
        if moving > grown:
            grown, frame = moving, moving_frame
    if grown > GROWN:
        raise SolveError(
            f"A wave of two elements' length stands in this run (by {frame * march.stride * chain.dt * 1000:.4g} ms to "
            f"{grown:.0%} of the energy), which no mesh can carry, so it is not shown. Another element length may help."
        )
    return share


def _refuse_inside_out(march: Watched, part: Stretch) -> None:
    """An element pressed to nothing, judged by its least force so far (a large-strain pad: by its stretch of now)."""
    chain, law = march.chain, part.material.law.kind
    at = slice(part.start, part.stop)
    if law == "elastic_plastic":
        # a law of small strains: its shortening is told with a warning, its geometry is not updated
        return
    if law == "large_strain":
        stretch = 1 + np.diff(march.state.motion.u)[at] / chain.length[at]
        bad, step, advice = stretch < SMALLEST_STRETCH, march.steps, "a thicker or stiffer pad"
    else:
        bad = (march.extremes.low[at] <= -chain.axial[at]) & (chain.axial[at] > 0)
        step = march.extremes.low_step[at][int(np.argmax(bad))]
        advice = "a lower load, or a material law that yields"
    if bad.any():
        place = chain.position[part.start + int(np.argmax(bad))]
        raise SolveError(
            f"'{part.segment.name}' is pressed together at {place:.4g} m, {step * chain.dt * 1000:.4g} ms, "
            f"further than its law describes: give {advice}."
        )
