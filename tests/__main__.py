"""`python3 -m tests [pytest arguments]`: set up on first use, then run every test. Needs no screen."""

import os
import sys
from importlib import import_module
from importlib.util import find_spec

COLLECTIONS = ("bench", "verification")
"""Sub-folders with a command of their own: `python3 -m tests NAME [arguments]` runs `main(arguments)` found there."""


def main(arguments: list[str]) -> int:
    from app.first_start import first_use

    first_use.prepare("test")
    # Windows of the tests stay in memory, unless somebody wants to watch them.
    os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
    if arguments[:1] and arguments[0] in COLLECTIONS and _exists(arguments[0]):
        command = import_module(f"tests.{arguments[0]}.__main__")
        return int(command.main(arguments[1:]) or 0)
    return run_pytest(arguments)


def run_pytest(arguments: list[str]) -> int:
    import pytest

    from app.first_start import first_use, qt_needs

    try:
        import PySide6.QtWidgets  # noqa: F401
    except ImportError as error:
        print(qt_needs.explain_qt_failure(error), file=sys.stderr)
        return first_use.CANNOT_START
    return int(pytest.main(arguments))


def _exists(name: str) -> bool:
    return find_spec(f"tests.{name}") is not None and find_spec(f"tests.{name}.__main__") is not None


if __name__ == "__main__":
    raise SystemExit(main(sys.argv[1:]))
