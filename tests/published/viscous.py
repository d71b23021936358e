"""Kelvin-Voigt rods: how a harmonic wave is damped and how fast it runs; the step that the law allows."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

import numpy as np

from solver import SolveError
from solver.model.material import Material
from solver.numerics.chain import build_chain
from solver.numerics.mesh import SegmentSteps
from solver.run import solve_chain
from tests.published.registry import Compared, Picture, check, history, picture, value
from tests.published.rods import DENSITY, C, E, case_of, material, part, pulse, solved

KOLSKY = "Kolsky 1963, Stress Waves in Solids, ch. V (from memory); recomputed"


def _wave_number(omega: float, eta: float) -> complex:
    """k of exp(i(omega t - k x)): rho omega^2 = (E + i omega eta) k^2."""
    return omega * np.sqrt(DENSITY / (E + 1j * omega * eta))


def _sine(omega: float, end: float) -> dict:
    times = np.linspace(0.0, end, 8001)
    # a slow rise, so that the transient has left the gauges before they are read
    values = np.sin(omega * times) * np.clip(times / (8 * 2 * np.pi / omega), 0, 1)
    return {"kind": "history", "quantity": "velocity", "times": times.tolist(), "values": values.tolist()}


@check(
    model="Kelvin-Voigt rod, sinusoidal velocity at its end",
    title="Attenuation and phase speed of a harmonic wave",
    source=KOLSKY,
    formula="k = w sqrt(rho/(E + i w eta)); amplitude falls as exp(Im k x), phase runs at w/Re k",
    tolerance=5e-3,
    why=(
        "The viscous part acts with the strain rate of the last half step, so that errors are of first "
        "order in dt: up to 0.3 % of the attenuation and 0.15 % of the speed with elements of 10 mm."
    ),
    over={"w eta/E = 0.02": 0.02, "w eta/E = 0.1": 0.1, "w eta/E = 0.3": 0.3},
)
def attenuation(loss: float) -> Iterator[Compared]:
    omega = 2 * np.pi * 2000.0
    eta = loss * E / omega
    end = 0.0095
    law = {"kind": "viscoelastic", "viscosity": eta}
    near, far = 2.0, 4.5
    run = solved(
        _sine(omega, end),
        part(30.0, of="kelvin"),
        materials=[material("kelvin", law=law)],
        gauges={"near": near, "far": far},
        duration=end,
        dx=0.01,
    )
    t = run.gauges["near"].time
    window = t > end - 4 * 2 * np.pi / omega
    basis = np.column_stack([np.cos(omega * t[window]), np.sin(omega * t[window])])
    tone = {}
    for name in ("near", "far"):
        a, b = np.linalg.lstsq(basis, run.gauges[name].velocity[window], rcond=None)[0]
        tone[name] = a - 1j * b
    ratio = tone["far"] / tone["near"]
    k = _wave_number(omega, eta)
    span = far - near
    yield value("attenuation, 1/m", -k.imag, -np.log(abs(ratio)) / span, "1/m")
    turns = k.real * span
    found = -np.angle(ratio) + 2 * np.pi * np.round((turns + np.angle(ratio)) / (2 * np.pi))
    yield value("phase speed", omega / k.real, omega * span / found, "m/s", tolerance=2e-3)


@check(
    model="the bound of the step for a Kelvin-Voigt element",
    title="Stable step against damping ratio",
    source="Belytschko, Liu & Moran 2000, Nonlinear Finite Elements for Continua and Structures, ch. 6 (from memory)",
    formula="dt <= (2/w)(sqrt(1 + xi^2) - xi), w = 2c/dx, xi = eta c/(E dx)",
    tolerance=5e-6,
    why="printed with six to eight digits",
)
def step_bound() -> Iterator[Compared]:
    table = {
        0.0: 1.0,
        0.01: 0.99005,
        0.05: 0.95124922,
        0.1: 0.90498756,
        0.2: 0.8198039,
        0.5: 0.61803399,
        1.0: 0.41421356,
    }
    for xi, wanted in (table | {2.0: 0.23606798}).items():
        # one element of 1 m: dx/c = 0.2 ms, eta/E = xi dx/c
        law = {"kind": "viscoelastic", "viscosity": max(xi, 1e-12) * E / C}
        eta = Material.model_validate(material("it", law=law)).law.viscosity
        steps = SegmentSteps(travel_time=1.0 / C, viscous_time=eta / E)
        yield value(f"xi = {xi}", wanted, float(steps.longest_step(np.array(1.0))) * C, "dx/c")


@check(
    model="free Kelvin-Voigt rod, run at and above its bound",
    title="The bound is sharp",
    source="the same bound; a step 2 % longer makes the highest mode grow",
    formula=(
        "xi = eta c/(E dx); at dt = (dx/c)(sqrt(1 + xi^2) - xi) the run stays bounded, at 1.02 of it it "
        "is refused"
    ),
    tolerance=1e-9,
    share_of="1",
    why="a closed form of the mesh, and two runs that either are accepted or refused",
)
def bound_is_sharp() -> Iterator[Compared]:
    law = {"kind": "viscoelastic", "viscosity": 0.2 * E * 0.1 / C}
    case = case_of(
        pulse("half_sine", 0.001),
        part(10.0, of="kelvin"),
        materials=[material("kelvin", law=law)],
        gauges={"middle": 5.0},
        duration=0.02,
        dx=0.1,
    )
    chain = build_chain(case)
    transit = chain.length[0] / C
    xi = 0.2 * 0.1 / chain.length[0]
    yield value("step chosen by the program", np.sqrt(1 + xi**2) - xi, chain.dt / transit, "dx/c")
    for factor, wanted in ((1.0, 0.0), (1.02, 1.0)):
        try:
            solve_chain(replace(chain, dt=factor * chain.dt))
            refused = 0.0
        except SolveError:
            refused = 1.0
        yield value(f"refused (1) at {factor:g} of the bound", wanted, refused, "", 1.0)


@check(
    model="Kelvin-Voigt rod, haversine pulse: Fourier sum of damped harmonic waves",
    title="A pulse after 5 m of a viscous rod",
    source=KOLSKY + ", by Fourier's sum",
    formula="v(x, t) = sum of V(w) exp(i(w t - k(w) x))",
    tolerance=5e-3,
    share_of="the peak of the pulse",
    why="first order in dt from the lagged strain rate",
)
def pulse_form() -> Iterator[Compared | Picture]:
    eta, span = 2e6, 0.0004
    law = {"kind": "viscoelastic", "viscosity": eta}
    run = solved(
        pulse("haversine", span, 1.0, "velocity"),
        part(15.0, of="kelvin"),
        materials=[material("kelvin", law=law)],
        gauges={"5 m": 5.0},
        duration=0.0028,
        dx=0.02,
    )
    # period 40.96 ms: what wraps around has long been damped away
    count, step = 1 << 14, 2.5e-6
    times = np.arange(count) * step
    entering = np.where(times < span, (1 - np.cos(2 * np.pi * times / span)) / 2, 0.0)
    omega = 2 * np.pi * np.fft.rfftfreq(count, step)
    k = np.array([_wave_number(w, eta) for w in omega])
    there = np.fft.irfft(np.fft.rfft(entering) * np.exp(-1j * k * 5.0), count)
    gauge = run.gauges["5 m"]
    exact = np.interp(gauge.time, times, there)
    yield history("velocity at 5 m", exact, gauge.velocity, "m/s", 1.0)
    yield picture(
        "Haversine of 0.4 ms after 5 m of a Kelvin-Voigt rod, eta = 2 MPa s",
        "time, ms",
        "velocity, m/s",
        gauge.time * 1e3,
        exact,
        gauge.velocity,
    )
