"""What bounds the time step, and what does not: local springs, cushions and dashpots leave Courant number 1 stable."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

import numpy as np
from scipy.linalg import eigvalsh

from solver import SolveError
from solver.numerics.chain import Chain, build_chain
from solver.run import solve_chain
from tests.published.registry import Compared, check, value
from tests.published.rods import AREA, C, E, case_of, part, pulse

EIGEN = "element eigenvalue theorem (Belytschko, Liu & Moran 2000, ch. 6, from memory); recomputed table"
TEN = 10


def _chain(*segments: dict, **more) -> Chain:
    load = more.pop("load", pulse("half_sine", 0.006))
    return build_chain(case_of(load, *(segments or (part(),)), dx=1.0, duration=0.2, **more))


def _critical(chain: Chain) -> float:
    """2/w_max of the assembled springs and masses, over dx/c of the rod."""
    k = chain.axial / chain.length
    size = chain.nodes
    matrix = np.zeros((size, size))
    for i, stiffness in enumerate(k):
        matrix[i : i + 2, i : i + 2] += stiffness * np.array([[1, -1], [-1, 1]])
    keep = slice(0, size - 1) if chain.fixed_end else slice(0, size)
    root = 1 / np.sqrt(chain.mass)
    scaled = matrix * np.outer(root, root)
    return 2 / np.sqrt(eigvalsh(scaled[keep, keep])[-1]) * C / 1.0


def _refused(chain: Chain, factor: float) -> float:
    """1 where a run at `factor` of the chain's own step is refused."""
    try:
        solve_chain(replace(chain, dt=factor * chain.dt))
    except SolveError:
        return 1.0
    return 0.0


CASES = {
    "free-free": ({}, (), 1.0),
    "one end fixed": ({"far_end": "fixed"}, (), 1.0030922),
    "mass of 10 rho A dx on the head": (
        {"attachments": [{"position": 0.0, "kind": "mass", "value": 800.0}]},
        (),
        1.0030767,
    ),
    "one element at 20 % of the area": ({}, (part(4.0), part(1.0, AREA / 5), part(5.0)), 1.0),
}


@check(
    model="rod of ten elements: the longest stable step",
    title="Critical step of a rod",
    source=EIGEN,
    formula="dt = 2/w_max; dx/c for a free rod, a little more where an end is held or loaded by a mass",
    tolerance=1e-7,
    why=(
        "eigenvalues of the program's own masses and stiffnesses; printed with eight digits. Runs are "
        "refused or not: 1 or 0"
    ),
)
def critical_step() -> Iterator[Compared]:
    for name, (more, segments, printed) in CASES.items():
        chain = _chain(*segments, **more)
        assert chain.nodes == TEN + 1
        limit = _critical(chain)
        yield value(f"{name}: 2/w_max", printed, limit, "dx/c")
        share = limit / (chain.dt * C)
        yield value(f"{name}: refused above it, at 1.005", 1.0, _refused(chain, 1.005 * share), "", 1.0)
        yield value(f"{name}: refused below it, at 0.995", 0.0, _refused(chain, 0.995 * share), "", 1.0)


@check(
    model="springs at the toe and cushions at the head, 0.1 to 100 EA/dx, run at Courant number 1",
    title="Local springs do not shorten the step",
    source=(
        "mean of the law at two half steps: (m + k dt^2/4)(v+ - v-)/dt = f - k u (derived); the explicit "
        "bounds are printed"
    ),
    formula="an explicit spring K on a half-mass node would allow 0.9982 dx/c (K = 0.1 EA/dx) to 0.4254 (10 EA/dx)",
    tolerance=1e-10,
    share_of="the largest energy",
    why=(
        "springs keep their energy to round-off; for cushions 0.1 % is required, as they begin with half "
        "a step of force"
    ),
)
def local_springs() -> Iterator[Compared]:
    for factor in (0.1, 1.0, 10.0, 100.0):
        k = factor * E * AREA / 1.0
        run = solve_chain(_chain(far_end={"kind": "spring", "stiffness": k}))
        yield value(f"spring of {factor:g} EA/dx at the toe", 0.0, run.ledger.residual, "share", 1.0)
    for factor in (0.1, 1.0, 5.0, 100.0):
        load = {
            "kind": "drop",
            "ram_mass": 4000.0,
            "impact_velocity": 1.0,
            "cushion": {"stiffness": factor * E * AREA / 0.025, "restitution": 1.0},
        }
        run = solve_chain(build_chain(case_of(load, part(), dx=0.025, duration=0.05)))
        yield value(f"cushion of {factor:g} EA/dx", 0.0, run.ledger.residual, "share", 1.0, tolerance=1e-3)


@check(
    model="cushions that give back little: 2e12 N/m, e = 0.3, which unloads along k/e^2",
    title="A hard cushion at Courant number 1",
    source=(
        "impulse of a collision: with e = 0.3 as the coefficient of the cushion (Smith 1960, from "
        "memory); recomputed"
    ),
    formula=(
        "the ram strikes a cushion far stiffer than an element: peak force on a long rod is that of a "
        "mass without cushion, Z V"
    ),
    tolerance=5e-3,
    why="required: 0.5 % of the peak; the explicit bound would be 0.06 of the step",
)
def hard_cushion() -> Iterator[Compared]:
    load = {
        "kind": "drop",
        "ram_mass": 4000.0,
        "impact_velocity": 1.0,
        "cushion": {"stiffness": 2e12, "restitution": 0.3},
    }
    chain = build_chain(case_of(load, part(12.0), far_end="matched", gauges={"head": 0.0}, duration=0.004))
    run = solve_chain(chain)
    gauge = run.gauges["head"]
    # k m/Z^2 is 50 000: F = Z V exp(-Z t/M) but for a rise of Z/k, which is shorter than a step
    late = gauge.time > 0.0005
    exact = 4e5 * np.exp(-4e5 * gauge.time[late] / 4000.0)
    worst = int(np.argmax(np.abs(-gauge.force[late] - exact)))
    yield value("force after the rise", exact[worst], -gauge.force[late][worst], "N", 4e5)
    yield value("peak of the force", 4e5, -gauge.force.min(), "N")


@check(
    model="free rod at Courant numbers 0.3 to 1; linear",
    title="Energy of a linear rod closes at any stable step",
    source="half-step energies (textbook of central differences)",
    formula="v+ M v+/2 + u_n K u_(n+1)/2 - work = 0",
    tolerance=1e-10,
    share_of="the largest energy",
    why="required: 1e-10",
)
def energy_at_any_step() -> Iterator[Compared]:
    chain = build_chain(case_of(pulse("half_sine", 0.001), part(), dx=0.1, duration=0.02))
    for share in (1.0, 0.9, 0.7, 0.3):
        run = solve_chain(replace(chain, dt=share * chain.dt))
        yield value(f"Courant number {share}", 0.0, run.ledger.residual, "share", 1.0)
