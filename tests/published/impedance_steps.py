"""Steps of impedance, layers, and rods of many layers: the lattice of a layered rod is met to round-off."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from tests.published.closed_forms import convolved, impulse, lattice
from tests.published.registry import Array, Compared, Picture, check, history, picture, value
from tests.published.rods import AREA, C, Z, material, part, pulse, solved

CONTINUITY = "continuity of force and velocity at the step (Kolsky 1963; Graff 1975, from memory)"
LATTICE = (
    "lattice of a layered rod (Goupillaud 1961, Geophysics 26, from memory), written anew for these checks"
)
EXACT = "travel times are whole numbers of steps, so that the mesh is the lattice itself; what is left is round-off"


@check(
    model="two rods of equal wave speed, bonded; rectangular force pulse",
    title="Reflected and transmitted waves at ten ratios Z2/Z1",
    source=CONTINUITY,
    formula="R = (b - 1)/(b + 1), T = 2 b/(1 + b) for force, b = Z2/Z1",
    tolerance=1e-10,
    share_of="the incident force",
    why=EXACT,
)
def one_step() -> Iterator[Compared]:
    for ratio in (0.1, 0.2, 0.25, 1 / 3, 0.5, 0.6, 0.8, 1.25, 2.0, 4.0):
        run = solved(
            pulse("rectangle", 0.0004),
            part(4.0),
            part(4.0, AREA * ratio),
            gauges={"before": 2.0, "behind": 6.0},
            far_end="matched",
            duration=0.0013,
            dx=0.1,
        )
        t = run.gauges["before"].time
        # the echo passes 2 m from 1.2 to 1.6 ms, the transmitted wave 6 m at the same time
        inside = t > 0.00125
        back, on = (ratio - 1) / (ratio + 1), 2 * ratio / (1 + ratio)
        echo = -run.gauges["before"].up_wave[inside]
        passed = -run.gauges["behind"].down_wave[inside]
        yield history(f"reflected, Z2/Z1 = {ratio:.4g}", np.full(echo.shape, back * 1e6), echo, "N", 1e6)
        yield history(f"transmitted, Z2/Z1 = {ratio:.4g}", np.full(passed.shape, on * 1e6), passed, "N", 1e6)


@check(
    model="a layer of another section in a long rod; rectangular force pulse of one step's spacing",
    title="All echoes of a layer at five ratios",
    source=CONTINUITY,
    formula=(
        "echoes r at the top face, then -(1 - r^2) r^(2j-1) every 2d/c; transmitted (1 - r^2) r^(2j); r "
        "= (b - 1)/(b + 1)"
    ),
    tolerance=1e-10,
    share_of="the incident force",
    why=EXACT,
)
def layer() -> Iterator[Compared]:
    for ratio in (0.25, 0.5, 0.6, 0.8, 2.0):
        run = solved(
            pulse("rectangle", 0.0002),
            part(4.0),
            part(1.0, AREA * ratio),
            part(7.0),
            gauges={"before": 3.5, "behind": 5.5},
            far_end="matched",
            duration=0.0029,
            dx=0.05,
        )
        r, dt = (ratio - 1) / (ratio + 1), run.time_step
        echoes = [r] + [-(1 - r**2) * r ** (2 * j - 1) for j in (1, 2, 3)]
        passed = [(1 - r**2) * r ** (2 * j) for j in range(4)]
        # middles of the pulses: the echo of the top face is at 3.5 m 0.9 + 0.1 ms after the start
        for name, first, wanted in (("before", 0.0010, echoes), ("behind", 0.0012, passed)):
            at = [round((first + 0.0004 * j) / dt) for j in range(4)]
            wave = run.gauges[name].up_wave if name == "before" else run.gauges[name].down_wave
            what = "echoes" if name == "before" else "transmitted"
            yield history(f"{what}, Z2/Z1 = {ratio}", np.array(wanted) * 1e6, -wave[at], "N", 1e6)


def _by_lattice(areas: list[float], cells: list[int], dt: float, steps: int) -> list[Array]:
    return lattice([Z * a / AREA for a in areas], cells, steps, held=False, far=1)


@check(
    model="free rod of 10 m, half of its area lost between 4 and 5 m; rectangular force pulse 1 MN x 0.2 ms",
    title="Finite member with a defect: every arrival at the struck end",
    source=LATTICE + "; entries 2/3, -16/27, -16/243 in closed form",
    formula="v(0, 1.6 ms) = (2/3) F0/Z, v(2.0) = -(16/27) F0/Z, v(2.4) = -(16/243) F0/Z, ...",
    tolerance=1e-10,
    share_of="F0/Z",
    why=EXACT + "; the entries printed with eight digits are met to those digits in the row above",
)
def defect() -> Iterator[Compared | Picture]:
    run = solved(
        pulse("rectangle", 0.0002),
        part(4.0),
        part(1.0, AREA / 2),
        part(5.0),
        gauges={"head": 0.0},
        duration=0.0100,
        dx=0.05,
    )
    gauge, dt = run.gauges["head"], run.time_step
    t, form = gauge.time, impulse("rectangle", 0.0002)
    weights = _by_lattice([AREA, AREA / 2, AREA], [80, 20, 100], dt, len(t) + 1)[0]
    both = [convolved(weights, form, t + k * dt, dt) for k in (-1, 1)]
    exact = 1e6 * (both[1] - both[0]) / (2 * dt)
    yield history("velocity of the struck end, 10 ms", exact, gauge.velocity, "m/s", 2.5)
    firsts = {0.0: 1.0, 0.0016: 2 / 3, 0.0020: -16 / 27, 0.0024: -16 / 243}
    for start, share in firsts.items():
        yield value(
            f"arrival at {start * 1e3:.1f} ms",
            share,
            gauge.velocity[round((start + 0.0001) / dt)] / 2.5,
            "F0/Z",
            1.0,
        )
    yield picture(
        "Velocity of the struck end: half of the area lost between 4 and 5 m",
        "time, ms",
        "velocity, m/s",
        t * 1e3,
        exact,
        gauge.velocity,
    )


@check(
    model="free rod of 10 m, half of its area lost between 4 and 5 m; the printed table",
    title="Finite member with a defect: entries printed with eight digits",
    source="recomputed table (2.8, 3.2 and 3.6 ms hold multiple echoes)",
    formula="exact lattice",
    tolerance=1e-8,
    share_of="F0/Z",
    why="the digits of the table",
)
def defect_table() -> Iterator[Compared]:
    run = solved(
        pulse("rectangle", 0.0002),
        part(4.0),
        part(1.0, AREA / 2),
        part(5.0),
        gauges={"h": 0.0},
        duration=0.004,
        dx=0.1,
    )
    table = {0.0: 1.0, 0.0016: 0.66666667, 0.002: -0.59259259, 0.0024: -0.065843621}
    table |= {0.0028: -0.0073159579, 0.0032: 0.22140934, 0.0036: -0.39515205}
    for start, share in table.items():
        found = run.gauges["h"].velocity[round((start + 0.0001) / run.time_step)] / 2.5
        yield value(f"arrival at {start * 1e3:.1f} ms", share, found, "F0/Z", 1.0)


@check(
    model="slender concrete member of 12 m read by its echo, impedance 0.7 between 5 and 6 m, free ends",
    title="A neck seen from the struck end",
    source=CONTINUITY,
    formula=(
        "echoes 2 r and -2 (1 - r^2) r of the first velocity, r = (1 - b)/(1 + b); far end 2 (1 - "
        "r^2)^2, and with it what the struck end and the neck have sent to and fro (lattice)"
    ),
    tolerance=1e-8,
    share_of="the first velocity",
    why="the printed echoes have eight digits",
)
def neck() -> Iterator[Compared]:
    run = solved(
        pulse("rectangle", 0.0003),
        part(5.0, 1.0, "concrete"),
        part(1.0, 0.7, "concrete"),
        part(6.0, 1.0, "concrete"),
        materials=[material("concrete", 4000.0**2 * 2400, 2400)],
        gauges={"head": 0.0},
        duration=0.0068,
        dx=0.1,
    )
    v, dt = run.gauges["head"].velocity, run.time_step
    first = v[round(0.00015 / dt)]
    for what, start, wanted in (("top", 0.0025, 0.35294118), ("bottom", 0.003, -0.34194993)):
        yield value(
            f"{what} of the neck", wanted, v[round((start + 0.00015) / dt)] / first, "of the first", 1.0
        )
    weights = lattice([1.0, 0.7, 1.0], [50, 10, 60], 241, held=False, far=1)[0]
    yield value("far end", weights[240], v[round(0.00615 / dt)] / first, "of the first", 1.0)


@check(
    model="four layers of three materials and five sections, commensurate travel times; half-sine",
    title="A layered rod against its lattice, force and velocity load, three far ends",
    source=LATTICE,
    formula="u(t) = sum of w_k P(t - k dt), w_k the lattice's answer to one impulse, P the integral of the pulse",
    tolerance=1e-10,
    share_of="the peak of the incident wave",
    why=EXACT,
    over={
        "force, free": ("force", 1, "free"),
        "force, fixed": ("force", -1, "fixed"),
        "velocity, free": ("velocity", 1, "free"),
        "velocity, matched": ("velocity", 0, "matched"),
    },
)
def layered(which: tuple[str, int, str]) -> Iterator[Compared]:
    quantity, far, end = which
    # wave speeds 5000, 4000 and 2500 m/s: 0.4, 0.75, 0.64 and 0.25 ms to cross
    layers = [(2.0, 0.010, "round"), (3.0, 0.030, "mid"), (1.6, 0.004, "soft"), (1.25, 0.012, "round")]
    density = {"round": 8000.0, "mid": 2500.0, "soft": 1200.0}
    speed = {"round": C, "mid": 4000.0, "soft": 2500.0}
    peak = 1e6 if quantity == "force" else 1.0
    lengths = [length for length, _, _ in layers]
    marks = np.cumsum([0.0, *lengths])
    run = solved(
        pulse("half_sine", 0.001, peak, quantity),
        *(part(*one) for one in layers),
        materials=[material(m, density[m] * speed[m] ** 2, density[m]) for m in ("mid", "soft")],
        gauges={f"{x:.2f} m": x for x in marks},
        far_end=end,
        duration=0.0082,
        dx=0.05,
    )
    dt = run.time_step
    impedances = [a * density[m] * speed[m] for _, a, m in layers]
    cells = [round(length / speed[m] / dt) for length, _, m in layers]
    t = run.gauges["0.00 m"].time
    found = lattice(impedances, cells, len(t) + 1, held=quantity == "velocity", far=far)
    form, scale = impulse("half_sine", 0.001), peak / (impedances[0] if quantity == "force" else 1.0)
    for x, weights in zip(marks, found, strict=True):
        u = [peak * convolved(weights, form, t + k * dt, dt) for k in (-1, 0, 1)]
        gauge = run.gauges[f"{x:.2f} m"]
        yield history(f"velocity at {x:.2f} m", (u[2] - u[0]) / (2 * dt), gauge.velocity, "m/s", scale)
        yield history(f"displacement at {x:.2f} m", u[1], gauge.displacement, "m", scale * 0.001)


@check(
    model="rod of 40 layers with areas that follow no rule, each five steps long; triangle, free ends",
    title="Forty layers against the lattice",
    source=LATTICE,
    formula="u(t) = sum of w_k P(t - k dt)",
    tolerance=1e-10,
    share_of="the peak of the incident wave",
    why=EXACT,
)
def forty_layers() -> Iterator[Compared]:
    areas = (AREA * np.exp(np.random.default_rng(7).normal(0.0, 0.6, 40))).tolist()
    run = solved(
        pulse("triangle", 0.0006),
        *(part(0.25, a) for a in areas),
        gauges={"struck end": 0.0, "middle": 5.0, "far end": 10.0},
        duration=0.0102,
        dx=0.05,
    )
    t, dt, form = run.gauges["middle"].time, run.time_step, impulse("triangle", 0.0006)
    found = _by_lattice(areas, [5] * 40, dt, len(t) + 1)
    for name, weights in (("struck end", found[0]), ("middle", found[20]), ("far end", found[-1])):
        both = [1e6 * convolved(weights, form, t + k * dt, dt) for k in (-1, 1)]
        exact = (both[1] - both[0]) / (2 * dt)
        yield history(
            f"velocity at the {name}", exact, run.gauges[name].velocity, "m/s", 1e6 / (Z * areas[0] / AREA)
        )
