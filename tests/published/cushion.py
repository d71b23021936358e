"""Ram, cushion, cap and a member that acts as a dashpot Z until something comes back."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from scipy.integrate import solve_ivp

from solver import Result
from solver.model.load import Cushion
from tests.published.registry import Array, Compared, Picture, check, history, picture, value
from tests.published.rods import GRAVITY, Z, material, part, solved

MODEL = "lumped ram, cushion without damping, member = dashpot"
DEEKS = "Deeks & Randolph 1993, Int. J. Numer. Anal. Meth. Geomech. 17 (model; from its summary); numbers recomputed"
SECOND_ORDER = (
    "Required are 0.2 %. The cushion acts with the mean of two half steps, so that errors are of "
    "second order: about 1e-5."
)
STIFF = 1e8
"""Stiffness of the ram cushion, N/m: with Z = 400 000 N s/m the unit of time Z/k is 4 ms."""
UNIT = Z / STIFF


def _drop(ram: float, end: float, cap: float = 0.0, second: float | None = None) -> Result:
    """Dimensionless masses m* = k m/Z^2 and times t* = k t/Z; impact at 1 m/s on a rod that nothing comes back from."""
    load = {
        "kind": "drop",
        "ram_mass": ram * Z**2 / STIFF,
        "impact_velocity": 1.0,
        "cushion": {"stiffness": STIFF, "restitution": 1.0},
        "cap_mass": cap * Z**2 / STIFF,
        "pile_cushion": None if second is None else {"stiffness": second * STIFF, "restitution": 1.0},
    }
    return solved(load, part(10.0), far_end="matched", gauges={"head": 0.0}, duration=end * UNIT)


def _peak(time: Array, record: Array) -> tuple[float, float]:
    """Largest value and its time, by a parabola through three samples."""
    i = int(np.argmax(record))
    a, b, c = record[i - 1 : i + 2]
    shift = (a - c) / (2 * (a - 2 * b + c))
    return b - (a - c) * shift / 4, time[i] + shift * (time[1] - time[0])


def _no_cap(ram: float) -> tuple[float, float]:
    """Peak force over Z V and its t*, of F'' + F' + F/m = 0, F(0) = 0, F'(0) = 1."""
    if ram < 4:
        q = np.sqrt(4 / ram - 1)
        return np.sqrt(ram) * np.exp(-np.arctan(q) / q), 2 * np.arctan(q) / q
    if ram == 4:
        return 2 / np.e, 2.0
    q = np.sqrt(1 - 4 / ram)
    return np.sqrt(ram) * np.exp(-np.arctanh(q) / q), 2 * np.arctanh(q) / q


@check(
    model=MODEL + ", no cap",
    title="Peak force and its time at fourteen ratios k m/Z^2",
    source=DEEKS,
    formula=(
        "m* < 4: F/(Z V) = sqrt(m*) exp(-atan(q)/q), t* = 2 atan(q)/q, q = sqrt(4/m* - 1); m* = 4: 2/e "
        "at 2; else with artanh"
    ),
    tolerance=1e-4,
    why=SECOND_ORDER,
)
def no_cap() -> Iterator[Compared]:
    for ram in (0.1, 0.25, 0.5, 1.0, 2.0, 3.0, 4.0, 6.0, 8.0, 10.0, 16.0, 20.0, 50.0, 100.0):
        force, time = _no_cap(ram)
        run = _drop(ram, 1.2 * time + 0.2)
        found, at = _peak(run.head_train.time, run.head_train.cushion_force)
        yield value(f"peak force, m* = {ram:g}", force, found / Z, "Z V")
        yield value(f"its time, m* = {ram:g}", time, at / UNIT, "Z/k")


@check(
    model=MODEL + ", no cap: the ram leaves",
    title="When the ram leaves, how fast, and what it has given",
    source=DEEKS,
    formula="t* = pi/w, v = -V exp(-pi/(2 w)), w = sqrt(1/m* - 1/4); energy 1 - (v/V)^2 of the ram's",
    tolerance=2e-3,
    share_of="the value, or V",
    why="the time of an event is known to one step of 0.00125 Z/k; the rest is met to 1e-5",
)
def ram_leaves() -> Iterator[Compared]:
    for ram in (0.1, 0.25, 0.5, 1.0, 2.0):
        w = np.sqrt(1 / ram - 0.25)
        run = _drop(ram, np.pi / w + 0.5)
        left = next(e.time for e in run.events if e.kind == "separation")
        speed = run.head_train.ram_velocity[-1]
        given = run.gauges["head"].transferred_energy[-1] / (ram * Z**2 / STIFF / 2)
        yield value(f"time, m* = {ram:g}", np.pi / w, left / UNIT, "Z/k")
        yield value(f"velocity of the ram, m* = {ram:g}", -np.exp(-np.pi / (2 * w)), speed, "V", 1.0)
        yield value(f"energy given, m* = {ram:g}", 1 - np.exp(-np.pi / w), given, "of the ram's")


@check(
    model=MODEL + ", cap as a lumped mass on the head",
    title="Ram, cushion and cap: six pairs of masses",
    source=DEEKS + "; linear equations integrated here at a tolerance of 1e-11, and the recomputed table",
    formula="F_c = delta, m_r* v_r' = -F_c, m_a* v_a' = F_c - v_a, force on the member v_a",
    tolerance=1e-4,
    why=SECOND_ORDER,
)
def with_cap() -> Iterator[Compared]:
    table = {
        # m_r*, m_a*: force on the member, its t*, cushion force
        (2.0, 0.1): (0.660977878, 1.57870175, 0.662986757),
        (10.0, 0.1): (0.845690022, 2.56903737, 0.846205384),
        (2.0, 0.5): (0.713756924, 1.90657351, 0.792104946),
        (10.0, 0.5): (0.931304545, 2.55355884, 0.976389732),
        (4.0, 1.0): (0.852921576, 2.68099876, 1.04923624),
        (20.0, 1.0): (1.07332175, 3.30465412, 1.22986304),
    }
    for (ram, cap), (force, time, cushion) in table.items():
        run = _drop(ram, 5.0, cap)
        found, at = _peak(run.gauges["head"].time, -run.gauges["head"].force)
        name = f"m_r* = {ram:g}, m_a* = {cap:g}"
        yield value(f"peak force on the member, {name}", force, found / Z, "Z V")
        yield value(f"its time, {name}", time, at / UNIT, "Z/k")
        yield value(f"peak cushion force, {name}", cushion, run.head_train.cushion_force.max() / Z, "Z V")
        line = np.linspace(0.1, 4.9, 25)
        exact = solve_ivp(
            lambda t, y, m=ram, a=cap: [y[1] - y[2], -y[0] / m, (y[0] - y[2]) / a],
            (0, 5),
            [0, 1, 0],
            t_eval=line,
            method="DOP853",
            rtol=1e-11,
            atol=1e-13,
        )
        found_line = np.interp(line * UNIT, run.gauges["head"].time, -run.gauges["head"].force)
        yield history(f"force on the member over time, {name}", exact.y[2], found_line / Z, "Z V")


@check(
    model=MODEL + ", ram cushion, cap and pile cushion, none of them carrying tension",
    title="Two cushions",
    source="Take, Valsangkar & Randolph 1999, Computers and Geotechnics (model; from its summary); recomputed table",
    formula="m_r* v_r' = -F_1, m_a* v_a' = F_1 - F_2, F_2 = v of the head, both forces not below zero",
    tolerance=1e-4,
    why=SECOND_ORDER,
)
def two_cushions() -> Iterator[Compared]:
    table = {
        (4.0, 0.5): (0.7816566, 2.404341, 0.7045051, 1.171298),
        (10.0, 1.0): (0.9631373, 3.379682, 1.005683, 1.664359),
    }
    for (ram, cap), (force, time, cushion, cushion_time) in table.items():
        run = _drop(ram, 6.0, cap, 1.0)
        found, at = _peak(run.gauges["head"].time, -run.gauges["head"].force)
        first, first_at = _peak(run.head_train.time, run.head_train.cushion_force)
        name = f"m_r* = {ram:g}, m_a* = {cap:g}"
        yield value(f"peak force on the member, {name}", force, found / Z, "Z V")
        yield value(f"its time, {name}", time, at / UNIT, "Z/k")
        yield value(f"peak force of the ram cushion, {name}", cushion, first / Z, "Z V")
        yield value(f"its time, {name}", cushion_time, first_at / UNIT, "Z/k")


@check(
    model="two cushions without a cap between them",
    title="Cushions in series act as one",
    source="flexibilities add (textbook)",
    formula="1/k = 1/k1 + 1/k2; peak as for one cushion",
    tolerance=1e-4,
    why=SECOND_ORDER,
)
def in_series() -> Iterator[Compared]:
    run = _drop(8.0, 6.0, 0.0, 1.0)
    force, time = _no_cap(4.0)
    found, at = _peak(run.head_train.time, run.head_train.cushion_force)
    yield value("peak force", force, found / Z, "Z V")
    yield value("its time", time, at / (2 * UNIT), "Z/k")


@check(
    model="ram 4000 kg falling 1.0 m on a cushion of 1e9 N/m, member of Z = 1e6 N s/m",
    title="The case in SI units",
    source=DEEKS + "; m* = 4, so F = Z V t* exp(-t*/2)",
    formula="V = sqrt(2 g h) = 4.4286906 m/s; F = 3258.4484 kN at 2 ms; ram v = V (1 + t*/2) exp(-t*/2)",
    tolerance=2e-4,
    share_of="the largest value",
    why=SECOND_ORDER,
)
def si_case() -> Iterator[Compared | Picture]:
    load = {
        "kind": "drop",
        "ram_mass": 4000.0,
        "drop_height": 1.0,
        "efficiency": 1.0,
        "cushion": {"stiffness": 1e9, "restitution": 1.0},
    }
    steel = material("it", 1e6 * 5000 / 0.025, 8000)
    run = solved(
        load,
        part(20.0, 0.025, "it"),
        materials=[steel],
        far_end="matched",
        gauges={"head": 0.0},
        duration=0.0085,
    )
    speed = np.sqrt(2 * GRAVITY)
    table = {0.5: (1724.5338, 4.3113346), 1: (2686.1366, 4.0292049), 2: (3258.4484, 3.2584484)}
    table |= {3: (2964.5233, 2.4704361), 5: (1817.6453, 1.2723517), 8: (648.91438, 0.40557148)}
    steps = np.rint(np.array(list(table)) / 1e3 / run.time_step).astype(int)
    forces, speeds = np.array(list(table.values())).T
    head = run.gauges["head"]
    yield value("impact velocity", speed, 4.4286906, "m/s")
    yield history("force on the member", forces * 1e3, -head.force[steps], "N", 3258.4484e3)
    yield history("velocity of the head", forces / 1e3, head.velocity[steps], "m/s", 3.2584484)
    yield history("velocity of the ram", speeds, run.head_train.ram_velocity[steps], "m/s", speed)
    found, at = _peak(head.time, -head.force)
    yield value("peak force", 1e6 * speed * 2 / np.e, found, "N")
    yield value("its time", 0.002, at, "s")
    t = head.time / 0.001
    yield picture(
        "Ram of 4000 kg, drop of 1 m, cushion 1e9 N/m, member Z = 1e6 N s/m",
        "time, ms",
        "force on the member, kN",
        t,
        1e3 * speed * t * np.exp(-t / 2),
        -head.force / 1e3,
    )


@check(
    model="ram on a cushion on a base that does not give: a short fixed rod, 10 000 times as stiff",
    title="A cushion gives back e^2 of the energy",
    source="E. A. L. Smith 1960, J. Soil Mech. Found. Div. ASCE 86 SM4 (from memory)",
    formula="loading along k, unloading along k/e^2: rebound velocity e V, contact (pi/2) sqrt(m/k) (1 + e)",
    tolerance=1e-3,
    why="the base gives by 1e-4 of what the cushion does, and hands back what it takes",
)
def restitution() -> Iterator[Compared]:
    mass, k, speed = 1000.0, 4e8, 2.0
    stiff = material("stiff", 1e14, 800.0)
    for e in (0.3, 0.5, 0.8, 1.0):
        load = {
            "kind": "drop",
            "ram_mass": mass,
            "impact_velocity": speed,
            "cushion": {"stiffness": k, "restitution": e},
        }
        contact = np.pi / 2 * np.sqrt(mass / k) * (1 + e)
        run = solved(
            load,
            part(0.25, 0.01, "stiff"),
            materials=[stiff],
            far_end="fixed",
            duration=1.1 * contact,
            dx=0.05,
        )
        left = next(ev.time for ev in run.events if ev.kind == "separation")
        yield value(f"rebound velocity, e = {e}", -e * speed, run.head_train.ram_velocity[-1], "m/s")
        yield value(f"time of contact, e = {e}", contact, left, "s")
        lost = run.ledger.final["cushion_loss"]
        yield value(f"energy lost, e = {e}", (1 - e**2) * mass * speed**2 / 2, lost, "J", mass * speed**2 / 2)


@check(
    model="stiffness of a cushion from its material, area and thickness",
    title="Five cushions of 0.16 m2 x 0.15 m",
    source="Hirsch, Carr & Lowery 1976, FHWA-IP-76-13, table of cushion materials (from memory)",
    formula="k = E A/t, moduli in psi",
    tolerance=2e-6,
    why="printed with six digits",
)
def cushion_stiffness() -> Iterator[Compared]:
    psi = 6894.757293
    table = {
        "laminated phenolic": (450000, 3309.48),
        "oak": (45000, 330.948),
        "fir plywood": (35000, 257.404),
    }
    table |= {"pine plywood": (25000, 183.86), "gum": (30000, 220.632)}
    for name, (modulus, wanted) in table.items():
        block = Cushion(young_modulus=modulus * psi, area=0.16, thickness=0.15, restitution=0.5)
        yield value(name, wanted * 1e6, block.loading_stiffness, "N/m")
