"""What is refused because its numbers are no answer: energies that grow from nothing, told from those that may stand.

The ledgers here are made by hand, so that the share that must come out is known.
"""

from __future__ import annotations

import numpy as np
import pytest

from solver.numerics.balance import LEDGER, WHOLE, growing_share, moving_share, residual_of

ROWS = 300
#: Time from 0 to 1 over the rows.
TIME = np.linspace(0.0, 1.0, ROWS)


def ledger(**columns: object) -> np.ndarray:
    """Rows with the given columns (numbers or arrays of shape (ROWS,)), J; all others are 0."""
    rows = np.zeros((ROWS, len(LEDGER) + 1))
    for name, values in columns.items():
        rows[:, WHOLE if name == "whole" else LEDGER.index(name)] = values
    return rows


#: 10 J of motion before the first step, and nothing that comes in afterwards.
START = ledger(kinetic=10.0)[0]


def test_a_wave_that_grows_with_the_square_of_time_is_seen_with_its_share() -> None:
    """10 J were there; the whole step holds 10 + 4 t^2 J: 40 % more at the end, in the last row. Exact."""
    share, row = growing_share(START, ledger(kinetic=10.0, whole=10.0 + 4.0 * TIME**2))
    assert share == pytest.approx(0.4, rel=1e-12)
    assert row == ROWS - 1


def test_a_short_pulse_that_stays_above_what_came_in_is_no_such_wave() -> None:
    """Pulses of few elements hold more on the whole step than on half steps, but no more late than early."""
    assert growing_share(START, ledger(kinetic=10.0, whole=14.0))[0] == 0.0


def test_what_comes_in_late_counts_as_there() -> None:
    """The load brings 4 t^2 J while the whole step holds 10 + 4 t^2 J: nothing comes from nothing."""
    rows = ledger(kinetic=10.0, work_of_load=4.0 * TIME**2, whole=10.0 + 4.0 * TIME**2)
    assert growing_share(START, rows)[0] == 0.0


def test_motion_beyond_all_that_came_in_is_seen_where_it_stands() -> None:
    """10 J were there and the load brings 10 J more by half of the run; 26 J of motion in one row are 6 J too many:
    30 % of the 20 J. Exact.
    """
    rows = ledger(kinetic=10.0, work_of_load=np.minimum(20.0 * TIME, 10.0))
    rows[250, LEDGER.index("kinetic")] = 26.0
    share, row = moving_share(START, rows)
    assert share == pytest.approx(0.3, rel=1e-12)
    assert row == 250


def test_the_residual_is_what_does_not_close_of_the_largest_energy() -> None:
    """10 J of motion become 7 J stored and 2 J lost: 1 J is missing, a tenth of the largest energy there was."""
    rows = ledger(elastic_member=7.0, plastic=2.0)
    rows[:200] = ledger(kinetic=10.0)[:200]
    share, row = residual_of(START, rows)
    assert share == pytest.approx(0.1, rel=1e-12)
    assert row == 200
