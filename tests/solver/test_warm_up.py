"""The set-up compiles the solver ahead of need, by a case that must stay solvable."""

import subprocess
import sys
from pathlib import Path

import pytest

from solver.numerics import compiled
from solver.warm_up import compile_last_parts, warm_up


def test_the_solver_is_compiled_by_a_command_that_says_nothing() -> None:
    root = Path(__file__).parents[2]
    done = subprocess.run(
        [sys.executable, "-m", "solver.warm_up"], cwd=root, capture_output=True, text=True, check=False
    )
    assert (done.returncode, done.stdout, done.stderr) == (0, "", "")


def test_what_is_compiled_beside_is_what_a_march_calls() -> None:
    """The second process hands over the types that the march does: nothing is compiled twice, or for nobody."""
    if compiled.folder is None:
        pytest.skip("kernels cannot be kept here")
    warm_up()
    before = set(compiled.folder.rglob("*.nbc"))
    compile_last_parts()
    assert set(compiled.folder.rglob("*.nbc")) == before
