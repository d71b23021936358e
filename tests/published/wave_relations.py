"""Waves read from one gauge: splitting them, and what two readings 2L/c apart tell of the resistance."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from tests.published.registry import Compared, Picture, check, history, picture, value
from tests.published.rods import AREA, C, Z, part, pulse, solved

SPLIT = "d'Alembert's solution (Kolsky 1963; Graff 1975, from memory); recomputed"
RESISTED = (
    "method of characteristics: a wave that meets R sends R/2 back and goes on by R/2 less "
    "(textbook); recomputed"
)


@check(
    model="uniform rod, one gauge in the middle, free far end",
    title="Down-going and up-going wave at one gauge",
    source=SPLIT,
    formula=(
        "down (F + Z v)/2, up (F - Z v)/2, compression positive: the incident pulse, and it again, "
        "turned, 2 d/c later"
    ),
    tolerance=1e-10,
    share_of="the peak",
    why="gauges read means that keep F = Z v in a one-way wave to round-off",
)
def split() -> Iterator[Compared]:
    run = solved(pulse("haversine", 0.0016), gauges={"6 m": 6.0}, duration=0.00499, dx=0.1)
    gauge, lag = run.gauges["6 m"], round(2 * 4.0 / C / run.time_step)
    down, up = -gauge.down_wave, -gauge.up_wave
    yield history("up-wave = - down-wave, 2 d/c earlier", -down[:-lag], up[lag:], "N", 1e6)
    yield value("peak of the down-wave", 1e6, down.max(), "N", tolerance=1e-3)
    quiet = gauge.time < 1.2e-3
    yield history("up-wave before anything comes back", np.zeros(quiet.sum()), up[quiet], "N", 1e6)


@check(
    model="uniform rod: force at a depth below the gauge, from its two waves",
    title="Force below a gauge from its waves",
    source=SPLIT,
    formula="F(x, t) = down(t - x/c) + up(t + x/c)",
    tolerance=1e-10,
    share_of="the peak",
    why="whole numbers of steps between the gauges",
)
def below_the_gauge() -> Iterator[Compared]:
    run = solved(
        pulse("half_sine", 0.0012),
        gauges={"gauge": 2.0, "below": 7.0},
        far_end={"kind": "spring", "stiffness": 3e8},
        duration=0.009,
        dx=0.1,
    )
    lag = round(5.0 / C / run.time_step)
    gauge, below = run.gauges["gauge"], -run.gauges["below"].force
    told = -gauge.down_wave[: -2 * lag] - gauge.up_wave[2 * lag :]
    yield history("force 5 m below", told, below[lag:-lag], "N", 1e6)


@check(
    model="half of the section lost below a place with shaft resistance, waves read above",
    title="Ratio of impedances from an echo, with resistance above it",
    source=RESISTED,
    formula=(
        "b = Z2/Z1 = (1 - a)/(1 + a), a = (U_R - U_D)/(D - U_R): D down-wave, U_R up-wave before the "
        "echo, U_D at it"
    ),
    tolerance=1e-3,
    why="the resistance is mobilised through a quake of 1 micrometre; the gauge reads a plateau",
)
def ratio_from_echo() -> Iterator[Compared]:
    ratio, resistance = 0.6, 150e3
    layer = {
        "name": "thin",
        "thickness": 0.02,
        "unit_resistance": resistance / 0.02,
        "quake": 1e-6,
        "damping": 0.0,
    }
    run = solved(
        pulse("rectangle", 0.004),
        part(8.0),
        part(4.0, AREA * ratio),
        gauges={"gauge": 4.0},
        ground={"surface": 5.99, "layers": [layer]},
        duration=0.0031,
        dx=0.04,
    )
    gauge, dt = run.gauges["gauge"], run.time_step
    # front at 4 m 0.8 ms, resistance's wave back at 1.6 ms, the echo of the step (8 m) at 2.4 ms
    down = -gauge.down_wave[round(0.0012 / dt)]
    before, at = (-gauge.up_wave[round(t / dt)] for t in (0.0020, 0.0028))
    yield value("down-wave", 1e6, down, "N")
    yield value("up-wave before the echo, R/2", 75e3, before, "N")
    # the echo passes the resistance anew, in its own direction: it slips on, and nothing changes there
    yield value("up-wave at the echo", -156.25e3, at, "N")
    a = (before - at) / (down - before)
    yield value("ratio of impedances", ratio, (1 - a) / (1 + a))


def _full_record():
    """Half-sine of 1.5 MN and 3 ms down a rod; 200 kN on the shaft 6 m below the gauge, toe 400 kN and 0.3 Z at 10 m.

    The gauge sits 20 m below the struck end, so that it sees no reflection from there for 8 ms.
    """
    thin = {"name": "thin", "thickness": 0.02, "unit_resistance": 200e3 / 0.02, "quake": 1e-6, "damping": 0.0}
    toe = {"resistance": 400e3, "quake": 1e-6, "damping": 0.3 * Z / 400e3, "damping_law": "viscous"}
    run = solved(
        pulse("half_sine", 0.003, 1.5e6),
        part(30.0),
        gauges={"gauge": 20.0},
        far_end="ground",
        ground={"surface": 25.99, "layers": [thin], "toe": toe},
        duration=0.0113,
        dx=0.04,
    )
    gauge = run.gauges["gauge"]
    return gauge.time - 20.0 / C, -gauge.force, gauge.velocity


@check(
    model=(
        "gauge 10 m above the toe: shaft friction 200 kN at 6 m, toe 400 kN and a dashpot of 0.3 Z, "
        "half-sine of 1.5 MN"
    ),
    title="A full record with resistance",
    source=RESISTED + "; recomputed table",
    formula="F and v by the waves of the pulse, of the friction (R/2 up, down) and of the toe",
    tolerance=3e-3,
    share_of="the peak",
    why="quakes of 1 micrometre; a mean over two steps at the steps of the record",
)
def full_record() -> Iterator[Compared | Picture]:
    table = {
        0.5: (750, 1.875),
        1.0: (1299.0381, 3.2475953),
        1.5: (1500, 3.75),
        2.0: (1299.0381, 3.2475953),
        2.5: (850, 1.625),
        2.75: (488.22857, 0.72057142),
        3.0: (100, -0.25),
        3.5: (100, -0.25),
        3.9: (100, -0.25),
        4.25: (252.49231, -0.63123077),
        4.5: (57.692308, -0.14423077),
        5.0: (-237.9436, 0.59485899),
        5.5: (-346.15385, 0.86538462),
        6.0: (-237.9436, 0.59485899),
    }
    t, force, velocity = _full_record()
    at = np.array(list(table)) * 1e-3
    forces, speeds = np.array(list(table.values())).T
    yield history("force", forces * 1e3, np.interp(at, t, force), "N", 1.5e6)
    yield history("velocity", speeds, np.interp(at, t, velocity), "m/s", 3.75)
    shown = (t > -0.0002) & (t < 0.0065)
    yield picture(
        "Force at a gauge 10 m above the toe; closed form: the printed times",
        "time, ms",
        "force, kN",
        at * 1e3,
        forces,
        force[shown] / 1e3,
        t[shown] * 1e3,
    )


@check(
    model="the same record: resistance met by the wave on its way, from two readings 2L/c apart",
    title="Resistance from two readings 2L/c apart",
    source=RESISTED,
    formula=(
        "sum of resistance = down(t) + up(t + 2L/c) = (F1 + Z v1)/2 + (F2 - Z v2)/2; toe velocity (2 "
        "down(t) - sum)/Z"
    ),
    tolerance=3e-3,
    why="as for the record; printed 1153.8462 kN, of which 600 kN static",
)
def two_readings() -> Iterator[Compared]:
    t, force, velocity = _full_record()
    f1, v1 = np.interp(0.0015, t, force), np.interp(0.0015, t, velocity)
    f2, v2 = np.interp(0.0055, t, force), np.interp(0.0055, t, velocity)
    total = (f1 + f2) / 2 + Z * (v1 - v2) / 2
    yield value("resistance met from t = 1.5 ms on", 1153.8462e3, total, "N")
    toe = (f1 + Z * v1 - total) / Z
    yield value("less the toe's dashpot: static", 600e3, total - 0.3 * Z * toe, "N")
    energy = np.concatenate(([0.0], np.cumsum((force * velocity)[1:] * np.diff(t))))
    yield value("largest energy passed", 8424.62, float(energy.max()), "J")
    yield value("at the time, ms", 2.936, float(t[np.argmax(energy)] * 1e3), "ms")
    yield value("energy after 7 ms", 8066.45, float(np.interp(0.0069, t, energy)), "J")
