"""The set-up compiles the solver ahead of need, by a case that must stay solvable."""

import subprocess
import sys
from pathlib import Path


def test_the_solver_is_compiled_by_a_command_that_says_nothing() -> None:
    root = Path(__file__).parents[2]
    done = subprocess.run(
        [sys.executable, "-m", "solver.warm_up"], cwd=root, capture_output=True, text=True, check=False
    )
    assert (done.returncode, done.stdout, done.stderr) == (0, "", "")
