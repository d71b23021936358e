"""Killed without warning, the program loses no more than the last seconds. `tests/app/killing.py` kills more often."""

from __future__ import annotations

import pytest

from tests.app.killing import MAY_BE_LOST, kill_once


@pytest.mark.parametrize(("share_of_saves", "after"), [(0.5, 0.7), (0.0, 5.0)])
def test_a_kill_loses_at_most_the_last_3_seconds(tmp_path, share_of_saves, after):
    left = kill_once(tmp_path, 1, after, share_of_saves)
    assert not left.fault
    assert left.made > 0
    assert left.lost_since <= MAY_BE_LOST
    if after > MAY_BE_LOST:
        assert left.in_recovery > left.in_file  # nothing was saved: the kept work was needed
        assert left.unsaved_since > MAY_BE_LOST
