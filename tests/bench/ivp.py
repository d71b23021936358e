"""The layered rod as a system of ordinary differential equations, for scipy's general solvers."""

from __future__ import annotations

import time
from dataclasses import dataclass

import numpy as np
from scipy import sparse
from scipy.integrate import solve_ivp

from solver import Case, solve
from solver.numerics.chain import Chain, build_chain

#: Moments at which velocities of the far end are compared.
MOMENTS = 400


@dataclass(frozen=True)
class Attempt:
    """A solver of scipy with the tolerance that just meets the error asked for."""

    method: str
    tolerance: float


@dataclass
class Answer:
    seconds: float
    velocity: np.ndarray


def moments(case: Case) -> np.ndarray:
    assert case.run.duration is not None
    return np.linspace(0.0, case.run.duration, MOMENTS)


def program(case: Case) -> Answer:
    """The program's whole solve, from the case to its result."""
    began = time.perf_counter()
    result = solve(case)
    seconds = time.perf_counter() - began
    gauge = result.gauges["far end"]
    return Answer(seconds, np.interp(moments(case), gauge.time, gauge.velocity))


def scipys(case: Case, attempt: Attempt) -> Answer:
    """M u'' = f - K u as a first-order system in u and v, from the same masses and stiffnesses."""
    chain = build_chain(case)
    stiff, inverse = chain.axial / chain.length, 1.0 / chain.mass
    n, force = chain.nodes, np.zeros(chain.nodes - 1)
    rate = np.zeros(2 * n)
    peak, duration = case.load.peak, case.load.duration

    def slope(t: float, y: np.ndarray) -> np.ndarray:
        u = y[:n]
        np.multiply(stiff, u[1:] - u[:-1], out=force)
        rate[:n] = y[n:]
        pull = rate[n:]
        pull[:-1] = force
        pull[-1] = 0.0
        pull[1:] -= force
        if t < duration:
            pull[0] += peak * np.sin(np.pi * t / duration) ** 2
        pull *= inverse
        return rate.copy()

    more = {"jac": _jacobian(chain)} if attempt.method in ("Radau", "BDF") else {}
    speed = chain.case.load.peak * inverse[0] * chain.dt
    began = time.perf_counter()
    found = solve_ivp(
        slope,
        (0.0, case.run.duration),
        np.zeros(2 * n),
        method=attempt.method,
        t_eval=moments(case),
        rtol=attempt.tolerance,
        atol=attempt.tolerance * np.concatenate((np.full(n, speed * 1e-3), np.full(n, speed))),
        **more,
    )
    return Answer(time.perf_counter() - began, found.y[-1])


def _jacobian(chain: Chain) -> sparse.csc_matrix:
    stiff, n = chain.axial / chain.length, chain.nodes
    main = np.zeros(n)
    main[:-1] -= stiff
    main[1:] -= stiff
    matrix = sparse.diags([stiff, main, stiff], [-1, 0, 1])
    return sparse.csc_matrix(
        sparse.bmat([[None, sparse.identity(n)], [sparse.diags([1.0 / chain.mass], [0]) @ matrix, None]])
    )


def error(answer: Answer, reference: Answer) -> float:
    """Largest difference over the largest value."""
    return float(np.max(np.abs(answer.velocity - reference.velocity)) / np.max(np.abs(reference.velocity)))
