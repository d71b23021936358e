"""The comment lines of gauges.csv say what its columns are, in either sign, and what a reader must know of the run."""

from __future__ import annotations

import io
from dataclasses import replace

import numpy as np
import pytest

from app.export import envelope_csv, gauge_csv
from solver.answer.remark import Remark


def read(text: str) -> tuple[str, dict[str, np.ndarray]]:
    """The comment block, and the columns by their heads."""
    lines = text.splitlines()
    block = "\n".join(line for line in lines if line.startswith("#"))
    head, *rows = [line for line in lines if not line.startswith("#")]
    values = np.loadtxt(io.StringIO("\n".join(rows)), delimiter=",")
    return block, dict(zip(head.split(","), values.T, strict=True))


@pytest.mark.parametrize(("compression", "down", "up"), [(False, -1, 1), (True, 1, -1)])
def test_the_waves_are_what_the_comment_says(bar, compression, down, up):
    """ "down_wave = (F - Z v)/2" where tension is positive, and with a plus where compression is."""
    result = bar[1]
    block, columns = read(gauge_csv(result, "Bar", compression_positive=compression))
    signs = {-1: "-", 1: "+"}
    assert f"down_wave = (F {signs[down]} Z v)/2, up_wave = (F {signs[up]} Z v)/2" in block
    assert ("sign: compression positive" in block) == compression
    force, motion = columns["Near.force_N"], result.gauges["Near"].impedance * columns["Near.velocity_m_s"]
    room = 1e-9 * np.abs(force).max()
    assert columns["Near.down_wave_N"] == pytest.approx((force + down * motion) / 2, abs=room)
    assert columns["Near.up_wave_N"] == pytest.approx((force + up * motion) / 2, abs=room)


def test_what_a_reader_must_know_stands_above_the_numbers(bar):
    """The weight that is in the forces, a run that was stopped, and the solver's warnings: each only where it is so."""
    plain = bar[1]
    words = ("forces include the static force at rest", "the run was stopped before its end", "warning: ")
    block = read(gauge_csv(plain, "Bar"))[0]
    assert not [word for word in words if word in block]
    heavy = plain.case.model_copy(update={"run": plain.case.run.model_copy(update={"gravity": True})})
    told = replace(plain, case=heavy, finished=False, remarks=(Remark("energy_open", 0.02),))
    block = read(gauge_csv(told, "Bar"))[0]
    assert all(word in block for word in words)


@pytest.mark.parametrize(("compression", "sign"), [(False, 1), (True, -1)])
def test_the_envelope_keeps_its_columns_in_either_sign(bar, compression, sign):
    """The lowest stays the most compressive and the highest the most tensile; motion has no sign to turn."""
    envelope = bar[1].envelope
    _, columns = read(envelope_csv(bar[1], compression_positive=compression))
    assert columns["lowest_stress_Pa"] == pytest.approx(sign * envelope.lowest_stress, rel=1e-15)
    assert columns["highest_stress_Pa"] == pytest.approx(sign * envelope.highest_stress, rel=1e-15)
    assert columns["max_velocity_m_s"] == pytest.approx(envelope.max_velocity, rel=1e-15)
    assert columns["max_displacement_m"] == pytest.approx(envelope.max_displacement, rel=1e-15)
