"""Natural frequencies: one mode of a rod is set going and its frequency read."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from scipy.optimize import brentq

from solver.numerics.chain import Chain, build_chain
from tests.published.modes import Array, angular_frequency, started
from tests.published.registry import Compared, check, value
from tests.published.rods import AREA, LENGTH, C, case_of, part

TEXTBOOK = "Graff 1975, Wave Motion in Elastic Solids, ch. 2 (from memory); recomputed"


def _chain(*segments: dict, elements: int = 400, seconds: float = 0.03, **more) -> Chain:
    return build_chain(
        case_of(
            {"kind": "none"},
            *(segments or (part(),)),
            gauges={"head": 0.0, "middle": LENGTH / 2},
            duration=seconds,
            dx=LENGTH / elements,
            initial_velocity=1.0,
            **more,
        )
    )


def _hertz(
    chain: Chain, shape: Array, expected: float, gauge: str = "head", dt: float | None = None
) -> float:
    omega = 2 * np.pi * expected
    return angular_frequency(started(chain, shape, dt), gauge, omega) / (2 * np.pi)


@check(
    model="uniform rod, free-free and fixed-free",
    title="Uniform rod: five frequencies each",
    source=TEXTBOOK,
    formula="f_n = n c/(2L) free-free, (2n - 1) c/(4L) fixed-free: 250, 500, ... and 125, 375, ... Hz",
    tolerance=1e-9,
    why="at Courant number 1 the mesh has the frequencies of the rod",
)
def uniform() -> Iterator[Compared]:
    chain, held = _chain(elements=100), _chain(elements=100, far_end="fixed")
    x = chain.position
    for n in range(1, 6):
        free = n * C / (2 * LENGTH)
        yield value(f"free-free, n = {n}", free, _hertz(chain, np.cos(n * np.pi * x / LENGTH), free), "Hz")
        fixed = (2 * n - 1) * C / (4 * LENGTH)
        shape = np.cos((2 * n - 1) * np.pi * x / (2 * LENGTH))
        yield value(f"fixed-free, n = {n}", fixed, _hertz(held, shape, fixed), "Hz")


@check(
    model="uniform rod of 10 and 100 lumped elements, a hundredth of the critical step",
    title="Lumped elements swing too slowly where the step is short",
    source="eigenvalues of lumped springs and masses (textbook); recomputed table",
    formula="f_n = (c/(pi dx)) sin(n pi/(2N)); the step adds (w dt)^2/24",
    tolerance=1e-5,
    why="printed with eight digits; a step of a hundredth of dx/c adds at most 4e-6",
)
def lumped() -> Iterator[Compared]:
    printed = {
        10: (248.97318, 491.81582, 722.54832, 935.48928, 1125.3954),
        100: (249.98972, 499.91776, 749.72245),
    }
    for elements, table in printed.items():
        chain = _chain(elements=elements, seconds=0.02)
        for n, wanted in enumerate(table, 1):
            # on top of a steady motion, which no mode feels
            shape = np.cos(n * np.pi * chain.position / LENGTH)
            yield value(
                f"{elements} elements, n = {n}", wanted, _hertz(chain, shape, wanted, dt=chain.dt / 100), "Hz"
            )


@check(
    model="rod fixed at its far end, a mass on its head, eight ratios",
    title="Rod with a tip mass",
    source=TEXTBOOK,
    formula="lambda tan lambda = rod mass / tip mass, f = lambda c/(2 pi L)",
    tolerance=1e-5,
    why="printed with eight digits; the mesh errs by (dx/L)^2 = 6e-6 of the tip mass's share",
)
def tip_mass() -> Iterator[Compared]:
    table = {0.01: 0.099833639, 0.1: 0.31105285, 0.5: 0.65327119, 1: 0.86033359, 2: 1.076874}
    for ratio, wanted in (table | {5: 1.3138377, 10: 1.42887, 100: 1.5552451}).items():
        mass = 800.0 / ratio
        chain = _chain(
            attachments=[{"position": 0.0, "kind": "mass", "value": mass}],
            far_end="fixed",
            seconds=0.6 / wanted * 0.03,
        )
        root = brentq(lambda y, r=ratio: y * np.tan(y) - r, 1e-9, np.pi / 2 - 1e-9)
        shape = np.sin(root * (1 - chain.position / LENGTH))
        expected = wanted * C / (2 * np.pi * LENGTH)
        yield value(f"rod mass/tip mass = {ratio:g}", expected, _hertz(chain, shape, expected), "Hz")
        yield value(f"root, {ratio:g}", wanted, root, "", 1.0)


@check(
    model="rod fixed at its far end, equal tip mass: second and third mode",
    title="Rod with a tip mass, higher modes",
    source=TEXTBOOK,
    formula="lambda tan lambda = 1: 3.4256185, 6.4372982",
    tolerance=5e-5,
    why="the mesh errs by (lambda dx/L)^2/6 of the tip mass's share",
)
def tip_mass_higher() -> Iterator[Compared]:
    chain = _chain(
        attachments=[{"position": 0.0, "kind": "mass", "value": 800.0}], far_end="fixed", seconds=0.02
    )
    for n, wanted in ((2, 3.4256185), (3, 6.4372982)):
        shape = np.sin(wanted * (1 - chain.position / LENGTH))
        expected = wanted * C / (2 * np.pi * LENGTH)
        yield value(f"mode {n}", expected, _hertz(chain, shape, expected), "Hz")


@check(
    model="solid cone frustum, diameter doubling over 10 m, one tapered segment",
    title="Conical rod",
    source=TEXTBOOK,
    formula="tan(kL) = kL/(1 + k^2 x0 x1), x0 = L, x1 = 2L",
    tolerance=1e-5,
    why="printed with seven digits; a taper is laid in steps of one element, an error of second order",
)
def cone() -> Iterator[Compared]:
    first = {"shape": "solid_round", "diameter": 0.1}
    last = {"shape": "solid_round", "diameter": 0.2}
    chain = _chain(part(section=first, end_section=last))
    s = chain.position
    for n, (wave_number, hertz) in enumerate(
        ((3.2860066, 261.4921), (6.3606782, 506.16669), (9.477196, 754.1713), (12.60589, 1003.1448)), 1
    ):
        k = wave_number / LENGTH
        shape = (np.cos(k * s) + np.sin(k * s) / (k * LENGTH)) / (LENGTH + s)
        found = _hertz(chain, shape / shape[0], hertz)
        yield value(f"n = {n}", hertz, found, "Hz", tolerance=1e-5 * n)
        root = np.tan(wave_number) - wave_number / (1 + 2 * wave_number**2)
        yield value(f"printed root {n} solves the equation", 0.0, root, "", 1.0)


@check(
    model="exponential rod, end areas 1 : 4, laid as 100 bonded segments",
    title="Exponential rod by stepped segments",
    source=TEXTBOOK,
    formula="A = A0 exp(2 b x): w^2 = c^2 ((n pi/L)^2 + b^2)",
    tolerance=5e-5,
    why="steps of 0.1 m are an error of second order, (b step)^2/12 and (k step)^2/12 of the shift",
)
def exponential() -> Iterator[Compared]:
    count, b = 100, np.log(4) / (2 * LENGTH)
    middles = (np.arange(count) + 0.5) * LENGTH / count
    chain = _chain(*(part(LENGTH / count, AREA * np.exp(2 * b * x)) for x in middles))
    s = chain.position
    for n, hertz in enumerate((256.0127, 503.0333, 752.0256, 1001.5201), 1):
        k = n * np.pi / LENGTH
        shape = np.exp(-b * s) * (np.cos(k * s) + b / k * np.sin(k * s))
        yield value(f"n = {n}", hertz, _hertz(chain, shape, hertz), "Hz")
        exact = C / (2 * np.pi) * np.hypot(k, b)
        yield value(f"n = {n}, formula", exact, hertz, "Hz", tolerance=1e-7)
