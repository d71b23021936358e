"""When a load begins and ends, and under which name of the ledger a loss is booked."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

from solver.model.load import Pulse
from solver.numerics.pulses import end_time
from tests.published.rods import LENGTH, C, pulse, solved


def test_a_pulse_ends_its_length_after_its_start() -> None:
    late = Pulse(kind="pulse", quantity="force", shape="half_sine", peak=1.0, duration=0.002, start=0.001)
    assert end_time(late) == pytest.approx(0.003, rel=1e-12)


def test_a_struck_end_that_starts_late_is_let_go_late() -> None:
    """Driven at 1 m/s from 1 ms to 2 ms and then free: it moves by 1 mm, and lies still until the echo at 5 ms."""
    run = solved(
        pulse("rectangle", 0.001, 1.0, "velocity", start=0.001, release=True), gauges={"head": 0.0}, dx=0.05,
        duration=0.0045,
    )  # fmt: skip
    head = run.gauges["head"]
    assert head.velocity[(head.time > 0.00102) & (head.time < 0.00198)] == pytest.approx(1.0, rel=1e-9)
    assert np.abs(head.velocity[head.time > 0.00202]).max() < 1e-9
    assert head.displacement[-1] == pytest.approx(0.001, rel=1e-9)


def test_the_power_law_to_the_power_of_one_is_the_viscous_law_also_in_the_ledger() -> None:
    """Two laws in two loops: what slips and what is damped stand under the same names, to 1e-6 of all that came in."""
    how: dict[str, Any] = {"far_end": "free", "dx": 0.1, "duration": 6 * LENGTH / C}
    ledgers = []
    for law in ({"damping_law": "viscous"}, {"damping_law": "power", "exponent": 1.0}):
        shaft = {"resistance": 3e5, "distribution": "uniform", "quake": 0.0005, "damping": 0.3, **law}
        ledgers.append(
            solved(pulse("half_sine", 0.002), ground={"surface": 0.0, "shaft_total": shaft}, **how).ledger
        )
    viscous, power = (ledger.final for ledger in ledgers)
    came_in = viscous["work_of_load"]
    assert viscous["ground_static_loss"] > 0.01 * came_in
    assert viscous["ground_damping_loss"] > 0.1 * came_in
    for part, energy in viscous.items():
        # what damping exchanges where the motion turns within a step is a part of its own in the power law
        room = 2e-3 if part in ("ground_damping_loss", "impact_loss") else 1e-6
        assert power[part] == pytest.approx(energy, abs=room * came_in), part
