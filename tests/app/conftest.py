"""What all tests of the window share."""

import pytest

from app.qt_references import keep_singletons


@pytest.fixture(scope="session", autouse=True)
def _singletons_live() -> None:
    """As the program does before its first window (see there)."""
    keep_singletons()
