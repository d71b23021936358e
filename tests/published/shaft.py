"""Resistance along the shaft under a step wave: linear, rigid-plastic, and at one point."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from scipy.integrate import quad
from scipy.special import i0, i1, j0, j1

from solver import Result
from tests.published.registry import Array, Compared, Picture, check, history, picture, value
from tests.published.rods import AREA, DENSITY, C, Z, part, pulse, solved

TELEGRAPH = "telegraph and Klein-Gordon equations on a half line (Graff 1975, from memory); recomputed"
F0, LINE_MASS = 1e6, DENSITY * AREA
LONG = 12.0


def _layer(
    resistance: float, quake: float, damping: float = 0.0, law: str = "viscous", thickness: float = 50.0
) -> dict:
    """One layer from the struck end on; the perimeter is 1 m, so that `resistance` is also that per metre."""
    one = {
        "name": "soil",
        "thickness": thickness,
        "unit_resistance": resistance,
        "quake": quake,
        "damping": damping,
    }
    return {"surface": 0.0, "layers": [{**one, "damping_law": law}]}


def _dashpots(per_metre: float, dx: float = 0.02) -> list[dict]:
    """Dashpots to fixed ground on every node: damping without any spring, which no ground law has."""
    count = round(LONG / dx)
    share = [0.5 if i in (0, count) else 1.0 for i in range(count + 1)]
    return [
        {"position": LONG * i / count, "kind": "dashpot", "value": per_metre * dx * part_of}
        for i, part_of in enumerate(share)
    ]


def _step(ground: dict | None = None, quantity: str = "force", dashpots: float = 0.0) -> Result:
    peak = F0 if quantity == "force" else F0 / Z
    return solved(
        pulse("rectangle", 1.0, peak, quantity),
        part(LONG),
        gauges={"head": 0.0, "2 m": 2.0, "4 m": 4.0},
        ground=ground,
        attachments=_dashpots(dashpots) if dashpots else (),
        duration=0.0046,
        dx=0.02,
    )


FIRST_ORDER = (
    "The half element at the struck end hands its share of the ground to the next node, an error of "
    "first order in the element (20 mm): 0.05 %; the rest is of second order."
)


@check(
    model="springs and dashpots spread along the rod, step force of 1 MN; b = 16 000 N s/m2, k = 2e7 N/m2",
    title="Linear shaft: velocity of the struck end",
    source=TELEGRAPH,
    formula=(
        "v = (F0/Z) exp(-a t) J0(t sqrt(w0^2 - a^2)); dashpots only exp(-a t) I0(a t); springs only "
        "J0(w0 t); a = b/(2 rho A)"
    ),
    tolerance=5e-4,
    share_of="F0/Z",
    why=FIRST_ORDER,
)
def linear() -> Iterator[Compared | Picture]:
    b, k = 16000.0, 2e7
    # strengths never reached: what is left is J Ru = b and Ru/Q = k
    runs = {
        "dashpots": _step(dashpots=b),
        "springs": _step(_layer(k, 1.0)),
        "both": _step(_layer(k, 1.0, b / k)),
    }
    at = np.array([0.5, 1.0, 2.0]) * 1e-3
    printed = {
        "dashpots": (2.3795601, 2.2677523, 2.0673464),
        "springs": (2.4610898, 2.3461745, 1.9129942),
        "both": (2.342536, 2.1283903, 1.5842884),
    }
    a, w0 = b / (2 * LINE_MASS), np.sqrt(k / LINE_MASS)
    forms = {
        "dashpots": lambda t: np.exp(-a * t) * i0(a * t),
        "springs": lambda t: j0(w0 * t),
        "both": lambda t: np.exp(-a * t) * j0(np.sqrt(w0**2 - a**2) * t),
    }
    for name, run in runs.items():
        gauge = run.gauges["head"]
        inside = gauge.time > 1.5 * run.time_step
        exact = F0 / Z * forms[name](gauge.time[inside])
        yield history(f"velocity of the head, {name}", exact, gauge.velocity[inside], "m/s", F0 / Z)
        found = gauge.velocity[np.rint(at / run.time_step).astype(int)]
        yield history(f"{name}, printed", np.array(printed[name]), found, "m/s", F0 / Z)
        if name == "both":
            yield picture(
                "Step of 1 MN into a rod in linear ground: velocity of the struck end",
                "time, ms",
                "velocity, m/s",
                gauge.time[inside] * 1e3,
                exact,
                gauge.velocity[inside],
            )


@check(
    model="the same ground, force inside the rod",
    title="Linear shaft: what the front keeps, and the force behind it",
    source=TELEGRAPH,
    formula=(
        "front at depth x: exp(-a x/c); springs only: F(x, t)/F0 = 1 - (x/c) w0 x integral from x/c to t of "
        "J1(w0 r)/r ds, r = sqrt(s^2 - (x/c)^2)"
    ),
    tolerance=2e-3,
    share_of="F0",
    why=FIRST_ORDER,
)
def inside() -> Iterator[Compared]:
    b, k = 16000.0, 2e7
    damped, sprung = _step(dashpots=b), _step(_layer(k, 1.0))
    dt = damped.time_step
    for x in (2.0, 4.0):
        record = -damped.gauges[f"{x:g} m"].force
        n = round(x / C / dt)
        # just behind the front the force still changes: extrapolated to it from the two steps behind
        front = 2 * record[n + 2] - record[n + 4]
        yield value(f"front at {x:g} m", np.exp(-b / (2 * LINE_MASS) * x / C), front / F0, "F0", 1.0)
    w0, t, x = np.sqrt(k / LINE_MASS), 0.002, 4.0

    def kernel(q: float) -> float:
        # s = sqrt(q^2 + (x/c)^2), ds = q/s dq
        s = np.hypot(q, x / C)
        return j1(w0 * q) / s

    lost = x / C * w0 * quad(kernel, 0, np.sqrt(t**2 - (x / C) ** 2))[0]
    found = -sprung.gauges["4 m"].force[round(t / dt)]
    yield value("force at 4 m after 2 ms, springs only", 1 - lost, found / F0, "F0", 1.0)


@check(
    model="dashpots spread along the rod, step of velocity at the struck end",
    title="Linear shaft: force that keeps a velocity",
    source=TELEGRAPH,
    formula="F = Z V0 exp(-a t)(I0(a t) + 2 a t (I0(a t) + I1(a t)))",
    tolerance=1e-3,
    share_of="Z V0",
    why=FIRST_ORDER,
)
def driven() -> Iterator[Compared]:
    run = _step(None, "velocity", 16000.0)
    gauge = run.gauges["head"]
    t = gauge.time[3:]
    at = 16000.0 / (2 * LINE_MASS) * t
    exact = F0 * np.exp(-at) * (i0(at) + 2 * at * (i0(at) + i1(at)))
    yield history("force at the struck end", exact, -gauge.force[3:], "N", F0)


@check(
    model="rigid-plastic shaft of 50 kN/m (quake of 1 micrometre), step force of 1 MN",
    title="Rigid-plastic shaft: F - Z v is the resistance passed so far",
    source="method of characteristics (textbook); recomputed",
    formula="v(0, t) = (F0 - q c t/2)/Z; F - Z v = q c t/2, the resistance down to x = c t/2",
    tolerance=1e-6,
    share_of="F0",
    why=(
        "at Courant number 1 each node passes its own resistance on exactly; the quake of 1 micrometre "
        "takes what is left"
    ),
)
def rigid_plastic() -> Iterator[Compared]:
    q = 50e3
    run = _step(_layer(q, 1e-6))
    gauge = run.gauges["head"]
    inside = gauge.time > 3 * run.time_step
    t = gauge.time[inside]
    yield history("velocity of the head x Z", F0 - q * C * t / 2, gauge.velocity[inside] * Z, "N", F0)
    printed = {0.5: (2.34375, 62.5), 1.0: (2.1875, 125.0), 2.0: (1.875, 250.0), 3.0: (1.5625, 375.0)}
    for ms, (speed, passed) in printed.items():
        n = round(ms * 1e-3 / run.time_step)
        yield value(f"v after {ms:g} ms, printed", speed, gauge.velocity[n], "m/s", F0 / Z)
        yield value(f"F - Z v after {ms:g} ms, printed", passed * 1e3, -2 * gauge.up_wave[n], "N", F0)


def _at_a_point(
    resistance: float, damping: float, quake: float = 1e-6, law: str = "smith"
) -> tuple[Array, Result]:
    """A step of 1 MN passes resistance on one node at 5 m; gauges 0.2 m before and behind it, time from its arrival."""
    unit = resistance / 0.02
    layer = {"name": "thin", "thickness": 0.02, "unit_resistance": unit, "quake": quake, "damping": damping}
    run = solved(
        pulse("rectangle", 1.0),
        part(10.0),
        far_end="matched",
        gauges={"before": 4.8, "there": 5.0, "behind": 5.2},
        ground={"surface": 4.99, "layers": [{**layer, "damping_law": law}]},
        duration=0.0028,
        dx=0.04,
    )
    return run.gauges["there"].time - 5.0 / C, run


@check(
    model="resistance at one place, passed by a step of 1 MN: rigid-plastic 200 kN with Smith damping 0.05 s/ft",
    title="Resistance at a point",
    source="E. A. L. Smith 1960 (from memory); recomputed",
    formula="R = Ru (1 + J F0/Z)/(1 + J Ru/(2 Z)), v = (2 F0 - R)/(2 Z), up-wave R/2, down-wave F0 - R/2",
    tolerance=1e-6,
    share_of="F0",
    why="printed with eight digits; a node's equation is solved exactly, and the quake is passed within one step",
)
def at_a_point() -> Iterator[Compared]:
    t, run = _at_a_point(200e3, 0.05 / 0.3048)
    n = round((5.0 / C + 0.0004) / run.time_step)
    up, down = -run.gauges["before"].up_wave[n], -run.gauges["behind"].down_wave[n]
    yield value("up-wave", 135.4554e3, up, "N", F0)
    yield value("down-wave", 864.5446e3, down, "N", F0)
    yield value("velocity there", 2.1613615, run.gauges["there"].velocity[n], "m/s", F0 / Z)
    yield value("resistance", 270.91081e3, 2 * up, "N", F0)
    assert t[n] > 0


@check(
    model="resistance at one place, 200 kN, viscous, and power law with N = 0.2",
    title="Resistance at a point, other laws of damping",
    source="Gibson & Coyle 1968 for |v|^N (from memory); recomputed",
    formula="viscous: 2 Z v = 2 F0 - Ru - J Ru v; power: 2 Z v = 2 F0 - Ru - J Ru v^N",
    tolerance=1e-6,
    share_of="F0",
    why="a node's equation is solved exactly",
)
def other_laws() -> Iterator[Compared]:
    ru, damping = 200e3, 0.5
    t, run = _at_a_point(ru, damping, law="viscous")
    n = round((5.0 / C + 0.0004) / run.time_step)
    v = (2 * F0 - ru) / (2 * Z + damping * ru)
    yield value("viscous: velocity there", v, run.gauges["there"].velocity[n], "m/s", F0 / Z)
    yield value("viscous: up-wave", (ru + damping * ru * v) / 2, -run.gauges["before"].up_wave[n], "N", F0)
    layer = {
        "name": "thin",
        "thickness": 0.02,
        "unit_resistance": ru / 0.02,
        "quake": 1e-6,
        "damping": damping,
    }
    run = solved(
        pulse("rectangle", 1.0),
        part(10.0),
        far_end="matched",
        gauges={"before": 4.8, "there": 5.0},
        ground={"surface": 4.99, "layers": [{**layer, "damping_law": "power", "exponent": 0.2}]},
        duration=0.0028,
        dx=0.04,
    )
    v = 2.0
    for _ in range(60):
        v = (2 * F0 - ru - damping * ru * v**0.2) / (2 * Z)
    yield value("power: velocity there", v, run.gauges["there"].velocity[n], "m/s", F0 / Z)
    assert t[n] > 0


@check(
    model="shaft resistance that grows with depth, 0 to 48 kN/m over 12 m, rigid-plastic; as a layer and as a total",
    title="Growing shaft resistance",
    source="method of characteristics (textbook); recomputed",
    formula="F - Z v at the head = resistance down to x = c t/2 = q1 x^2/(2 L)",
    tolerance=1e-5,
    share_of="F0",
    why=(
        "at Courant number 1 each node passes its own resistance on exactly; the quake of 1 micrometre "
        "takes what is left"
    ),
)
def growing() -> Iterator[Compared]:
    layer = {
        "name": "soil",
        "thickness": LONG,
        "unit_resistance": 0.0,
        "unit_resistance_bottom": 48e3,
        "quake": 1e-6,
    }
    total = {"resistance": 24e3 * LONG, "distribution": "growing", "quake": 1e-6, "damping": 0.0}
    for name, ground in (
        ("layer", {"surface": 0.0, "layers": [{**layer, "damping": 0.0}]}),
        ("total", {"surface": 0.0, "shaft_total": total}),
    ):
        run = _step(ground)
        gauge = run.gauges["head"]
        inside = gauge.time > 3 * run.time_step
        x = C * gauge.time[inside] / 2
        yield history(f"F - Z v, {name}", 48e3 * x**2 / (2 * LONG), -2 * gauge.up_wave[inside], "N", F0)
