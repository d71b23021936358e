"""A rigid mass strikes a rod without a cushion: Saint-Venant's problem, far end fixed, free or far away."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from numpy.polynomial import Polynomial
from scipy.optimize import brentq

from solver import Result
from tests.published.registry import Array, Compared, Picture, check, history, picture, value
from tests.published.rods import GRAVITY, Z, part, solved

MASS, SPEED = 1000.0, 5.0
RATIOS = {"1/6": 1 / 6, "1/4": 1 / 4, "1/2": 1 / 2, "1": 1.0, "4": 4.0}
HANDBOOK = "Timoshenko & Goodier 1970, longitudinal impact of bars (from memory); recomputed"
SMEARED = (
    "The front of the wave is smeared over the first node, an error of first order in Z dt/M that "
    "the program keeps under 0.1 % by its choice of mesh; required are 0.5 %."
)


def _strike(mass: float, speed: float, far_end: str, length: float, duration: float, **more) -> Result:
    load = {"kind": "drop", "ram_mass": mass, "impact_velocity": speed}
    places = {"head": 0.0, "far end": length}
    return solved(load, part(length), far_end=far_end, gauges=places, duration=duration, **more)


@check(
    model="rigid mass of 1000 kg at 5 m/s on a rod so long that nothing comes back",
    title="Mass on a long rod",
    source=HANDBOOK,
    formula=(
        "F = Z V exp(-Z t/M), v = V exp(-Z t/M), u = (M V/Z)(1 - exp(-Z t/M)), energy (M V^2/2)(1 - "
        "exp(-2 Z t/M))"
    ),
    tolerance=2e-3,
    share_of="the largest value",
    why=SMEARED + " Energy, a product of two such records, errs by twice that.",
)
def long_rod() -> Iterator[Compared]:
    run = _strike(MASS, SPEED, "matched", 10.0, 0.011)
    at = np.array([0.5, 1, 2.5, 5, 10]) * 1e-3
    steps = np.rint(at / run.time_step).astype(int)
    decay = np.exp(-Z * at / MASS)
    head, train = run.gauges["head"], run.head_train
    yield history("force on the rod", Z * SPEED * decay, -head.force[steps], "N", Z * SPEED)
    yield history("force on the mass", Z * SPEED * decay, train.cushion_force[steps], "N", Z * SPEED)
    yield history("velocity of the mass", SPEED * decay, train.ram_velocity[steps], "m/s", SPEED)
    yield history(
        "displacement of the head", MASS * SPEED / Z * (1 - decay), head.displacement[steps], "m", 0.0125
    )
    energy = MASS * SPEED**2 / 2 * (1 - decay**2)
    yield history("energy given to the rod", energy, head.transferred_energy[steps], "J", 12500.0)
    yield value(
        "force after 2.5 ms, printed 735.75888 kN", 735.75888e3, -head.force[steps[2]], "N", Z * SPEED
    )


@check(
    model="the same, with weight: gravity acts on the mass after it has struck",
    title="Mass with weight on a long rod",
    source=HANDBOOK + "; g = 9.80665 m/s2",
    formula="v = V exp(-Z t/M) + (M g/Z)(1 - exp(-Z t/M)); printed 3.3596829 m/s after 1 ms",
    tolerance=1e-3,
    share_of="the impact velocity",
    why=SMEARED,
)
def with_weight() -> Iterator[Compared]:
    # a fixed far end 8 m away holds the rod before the blow, its echo comes after 3.2 ms
    run = _strike(MASS, SPEED, "fixed", 8.0, 0.0031, gravity=True)
    at = np.array([0.5, 1.0, 2.0, 3.0]) * 1e-3
    decay = np.exp(-Z * at / MASS)
    exact = SPEED * decay + MASS * GRAVITY / Z * (1 - decay)
    steps = np.rint(at / run.time_step).astype(int)
    yield history("velocity of the mass", exact, run.head_train.ram_velocity[steps], "m/s", SPEED)
    yield value("after 1 ms", 3.3596829, run.head_train.ram_velocity[steps[1]], "m/s", SPEED)
    # the weight itself, from the difference to a run without it
    light = _strike(MASS, SPEED, "fixed", 8.0, 0.0031)
    gain = run.head_train.ram_velocity[steps] - light.head_train.ram_velocity[steps]
    yield history("what weight adds", MASS * GRAVITY / Z * (1 - decay), gain, "m/s")


class SaintVenant:
    """The rod of mass ratio a = rod/striker with its far end fixed, in shares of V, rho c V and L/c.

    On 2n <= tau < 2n + 2, s = tau - 2n: striker v = exp(-a s) V_n(s), up-wave g = exp(-a s) G_n(s), G_0 = 0, V_0 = 1,
    G_(n+1) = V_n + G_n, V_n' = -2 a G_n, V_(n+1)(0) = exp(-2 a) V_n(2); contact stress v + 2 g, fixed end 2 (v + g) one
    passage later.
    """

    def __init__(self, ratio: float, rounds: int = 6) -> None:
        self.ratio = ratio
        self.v, self.g = [Polynomial([1.0])], [Polynomial([0.0])]
        for _ in range(rounds):
            self.g.append(self.v[-1] + self.g[-1])
            start = np.exp(-2 * ratio) * self.v[-1](2.0)
            self.v.append(Polynomial([start]) - 2 * ratio * self.g[-1].integ())

    def _at(self, tau: Array, weights: tuple[float, float]) -> Array:
        tau = np.atleast_1d(np.asarray(tau, float))
        n = np.floor(tau / 2 + 1e-12).astype(int)
        s = tau - 2 * n
        found = [
            np.exp(-self.ratio * b) * (weights[0] * self.v[k](b) + weights[1] * self.g[k](b))
            for k, b in zip(n, s, strict=True)
        ]
        return np.array(found)

    def striker(self, tau: Array) -> Array:
        """Velocity of the striker over V."""
        return self._at(tau, (1.0, 0.0))

    def contact(self, tau: Array) -> Array:
        """Contact stress over rho c V."""
        return self._at(tau, (1.0, 2.0))

    def fixed(self, tau: Array) -> Array:
        """Stress at the fixed end over rho c V, one passage after `tau`."""
        return self._at(tau, (2.0, 2.0))

    def duration(self) -> float:
        """Contact time over L/c: the first zero of the contact stress."""
        for n in range(len(self.v)):
            line = np.linspace(2 * n, 2 * n + 2 - 1e-9, 400)
            stress = self.contact(line)
            below = np.flatnonzero(stress <= 0)
            if len(below):
                i = below[0]
                return brentq(lambda x: self.contact(x)[0], line[i - 1], line[i])
        raise AssertionError("contact ends sooner or later")


PRINTED = {
    # contact time, striker velocity after, largest stress at the fixed end, largest contact stress
    "1/6": (7.40759189, -0.929680854, 3.50452178, 3.4687922),
    "1/4": (5.89959044, -0.816911552, 3.21306132, 2.9744101),
    "1/2": (4.70856724, -0.925246997, 2.73575888, 2.36787944),
    "1": (3.06766764, -0.68761894, 2.27067057, 2.13533528),
    "4": (2.25004193, -0.735635483, 2.00067093, 2.00033546),
}


@check(
    model="rigid mass on a rod with its far end fixed, mesh chosen by the program; rod mass / striker mass",
    title="Saint-Venant's problem",
    source=(
        "Saint-Venant and Flamant 1883, after Love 1927, art. 281 (from memory); recomputed, and the "
        "recomputed table"
    ),
    formula="polynomials times exponentials, passage after passage: see SaintVenant in mass_on_rod.py",
    tolerance=5e-3,
    why=SMEARED,
    over={name: name for name in RATIOS},
)
def saint_venant(name: str) -> Iterator[Compared]:
    ratio = RATIOS[name]
    exact, (time, after, fixed, contact) = SaintVenant(ratio), PRINTED[name]
    length, speed, span = 5.0, 1.0, 0.001
    mass = 400.0 / ratio
    run = _strike(mass, speed, "fixed", length, (exact.duration() + 1) * span)
    force = run.head_train.cushion_force
    left = next(e.time for e in run.events if e.kind == "separation")
    tau = np.arange(0, exact.duration(), 0.01)
    yield value("contact time, c t/L", exact.duration(), left / span, "L/c")
    yield value("contact time, printed", time, left / span, "L/c")
    gone = run.head_train.ram_velocity[round(left / run.time_step) + 5]
    yield value("velocity of the mass after it has left", after, gone / speed, "V")
    yield value(
        "largest stress at the fixed end",
        exact.fixed(tau).max(),
        -run.gauges["far end"].force.min() / Z,
        "rho c V",
    )
    yield value("the same, printed", fixed, -run.gauges["far end"].force.min() / Z, "rho c V")
    yield value("largest contact stress", contact, force.max() / Z, "rho c V")


@check(
    model="rigid mass on a rod with its far end fixed, rod mass / striker mass 1/2",
    title="Saint-Venant's problem over time",
    source="recomputed by Saint-Venant's recursion",
    formula="contact stress v + 2 g, striker velocity v, fixed-end stress 2 (v + g) one passage later",
    tolerance=1e-3,
    share_of="the largest value",
    why="the times compared lie between the fronts, where little is left of what they smear",
)
def saint_venant_history() -> Iterator[Compared | Picture]:
    exact, length, span = SaintVenant(0.5), 5.0, 0.001
    run = _strike(800.0, 1.0, "fixed", length, 5.5 * span)
    tau = np.array([0.5, 1.0, 1.5, 1.9, 2.2, 2.5, 3.0, 3.5, 3.9, 4.1, 4.25, 4.5])
    steps = np.rint(tau * span / run.time_step).astype(int)
    later = np.rint((tau + 1) * span / run.time_step).astype(int)
    force, speed = run.head_train.cushion_force, run.head_train.ram_velocity
    yield history("contact stress", exact.contact(tau), force[steps] / Z, "rho c V")
    yield history("velocity of the mass", exact.striker(tau), speed[steps], "V")
    yield history(
        "stress at the fixed end", exact.fixed(tau), -run.gauges["far end"].force[later] / Z, "rho c V"
    )
    line = np.linspace(0, exact.duration(), 1200)
    shown = run.head_train.time <= 5.2 * span
    yield picture(
        "A mass twice as heavy as the rod strikes it, far end fixed",
        "c t / L",
        "contact stress / (rho c V)",
        line,
        exact.contact(line),
        force[shown] / Z,
        run.head_train.time[shown] / span,
    )


@check(
    model="rigid mass on a rod with its far end free; rod mass / striker mass 1/4, 1/2 and 2",
    title="Mass on a free rod: contact for exactly 2 L/c",
    source="recomputed: the tension front takes 2 rho c V off the contact stress",
    formula=(
        "time 2 L/c, striker after V exp(-2 a), energy to the rod 1 - exp(-4 a), mean velocity V (1 - "
        "exp(-2 a))/a"
    ),
    tolerance=5e-3,
    why=SMEARED,
)
def free_end() -> Iterator[Compared]:
    length, span = 5.0, 0.001
    for ratio in (0.25, 0.5, 2.0):
        run = _strike(400.0 / ratio, 1.0, "free", length, 2.6 * span)
        left = next(e.time for e in run.events if e.kind == "separation")
        start = 400.0 / ratio / 2
        speed = run.head_train.ram_velocity[-1]
        yield value(f"contact time, a = {ratio}", 2.0, left / span, "L/c")
        yield value(f"velocity of the mass after, a = {ratio}", np.exp(-2 * ratio), speed, "V", 1.0)
        given = run.gauges["head"].transferred_energy[-1] / start
        yield value(f"energy given, a = {ratio}", 1 - np.exp(-4 * ratio), given, "of the mass's", 1.0)
        mean = 400.0 / ratio * (1 - speed) / 400.0
        yield value(f"mean velocity of the rod, a = {ratio}", (1 - np.exp(-2 * ratio)) / ratio, mean, "V")


@check(
    model="rigid mass on a fixed rod, rod mass / striker mass 1/2, 50 to 400 elements",
    title="Mass on a rod: the error halves with the mesh",
    source="first order of a front smeared over one node; recomputed",
    formula=(
        "largest stress at the fixed end 2 (1 + exp(-2 a)) rho c V; its error is proportional to the "
        "element's length"
    ),
    tolerance=0.02,
    share_of="the ratio 2",
    why="the next order is 1 % of the first at 50 elements",
)
def mesh_halved() -> Iterator[Compared]:
    errors = []
    for elements in (50, 100, 200, 400):
        run = _strike(800.0, 1.0, "fixed", 5.0, 0.0035, dx=5.0 / elements)
        errors.append(2 * (1 + np.exp(-1.0)) + run.gauges["far end"].force.min() / Z)
    for i, elements in enumerate((50, 100, 200)):
        yield value(
            f"error with {elements} elements over that with {2 * elements}", 2.0, errors[i] / errors[i + 1]
        )
