"""The first thing that runs: go on in this interpreter, or in the checkout's own `.venv`, made where there is none.

Standard library only. Pythons that are too old for the rest must be able to read this file, in order to say so:
hence the imports inside `prepare`, and no syntax or type newer than Python 3.6.
"""

import os
import sys

OLDEST = (3, 11)
NEWEST = (3, 13)

CANNOT_START = 3
"""Exit status where the program cannot be set up, or cannot start, on this machine."""


def prepare(extra: str = "") -> None:
    """Return once this interpreter has all packages, those of `extra` (a group in pyproject.toml) among them.

    Where it lacks some, `.venv` in the checkout is made or brought up to date, the same command goes on inside it, and
    this function does not return. Where that cannot be done: one sentence on standard error, and `SystemExit` with
    `CANNOT_START`.
    """
    module = "tests" if extra else "app"
    version = sys.version_info[:2]
    if not OLDEST <= version <= NEWEST:
        print(explain_python(version[0], version[1], module), file=sys.stderr)
        raise SystemExit(CANNOT_START)
    from app.first_start import needs

    folder = needs.checkout()
    if folder is not None and needs.runs_inside(folder / ".venv"):
        # what the solver compiles lies in the checkout too, as all that a start from it makes
        os.environ.setdefault("STRIKETRACE_CACHE", str(needs.kernels(folder)))
    if folder is None or needs.ready(folder, extra):
        return  # an installed package has what it needs: pip saw to that
    # Imported only now, as most starts do without it: it costs more than all that stands above.
    from app.first_start import setting_up

    if needs.runs_inside(folder / ".venv") or not needs.up_to_date(folder):
        try:
            setting_up.set_up(folder, extra)
        except setting_up.CannotSetUp as error:
            print(error, file=sys.stderr)
            raise SystemExit(CANNOT_START) from None
    setting_up.go_on_inside(folder / ".venv")


def explain_python(major: int, minor: int, module: str) -> str:
    """One sentence on a Python that is too old or too new, with the command to use instead."""
    names = [f"python3.{one}" for one in range(NEWEST[1], OLDEST[1] - 1, -1)]
    found = [name for name in names if runs(name)]
    best = found[0] if found else names[0]
    if found:
        mend = f"start it with `{best} -m {module}`"
    elif os.name == "nt":
        mend = f"run `winget install Python.Python.3.{NEWEST[1]}`, then `py -3.{NEWEST[1]} -m {module}`"
    elif sys.platform == "darwin":
        mend = f"run `brew install python@3.{NEWEST[1]}`, then `{best} -m {module}`"
    else:
        mend = f"install one, for example with `sudo apt install {best}-venv`, then run `{best} -m {module}`"
    return f"Striketrace runs on Python 3.{OLDEST[1]} to 3.{NEWEST[1]}, and this is Python {major}.{minor}: {mend}."


def runs(name: str) -> bool:
    """Whether a Python of this name can be started: some systems have a stand-in of the name that only refuses."""
    import subprocess

    try:
        return subprocess.call([name, "-c", ""], stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL) == 0
    except OSError:
        return False
