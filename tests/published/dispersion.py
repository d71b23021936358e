"""How fast waves of a length run: the mesh's own dispersion, Love's rod, and both against the exact round bar."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from scipy.optimize import brentq
from scipy.special import jv

from solver.numerics.chain import build_chain
from tests.published.modes import angular_frequency, started
from tests.published.registry import Compared, Picture, check, picture, value
from tests.published.rods import DENSITY, C, E, case_of, material, part

LOVE = "Love 1927, Mathematical Theory of Elasticity, art. 278; Rayleigh 1894 (from memory); recomputed"
LENGTHS = (0.01, 0.02, 0.025, 0.05, 0.075, 0.1, 0.15, 0.2, 0.25, 0.3)
"""Radius over wavelength."""


def _phase_speed(
    elements: int, halves: int, share: float, ratio: float = 0.0, poisson: float = 0.29
) -> float:
    """c_p/c0 of a standing wave with `halves` half waves in a free rod of `elements` elements, Courant number `share`.

    cos(k x) is a mode of the mesh as well. `ratio` > 0 switches Love's rod on, with the radius ratio x wavelength.
    """
    wavelength = 2 / halves
    section = {"shape": "solid_round", "diameter": float(2 * max(ratio, 1e-3) * wavelength)}
    expected = np.pi * halves * C
    # on top of a steady motion, which no wave feels
    steady = 5.0
    case = case_of(
        {"kind": "none"},
        part(1.0, section=section, of="bar"),
        materials=[material("bar", E, DENSITY, poisson_ratio=poisson)],
        gauges={"end": 0.0},
        duration=8 * 2 * np.pi / expected,
        dx=1 / elements,
        lateral_inertia=bool(ratio > 0),
        initial_velocity=steady,
    )
    chain = build_chain(case)
    assert len(chain.length) == elements
    shape = steady + np.cos(np.pi * halves * chain.position)
    chain = started(chain, shape, share * chain.dt)
    return angular_frequency(chain, "end", expected, steady) / expected


@check(
    model="uniform elastic rod, standing waves of 6 to 40 elements, Courant numbers 1 to 0.1",
    title="Dispersion of the mesh",
    source="von Neumann's analysis of central differences (textbook); recomputed table",
    formula="c_p/c0 = asin(C sin(pi/n))/(C pi/n), n elements per wavelength, C Courant number: 1 at C = 1",
    tolerance=1e-6,
    why="required: 1e-6; a mode of the mesh swings at exactly one frequency, which is read to 1e-9",
)
def of_the_mesh() -> Iterator[Compared]:
    printed = {
        (6, 0.9): 0.9905068,
        (6, 0.1): 0.955328,
        (12, 0.7): 0.9941058,
        (40, 0.5): 0.9992286,
        (20, 0.1): 0.9959334,
    }
    for n in (6, 8, 10, 12, 20, 40):
        for share in (1.0, 0.9, 0.7, 0.5, 0.1):
            # half-waves so that the wavelength is n elements
            found = _phase_speed(3 * n, 6, share)
            exact = np.arcsin(share * np.sin(np.pi / n)) / (share * np.pi / n)
            yield value(f"n = {n}, C = {share}", exact, found, "c0")
            if (n, share) in printed:
                yield value(f"n = {n}, C = {share}, printed", printed[n, share], found, "c0")


@check(
    model="Love's rod, round, Poisson's ratio 0.29, 120 elements per wavelength",
    title="Love's rod: phase speed against radius over wavelength",
    source=LOVE,
    formula="c_p/c0 = (1 + 2 pi^2 nu^2 (a/wavelength)^2)^(-1/2)",
    tolerance=1e-4,
    why="required: 1e-4 for 40 elements a wavelength or more; the mesh's own error is of second order",
)
def love() -> Iterator[Compared]:
    printed = (0.99991701, 0.99966815, 0.99948163, 0.99793135, 0.99536351)
    printed += (0.9918016, 0.98183165, 0.96836566, 0.95183969, 0.9327457)
    for ratio, wanted in zip(LENGTHS, printed, strict=True):
        found = _phase_speed(240, 4, 1.0, ratio)
        exact = (1 + 2 * (np.pi * 0.29 * ratio) ** 2) ** -0.5
        yield value(f"a/wavelength = {ratio}", exact, found, "c0")
        yield value(f"a/wavelength = {ratio}, printed", wanted, found, "c0")


@check(
    model="Love's rod, long waves",
    title="Rayleigh's correction",
    source="Rayleigh 1894, Theory of Sound, art. 157 (from memory); recomputed table",
    formula="c_p/c0 = 1 - nu^2 pi^2 (a/wavelength)^2, which Love's rod meets to the next order",
    tolerance=0.01,
    share_of="the correction",
    why="the next term is 1.5 (pi nu a/wavelength)^2 of it, 0.3 % at 0.05; the mesh adds as much",
)
def rayleigh() -> Iterator[Compared]:
    for ratio in (0.02, 0.025, 0.05):
        correction = (np.pi * 0.29 * ratio) ** 2
        yield value(f"a/wavelength = {ratio}", correction, 1 - _phase_speed(480, 4, 1.0, ratio), "c0")


def pochhammer(ratio: float, poisson: float) -> float:
    """c_p/c0 of the first mode of a round bar, exact theory; `ratio` = radius over wavelength.

    (2p/a)(q^2 + k^2) J1(pa) J1(qa) - (q^2 - k^2)^2 J0(pa) J1(qa) - 4 k^2 p q J1(pa) J0(qa) = 0, in units of a and c0.
    """
    k = 2 * np.pi * ratio
    shear = 1 / np.sqrt(2 * (1 + poisson))
    pressure = np.sqrt((1 - poisson) / ((1 + poisson) * (1 - 2 * poisson)))

    def equation(speed: float) -> float:
        w = k * speed
        p, q = (np.sqrt(complex((w / c) ** 2 - k**2)) for c in (pressure, shear))
        terms = 2 * p * (q**2 + k**2) * jv(1, p) * jv(1, q)
        terms -= (q**2 - k**2) ** 2 * jv(0, p) * jv(1, q)
        terms -= 4 * k**2 * p * q * jv(1, p) * jv(0, q)
        # p is imaginary between the two speeds, and so is J1(p): their products are real
        return float(terms.real)

    line = np.linspace(0.9, 1.0 - 1e-9, 2000)
    values = [equation(x) for x in line]
    i = next(j for j in range(len(line) - 1, 0, -1) if values[j - 1] * values[j] < 0)
    return float(brentq(equation, line[i - 1], line[i], xtol=1e-13))


@check(
    model="Love's rod against the exact theory of a round bar, Poisson's ratio 0.20, 0.29 and 0.30",
    title="Love's rod is near the exact bar where 2 pi a/wavelength < 0.6",
    source=(
        "Pochhammer-Chree equation (Kolsky 1963; Graff 1975; Bancroft 1941, Phys. Rev. 59, from memory), "
        "solved here"
    ),
    formula="first root of the frequency equation",
    tolerance=5e-3,
    why="required: 0.5 % of the phase speed where 2 pi a/wavelength is under 0.6; longer bars differ: see the figure",
)
def against_exact() -> Iterator[Compared | Picture]:
    printed = {(0.05, 0.29): 0.99789051, (0.075, 0.2): 0.99766486, (0.05, 0.3): 0.99774414}
    for poisson in (0.2, 0.29, 0.3):
        for ratio in (0.025, 0.05, 0.075, 0.095):
            exact = pochhammer(ratio, poisson)
            yield value(
                f"nu = {poisson}, a/wavelength = {ratio}",
                exact,
                _phase_speed(240, 4, 1.0, ratio, poisson),
                "c0",
            )
            if (ratio, poisson) in printed:
                name = f"nu = {poisson}, a/wavelength = {ratio}: root as printed"
                yield value(name, printed[ratio, poisson], exact, "c0", tolerance=1e-8)
    line = np.linspace(0.02, 0.2, 10)
    yield picture(
        "Phase speed of a round bar, nu = 0.29: exact bar, and Love's rod as solved",
        "radius / wavelength",
        "phase speed / c0",
        line,
        np.array([pochhammer(x, 0.29) for x in line]),
        np.array([_phase_speed(240, 4, 1.0, x) for x in line]),
    )


@check(
    model="round bar with lateral inertia switched off",
    title="Without lateral inertia nothing disperses",
    source="elementary rod theory",
    formula="c_p = c0 whatever the radius",
    tolerance=1e-9,
    why="at Courant number 1 the mesh has no dispersion either",
)
def switched_off() -> Iterator[Compared]:
    for halves in (4, 8, 20):
        yield value(f"{halves} half waves in 120 elements", 1.0, _phase_speed(120, halves, 1.0), "c0")
