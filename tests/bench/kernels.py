"""The kernel alone: against C, against numpy, law by law, and as the work grows."""

from __future__ import annotations

import time
from collections.abc import Iterator
from typing import Any

import numpy as np

from solver import Case
from tests.bench import cases
from tests.bench.measure import Row, calibration, paired, spread_of
from tests.bench.rig import Rig
from tests.bench.twin import NO_COMPILER, Twin, library

#: Largest relative difference of the twin's answer from the kernel's at which both did the same work.
SAME = 1e-5


def linear_vs_c(short: bool) -> Iterator[Row]:
    for elements, steps in ((200, 40_000), (2_000, 4_000), (50_000, 240)):
        case = cases.rod(elements=elements)
        yield _against_c(f"linear_vs_c {elements}", case, steps, "linear", 0.95, 7 if short else 15)


def full_vs_c(short: bool) -> Iterator[Row]:
    yield _against_c("full_vs_c", cases.pile(), 16_000, "pile", 0.80, 9 if short else 15)


def _against_c(name: str, case: Case, steps: int, kind: str, reach: float, repetitions: int) -> Row:
    compared = "C time / ours, same march with envelopes, frames and ledger; CPU time of the thread"
    row = Row(name, compared, reach=reach)
    if library() is None:
        row.skipped = NO_COMPILER
        return row
    rig = Rig(case, steps)
    twin = Twin(rig, kind)
    if (off := twin.differs()) > SAME:
        row.skipped = f"the twin in C does other work than the kernel (answers differ by {off:.2g})"
        return row
    pairs = paired({"ours": rig.run, "c": twin.run}, repetitions, time.thread_time)
    row.ratio, row.spread, row.noise = pairs.ratio("c", "ours"), pairs.spread("c", "ours"), pairs.noise
    row.repetitions = repetitions
    row.more = {
        "elements": rig.elements,
        "ours_ns_per_element_step": pairs.median("ours") / rig.work * 1e9,
        "c_ns_per_element_step": pairs.median("c") / rig.work * 1e9,
    }
    return row


def vs_numpy(short: bool) -> Iterator[Row]:
    """The same scheme as whole-array expressions; both keep envelopes, numpy writes no frames."""
    rig = Rig(cases.rod(elements=200), 4_000)
    repetitions = 5 if short else 9
    pairs = paired({"ours": rig.run, "numpy": lambda: _numpy(rig)}, repetitions, time.thread_time)
    yield Row(
        "vs_numpy",
        "numpy time / ours, 200 elements, both with envelopes; CPU time of the thread",
        pairs.ratio("numpy", "ours"),
        20.0,
        spread=pairs.spread("numpy", "ours"),
        repetitions=repetitions,
        noise=pairs.noise,
    )


def _numpy(rig: Rig) -> float:
    rig.reset()
    rod, motion, ext, dt = rig.state.rod, rig.state.motion, rig.extremes, rig.chain.dt
    u, v, stiff, push, weight = motion.u, motion.v, rod.stiff, rod.push, rod.weight
    total = np.zeros(len(u))
    began = time.thread_time()
    for step in range(rig.steps):
        force = stiff * (u[1:] - u[:-1])
        total[:] = weight
        total[:-1] += force
        total[1:] -= force
        total[0] += rig.load[step]
        w = v + push * total
        lower, higher = force < ext.low, force > ext.high
        ext.low_step[lower], ext.high_step[higher] = step, step
        np.minimum(ext.low, force, out=ext.low)
        np.maximum(ext.high, force, out=ext.high)
        np.maximum(ext.speed, 0.5 * (v + w), out=ext.speed)
        np.maximum(ext.travel, u, out=ext.travel)
        u += dt * w
        v = w
    return time.thread_time() - began


def _laws() -> dict[str, Case]:
    """Cases in which each law works and does not merely stand by."""
    hard = {"kind": "pulse", "quantity": "force", "shape": "half_sine", "peak": 4e6, "duration": 0.001}
    soft = {"quake": 0.0025, "damping": 0.3}
    half_space = {
        "model": {"kind": "radiation", "shear_modulus": 2e7, "soil_density": 1800.0, "poisson_ratio": 0.4}
    }

    def shaft(**damping: Any) -> Case:
        total = {"resistance": 4e5, "distribution": "uniform", **damping}
        return cases.rod(elements=400, ground={"surface": 0.0, "shaft_total": total})

    def toe(**damping: Any) -> Case:
        ground = {"surface": 0.0, "toe": {"resistance": 2e5, **damping}}
        return cases.rod(elements=400, far_end={"kind": "ground"}, ground=ground)

    def joint(**kind: Any) -> Case:
        return cases.rod(elements=400, parts=2, joint=kind)

    yielding = {"kind": "elastic_plastic", "yield_stress": 2e8, "hardening_modulus": 2e9}
    return {
        "linear": cases.rod(elements=400),
        "viscoelastic": cases.rod({"kind": "viscoelastic", "viscosity": 1e5}, elements=400),
        "elastic_plastic": cases.rod(yielding, hard, elements=400),
        "brittle_tension": cases.rod({"kind": "brittle_tension", "tensile_strength": 5e6}, elements=400),
        "large_strain": cases.rod({"kind": "large_strain"}, elements=400),
        "lateral_inertia": cases.rod(elements=400, lateral=True),
        "joint_contact": joint(kind="contact", gap=0.0),
        "joint_slack_splice": joint(kind="slack_splice", slack=1e-4),
        "wall": cases.rod(elements=400, far_end={"kind": "wall", "gap": 0.0}),
        "shaft_smith": shaft(damping_law="smith", **soft),
        "shaft_viscous": shaft(damping_law="viscous", **soft),
        "shaft_power": shaft(damping_law="power", exponent=0.2, **soft),
        "shaft_radiation": shaft(**half_space),
        "toe_smith": toe(damping_law="smith", **soft),
        "toe_viscous": toe(damping_law="viscous", **soft),
        "toe_power": toe(damping_law="power", exponent=0.2, **soft),
        "toe_radiation": toe(**half_space),
    }


def laws(short: bool) -> Iterator[Row]:
    steps, repetitions = 3_000, 5 if short else 9
    rigs = {name: Rig(case, steps) for name, case in _laws().items()}
    pairs = paired({name: rig.run for name, rig in rigs.items()}, repetitions, time.thread_time)
    size = {name: rig.work for name, rig in rigs.items()}
    for name in rigs:
        if name != "linear":
            per = size["linear"] / size[name]
            yield Row(
                f"laws {name}",
                "cost per element and step / that of the linear rod of 400 elements; CPU time of the thread",
                pairs.ratio(name, "linear") * per,
                8.0,
                at_most=True,
                spread=pairs.spread(name, "linear"),
                repetitions=repetitions,
                noise=pairs.noise,
            )


def growth(short: bool) -> Iterator[Row]:
    """From 10^5 to 10^10 elements x steps; long marches are cut into pieces, as the program does."""
    sizes = 10.0 ** np.arange(5, 11)
    pieces = [Rig(cases.rod(elements=400), int(min(size, 1e8) / 400)) for size in sizes]
    for rig in pieces[:4]:
        rig.run()
    beats, times = [], []
    for size, rig in zip(sizes, pieces, strict=True):
        beats.append(calibration(time.thread_time))
        once = [sum(rig.run() for _ in range(round(size / rig.work))) for _ in range(21 if size < 1e8 else 1)]
        times.append(float(np.median(once)))
        beats.append(calibration(time.thread_time))
    exponent = float(np.polyfit(np.log(sizes), np.log(times), 1)[0])
    seconds = {f"seconds_of_1e{5 + i}": t for i, t in enumerate(times)}
    compared = "exponent of time against elements x steps (400 elements), 10^5 to 10^10, reach 0.95 to 1.05"
    row = Row("growth", compared, exponent, 1.05, at_most=True, repetitions=21, noise=spread_of(beats))
    row.at_least = 0.95
    row.more = seconds
    yield row
