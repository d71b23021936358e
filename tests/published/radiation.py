"""Ground as an elastic half-space: Lysmer's analogue at the toe, Randolph and Simons' constants along the shaft."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from scipy.special import iv, j0

from solver.numerics.chain import build_chain
from solver.numerics.ground import toe_of
from tests.published.registry import Compared, check, history, value
from tests.published.rods import case_of, material, part, pulse, solved

LYSMER = "Lysmer 1965; Lysmer & Richart 1966 (from memory); recomputed"
RANDOLPH = "Randolph & Simons 1986 (from memory); recomputed"
R, G, NU, RHO = 0.25, 20e6, 0.3, 1800.0
SOIL = {"kind": "radiation", "shear_modulus": G, "soil_density": RHO, "poisson_ratio": NU}
K_TOE, C_TOE = 4 * G * R / (1 - NU), 3.4 * R**2 * np.sqrt(RHO * G) / (1 - NU)
ROUND = {"shape": "solid_round", "diameter": 2 * R}
CONCRETE = material("concrete", 40e9, 2450.0)
Z = np.pi * R**2 * np.sqrt(40e9 * 2450)
SPEED = np.sqrt(40e9 / 2450)
STRONG = 1e12
"""A strength that nothing here reaches, N."""


def _toe(resistance: float = STRONG) -> dict:
    return {"far_end": "ground", "ground": {"surface": 0.0, "toe": {"resistance": resistance, "model": SOIL}}}


@check(
    model="toe constants of a round pile, r = 0.25 m, G = 20 MPa, nu = 0.3, 1800 kg/m3",
    title="Lysmer's spring and dashpot",
    source=LYSMER,
    formula="K = 4 G r/(1 - nu) = 2.8571429e7 N/m, C = 3.4 r^2 sqrt(rho G)/(1 - nu) = 57 598.629 N s/m",
    tolerance=1e-6,
    why="arithmetic, printed with eight digits",
)
def toe_constants() -> Iterator[Compared]:
    case = case_of(
        pulse("rectangle", 1.0), part(10.0, section=ROUND, of="concrete"), materials=[CONCRETE], **_toe()
    )
    table, _ = toe_of(build_chain(case))
    yield value("K", 2.8571429e7, table[2], "N/m")
    yield value("C", 57598.629, table[3], "N s/m")


@check(
    model="rigid mass of 500 kg at 0.5 m/s on Lysmer's toe",
    title="Damping ratio and frequency of a mass on Lysmer's toe",
    source=LYSMER,
    formula=(
        "D = 0.425/sqrt(B), B = (1 - nu) m/(4 rho r^3) = 3.111, D = 0.24095; first peak V/w exp(-D "
        "acos(D)/sqrt(1 - D^2)) at acos(D)/(w sqrt(1 - D^2))"
    ),
    tolerance=1e-3,
    why="the mass is a short rod 70 000 times as stiff as the toe, with a little ringing of its own",
)
def mass_on_toe() -> Iterator[Compared]:
    length = 0.1
    heavy = material("heavy", 1e12, 500.0 / (np.pi * R**2 * length))
    b = (1 - NU) * 500.0 / (4 * RHO * R**3)
    d = 0.425 / np.sqrt(b)
    w = np.sqrt(K_TOE / 500.0)
    time = np.arccos(d) / (w * np.sqrt(1 - d**2))
    peak = 0.5 / w * np.exp(-d * np.arccos(d) / np.sqrt(1 - d**2))
    run = solved(
        {"kind": "none"},
        part(length, section=ROUND, of="heavy"),
        materials=[heavy],
        gauges={"toe": length},
        initial_velocity=0.5,
        duration=1.1 * time,
        dx=length / 2,
        **_toe(),
    )
    gauge = run.gauges["toe"]
    top = int(np.argmax(gauge.displacement))
    yield value("damping ratio of the constants", 0.24095235, C_TOE / (2 * np.sqrt(K_TOE * 500.0)))
    yield value("first peak", peak, gauge.displacement[top], "m")
    window = slice(top - 200, top + 200)
    smooth = np.polyfit(gauge.time[window], gauge.displacement[window], 2)
    yield value("its time", time, -smooth[1] / (2 * smooth[0]), "s", tolerance=5e-3)


@check(
    model="step wave of 1 MN from a concrete pile onto Lysmer's toe",
    title="Lysmer's toe as an impedance",
    source=LYSMER + "; end with spring and dashpot side by side (Graff 1975)",
    formula="u = (2 F0/K)(1 - exp(-K t/(Z + C)))",
    tolerance=5e-4,
    share_of="the largest value",
    why="second order in dt behind a front of one element",
)
def toe_as_impedance() -> Iterator[Compared]:
    length = 30.0
    run = solved(
        pulse("rectangle", 1.0),
        part(length, section=ROUND, of="concrete"),
        materials=[CONCRETE],
        gauges={"toe": length},
        duration=2.9 * length / SPEED,
        **_toe(),
    )
    gauge = run.gauges["toe"]
    t = gauge.time - length / SPEED
    inside = t > 1.5 * run.time_step
    exact = 2e6 / K_TOE * (1 - np.exp(-K_TOE * t[inside] / (Z + C_TOE)))
    speed = 2e6 / (Z + C_TOE) * np.exp(-K_TOE * t[inside] / (Z + C_TOE))
    yield history("displacement of the toe", exact, gauge.displacement[inside], "m")
    yield history("velocity of the toe", speed, gauge.velocity[inside], "m/s")
    force = K_TOE * exact + C_TOE * speed
    yield history("force at the toe", force, -gauge.force[inside], "N", 2e6)


def _layered(strength: float, thickness: float = 60.0, surface: float = 0.0) -> dict:
    layer = {"name": "soil", "thickness": thickness, "unit_resistance": strength, "model": SOIL}
    return {"surface": surface, "layers": [layer]}


@check(
    model="step force of 1 MN into a concrete pile in ground of Randolph and Simons' constants, no slip",
    title="Randolph and Simons' shaft as an impedance",
    source=RANDOLPH + "; Klein-Gordon equation on a half line (Graff 1975)",
    formula=(
        "k = 2.9 G = 5.8e7 N/m and c = 2 pi r sqrt(G rho) = 298 037.65 N s/m per metre: "
        "v = (F0/Z) exp(-a t) J0(t sqrt(w0^2 - a^2)), a = c/(2 rho A), w0^2 = k/(rho A)"
    ),
    tolerance=2e-3,
    share_of="F0/Z",
    why="the half element at the struck end hands its share to the next node: first order in the element",
)
def shaft_as_impedance() -> Iterator[Compared]:
    length = 30.0
    run = solved(
        pulse("rectangle", 1.0),
        part(length, section=ROUND, of="concrete"),
        materials=[CONCRETE],
        gauges={"head": 0.0},
        ground=_layered(1e9),
        duration=1.9 * length / SPEED,
        dx=length / 1500,
    )
    gauge = run.gauges["head"]
    line_mass = 2450 * np.pi * R**2
    a, w0 = 298037.65 / (2 * line_mass), np.sqrt(5.8e7 / line_mass)
    t = gauge.time[2:]
    root = w0**2 - a**2
    shape = j0(np.sqrt(root) * t) if root > 0 else iv(0, np.sqrt(-root) * t)
    yield history(
        "velocity of the head", 1e6 / Z * np.exp(-a * t) * shape, gauge.velocity[2:], "m/s", 1e6 / Z
    )
    yield value("k per metre", 5.8e7, 2.9 * G, "N/m2")
    yield value("c per metre", 298037.65, 2 * np.pi * R * np.sqrt(G * RHO), "N s/m2")


@check(
    model="radiation shaft on one node, strong and weak, passed by a step of 1 MN",
    title="Slip at the shaft strength",
    source=RANDOLPH + " (spring and dashpot in series with a slider)",
    formula="while it holds (2 Z + C) v + K u = 2 F0, R = 2 F0 - 2 Z v; R = strength while it slips",
    tolerance=1e-5,
    why="second order in the step",
)
def slip() -> Iterator[Compared]:
    length, thin, dx = 20.0, 0.05, 0.1
    for name, strength in (("holds", 1e9), ("slips", 2e3)):
        total = strength if name == "holds" else strength / (np.pi * 2 * R * thin)
        run = solved(
            pulse("rectangle", 1.0),
            part(length, section=ROUND, of="concrete"),
            materials=[CONCRETE],
            gauges={"before": 9.8},
            far_end="matched",
            ground=_layered(total, thin, 10.0 - thin / 2),
            duration=10.5 / SPEED + 0.0003,
            dx=dx,
        )
        wave = -run.gauges["before"].up_wave
        n = round(10.2 / SPEED / run.time_step) + 4
        since = n * run.time_step - 10.2 / SPEED
        c, k = 2 * np.pi * R * np.sqrt(G * RHO) * thin, 2.9 * G * thin
        held = 2e6 * (1 - 2 * Z / (2 * Z + c) * np.exp(-k * since / (2 * Z + c)))
        yield value(f"resistance, {name}", held if name == "holds" else strength, 2 * wave[n], "N")
