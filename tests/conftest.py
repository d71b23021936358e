"""What all tests share. Imports no Qt, so that the solver's tests run where it is not installed.

`python3 -m tests` uses the profile `ci` of hypothesis: the same examples at every run, few enough to stay quick.
`python3 -m tests --hypothesis-profile nightly` searches anew each time, and much further.
"""

import os
import sys
import tempfile
from collections.abc import Iterator
from pathlib import Path

import pytest
from hypothesis import HealthCheck, settings

# No deadline: the first example of a test may compile kernels, and two cores are shared by whatever else runs.
settings.register_profile(
    "ci", derandomize=True, max_examples=40, deadline=None, suppress_health_check=[HealthCheck.too_slow]
)
settings.register_profile("nightly", max_examples=1000, deadline=None, print_blob=True)
settings.load_profile("ci")

# Compiled kernels stay in the checkout and are there at the next run. Set before `solver` is first imported.
os.environ.setdefault(
    "STRIKETRACE_CACHE", str(Path(__file__).resolve().parent.parent / ".pytest_cache" / "kernels")
)


@pytest.fixture(scope="session", autouse=True)
def _settings_of_nobody() -> Iterator[None]:
    """No test reads or writes the settings of the person who runs it."""
    with tempfile.TemporaryDirectory() as folder, pytest.MonkeyPatch.context() as patch:
        patch.setenv("STRIKETRACE_SETTINGS", folder)
        yield


def pytest_sessionfinish() -> None:
    """Without a screen the clipboard outlives Python, and what Python has put there ends the process with a fault."""
    if "PySide6.QtGui" in sys.modules:
        from PySide6.QtGui import QGuiApplication

        if QGuiApplication.instance() is not None:
            QGuiApplication.clipboard().clear()
