"""Soft rods at large strain: incompressible neo-Hookean material, nominal stress P = G (s - 1/s^2)."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from scipy.integrate import quad
from scipy.optimize import brentq

from solver.numerics.stability import SMALLEST_STRETCH, stiffening_of
from tests.published.registry import Compared, Picture, check, history, picture, value
from tests.published.rods import case_of, material, part, pulse, solved

OGDEN = "Ogden 1984, Non-linear Elastic Deformations (from memory); recomputed"
MODULUS, RHO, SECTION = 6e6, 1200.0, 0.01
G = MODULUS / 3
SOFT = material("rubber", MODULUS, RHO, law={"kind": "large_strain"})


def _stress(s: float) -> float:
    return G * (s - 1 / s**2)


def _speed(s: float) -> float:
    """Wave speed in reference coordinates, sqrt((dP/ds)/rho), m/s."""
    return float(np.sqrt(G * (1 + 2 / s**3) / RHO))


@check(
    model=(
        "neo-Hookean rod held at both ends: fixed far end, head moved slowly to a stretch and held; "
        "viscous losses none"
    ),
    title="Simple states: stress at given stretches",
    source=OGDEN,
    formula="P = G (s - 1/s^2), G = E/3; slope E at s = 1",
    tolerance=1e-3,
    why="the ramp takes 60 passages of the wave, so that what still swings is under 0.1 % of the stress",
)
def simple_states() -> Iterator[Compared]:
    ramp = 1.2
    for s in (0.6, 0.8, 1.01, 1.25, 2.0):
        push = (1 - s) * 1.0
        run = solved(
            pulse("haversine", ramp, 2 * push / ramp, "velocity"),
            part(1.0, SECTION, "rubber"),
            materials=[SOFT],
            far_end="fixed",
            gauges={"middle": 0.5},
            duration=ramp + 0.1,
            dx=0.05,
        )
        gauge = run.gauges["middle"]
        still = gauge.time > ramp
        yield value(f"stress at s = {s}", _stress(s), float(np.mean(gauge.stress[still])), "Pa")
        yield value(f"strain at s = {s}", s - 1, float(np.mean(gauge.strain[still])))
    slope = (_stress(1 + 1e-6) - _stress(1 - 1e-6)) / 2e-6
    yield value("slope at s = 1 is E", slope, MODULUS, "Pa")


@check(
    model="long neo-Hookean rod, its end pulled by a velocity that rises smoothly to 25 m/s",
    title="Pull: stress against velocity in a simple wave",
    source="Courant & Friedrichs 1948, simple waves (from memory); recomputed",
    formula="v = integral from 1 to s of sqrt((dP/ds)/rho) ds while waves run one way, whatever the history",
    tolerance=2e-3,
    why=(
        "the wave fans out in tension, so that the mesh sees it ever smoother; Courant numbers are under "
        "1 by the law's stiffening"
    ),
)
def pulled() -> Iterator[Compared | Picture]:
    run = solved(
        pulse("haversine", 0.08, -25.0, "velocity"),
        part(6.0, SECTION, "rubber"),
        materials=[SOFT],
        far_end="fixed",
        gauges={"1 m": 1.0},
        duration=0.05,
        dx=0.01,
    )
    gauge = run.gauges["1 m"]
    rising = np.flatnonzero(gauge.strain > 0.02)
    at = rising[:: max(1, len(rising) // 25)]
    pull = np.array([quad(_speed, 1, 1 + e)[0] for e in gauge.strain[at]])
    yield history("velocity at the strain that the gauge reads", -pull, gauge.velocity[at], "m/s")
    stress = np.array([_stress(1 + e) for e in gauge.strain[at]])
    yield history("stress at that strain", stress, gauge.stress[at], "Pa")
    yield picture(
        "Pull on a neo-Hookean rod: stress against velocity at 1 m",
        "velocity, m/s",
        "stress, MPa",
        pull,
        stress / 1e6,
        gauge.stress[at] / 1e6,
        -gauge.velocity[at],
    )


@check(
    model="long neo-Hookean rod, its end pushed at 25 m/s at once",
    title="Push: the state behind a shock",
    source="Rankine & Hugoniot jump conditions (textbook); recomputed",
    formula="V = U (1 - s), P = -rho U V, U = sqrt(P(s)/(rho (s - 1)))",
    tolerance=2e-2,
    why=(
        "The law takes no energy, a shock must: the mesh puts it into ringing behind the front instead, "
        "whose mean is near the state of the shock but not on it. The front itself runs 6 % too fast and "
        "is not held to anything."
    ),
)
def pushed() -> Iterator[Compared]:
    speed = 25.0
    s = brentq(lambda x: np.sqrt(_stress(x) / (RHO * (x - 1))) * (1 - x) - speed, 0.45, 0.999)
    shock = speed / (1 - s)
    run = solved(
        pulse("rectangle", 1.0, speed, "velocity"),
        part(4.0, SECTION, "rubber"),
        materials=[SOFT],
        gauges={"0.5 m": 0.5},
        duration=0.03,
        dx=0.01,
    )
    near = run.gauges["0.5 m"]
    behind = near.time > 0.5 / shock + 0.006
    yield value(
        "stress behind the front, mean", -RHO * shock * speed, float(np.mean(near.stress[behind])), "Pa"
    )
    yield value("stretch behind the front, mean", s, 1 + float(np.mean(near.strain[behind])))


@check(
    model="small waves on a rod that was slowly brought to a stretch",
    title="Wave speed at a stretch",
    source=OGDEN,
    formula="c(s) = sqrt(G (1 + 2/s^3)/rho) in reference coordinates",
    tolerance=2e-3,
    why="the pulse is read by its centre at two gauges; the mesh is well below Courant number 1 here and adds 0.1 %",
)
def prestretched() -> Iterator[Compared]:
    length, ramp, span = 4.0, 2.0, 0.008
    for s in (0.8, 1.25, 1.5):
        c = _speed(s)
        slow, quick = np.linspace(0, ramp, 3001), np.linspace(0, span, 101)
        values = (1 - s) * length / ramp * (1 - np.cos(2 * np.pi * slow / ramp))
        centres = []
        # with the pulse and without it, so that what the ramp leaves behind drops out
        runs = []
        for size in (0.005, 0.0):
            small = size * (1 - np.cos(2 * np.pi * quick / span))
            load = {
                "kind": "history",
                "quantity": "velocity",
                "times": np.concatenate([slow, ramp + quick[1:]]).tolist(),
                "values": np.concatenate([values, small[1:]]).tolist(),
            }
            run = solved(
                load,
                part(length, SECTION, "rubber"),
                materials=[SOFT],
                far_end="fixed",
                gauges={"1 m": 1.0, "2 m": 2.0},
                duration=ramp + span + 4.6 / c,
                dx=0.02,
            )
            runs.append(run)
        for name in ("1 m", "2 m"):
            wave = runs[0].gauges[name].velocity - runs[1].gauges[name].velocity
            centres.append(np.sum(run.gauges[name].time * wave) / np.sum(wave))
        yield value(f"c at s = {s}", c, 1.0 / (centres[1] - centres[0]), "m/s")
    worst = (1 + 2 / SMALLEST_STRETCH**3) / 3
    law = case_of(pulse("rectangle", 1.0), part(of="rubber"), materials=[SOFT]).materials["rubber"].law
    yield value("largest stiffening that the step allows for", worst, stiffening_of(law))
