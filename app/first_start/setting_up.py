"""Make `.venv` in the checkout, or bring it up to date, and go on inside it. Standard library only.

Nothing outside the checkout is touched: downloads and temporary files lie in `.venv/set-up` until all is in place, so
that a set-up which was cut off need not fetch twice, and none of it stays behind. One set-up runs at a time; the
system itself lets go of the lock when its process ends, in whatever way. `.venv` counts as whole only by its stamp,
which says "not whole" from before the first change until after the last check.
"""

import os
import shutil
import signal
import subprocess
import sys
import time
from collections.abc import Iterator
from contextlib import contextmanager, suppress
from importlib.util import find_spec
from pathlib import Path
from typing import IO, NoReturn

from app.first_start import needs, set_up_failures
from app.first_start.set_up_progress import Progress, run_shown, say

INTERRUPTED = 130
"""Exit status after Ctrl-C, as shells have it."""


class CannotSetUp(Exception):
    """Carries the one sentence that the user is told."""


def set_up(folder: Path, extra: str) -> None:
    """Bring `.venv` in `folder` to what pyproject.toml asks for, with `extra`. Raises `CannotSetUp` if that fails."""
    again = f"{'py' if os.name == 'nt' else Path(sys.orig_argv[0]).name} -m {'tests' if extra else 'app'}"
    signal.signal(signal.SIGTERM, lambda number, frame: sys.exit(128 + number))
    try:
        with _only_one_at_a_time(folder / ".venv") as lock:
            _make_whole(folder, extra, again, lock)
    except OSError as error:
        raise CannotSetUp(set_up_failures.explain_error(error, folder, again)) from error
    except KeyboardInterrupt:
        say(f"Set-up stopped. `{again}` takes it up again.")
        raise SystemExit(INTERRUPTED) from None
    finally:
        signal.signal(signal.SIGTERM, signal.SIG_DFL)


def go_on_inside(venv: Path) -> NoReturn:
    """Run the command that started this process again with the interpreter of `venv`. Does not return."""
    command = [str(needs.venv_python(venv)), *sys.orig_argv[1:]]
    # These two would send the interpreter of `.venv` back to the libraries of the one that runs now.
    environment = {k: v for k, v in os.environ.items() if k not in ("PYTHONHOME", "__PYVENV_LAUNCHER__")}
    if os.name != "nt":
        os.execve(command[0], command, environment)
    # Windows has no exec that keeps the console waiting. Ctrl-C reaches both processes; the inner one answers it.
    inner = subprocess.Popen(command, env=environment)
    while True:
        with suppress(KeyboardInterrupt):
            raise SystemExit(inner.wait())


def _make_whole(folder: Path, extra: str, again: str, lock: IO[bytes]) -> None:
    venv = folder / ".venv"
    if needs.up_to_date(folder) and _lacks_nothing(folder, extra):
        return  # another start did it while this one waited
    stamp = needs.read_stamp(venv)
    version = _python_of(venv)
    made_by_hand = stamp is None and version != ""
    if made_by_hand and _lacks_nothing(folder, extra):
        needs.write_stamp(venv, needs.Stamp(True, needs.digest(folder), version))
        return
    if made_by_hand and not needs.python_fits(folder, version):
        raise CannotSetUp(set_up_failures.foreign_venv(venv, f"Python {version}", again))

    usable = made_by_hand or (stamp is not None and stamp.whole and stamp.python == version)
    usable = usable and needs.python_fits(folder, version)
    if not usable:
        _refuse_if_hopeless(folder, again)
    started = time.monotonic()
    say(f"Setting up Striketrace in {venv}")
    needs.write_stamp(venv, needs.Stamp(False, "", ""))
    if not usable:
        _make_anew(folder, again, lock)
    _install(folder, extra, again, lock)
    if not _lacks_nothing(folder, extra):
        raise CannotSetUp(
            set_up_failures.explain("packages are still missing after all were installed", folder, again)
        )
    shutil.rmtree(venv / "set-up", ignore_errors=True)
    needs.write_stamp(venv, needs.Stamp(True, needs.digest(folder), _python_of(venv)))
    _compile_solver(folder)
    say(f"Ready after {time.monotonic() - started:.0f} s. The next start needs none of this.")


def _compile_solver(folder: Path) -> None:
    """Compile the solver now, so that the first window need not wait; where that fails, it is compiled then."""
    say("  compiling the solver, once")
    command = [str(needs.venv_python(folder / ".venv")), "-X", "utf8", "-m", "solver.warm_up"]
    environment = {**os.environ, "STRIKETRACE_CACHE": str(needs.kernels(folder))}
    subprocess.run(command, cwd=folder, env=environment, capture_output=True)


def _refuse_if_hopeless(folder: Path, again: str) -> None:
    """What can be known before `.venv` is made anew."""
    if find_spec("venv") is None or find_spec("ensurepip") is None:
        raise CannotSetUp(set_up_failures.no_venv_module(again))
    if os.pathsep in str(folder):
        raise CannotSetUp(set_up_failures.bad_folder_name(folder))
    if shutil.disk_usage(folder).free < set_up_failures.MEGABYTES_NEEDED * 1_000_000:
        raise CannotSetUp(set_up_failures.disk_full(folder, again))


def _make_anew(folder: Path, again: str, lock: IO[bytes]) -> None:
    """An empty `.venv`. What was fetched before, the stamp (it says "not whole") and the lock stay."""
    venv = folder / ".venv"
    for entry in venv.iterdir():
        if entry.name in ("set-up", needs.STAMP_NAME, Path(lock.name).name):
            continue
        shutil.rmtree(entry) if entry.is_dir() and not entry.is_symlink() else entry.unlink()
    say("  making the environment")
    # From the interpreter that this one is based on: the one that runs may be the `.venv` that is being replaced.
    base = getattr(sys, "_base_executable", sys.executable)
    _run([base, "-I", "-X", "utf8", "-m", "venv", str(venv)], folder, again, lock)


def _install(folder: Path, extra: str, again: str, lock: IO[bytes]) -> None:
    pip = [str(needs.venv_python(folder / ".venv")), "-I", "-X", "utf8", "-m"]
    if subprocess.run([*pip, "pip", "--version"], capture_output=True).returncode != 0:
        _run([*pip, "ensurepip", "--default-pip"], folder, again, lock)  # some tools make a .venv without pip
    wanted = [one.text for one in needs.requirements(folder, extra)]
    # Only ready-built packages: a compiler at work for an hour, and then failing, is no help to anybody.
    options = ["--only-binary=:all:", "--retries=2", "--progress-bar=off", "--no-warn-script-location"]
    _run([*pip, "pip", "install", *options, *wanted], folder, again, lock)


def _run(command: list[str], folder: Path, again: str, lock: IO[bytes]) -> None:
    """Run a step of the set-up with visible progress. Raises `CannotSetUp` where it fails."""
    room = folder / ".venv" / "set-up"
    room.mkdir(exist_ok=True)
    environment = {k: v for k, v in os.environ.items() if k not in ("PIP_TARGET", "PIP_PREFIX", "PIP_ROOT")}
    environment |= {
        "PIP_USER": "0",
        "PIP_NO_INPUT": "1",
        "PIP_DISABLE_PIP_VERSION_CHECK": "1",
        "PIP_CACHE_DIR": str(room / "fetched"),
        "TMPDIR": str(room),
        "TEMP": str(room),
        "TMP": str(room),
    }
    status, said = run_shown(command, environment, Progress(room), lock)
    if status != 0:
        raise CannotSetUp(set_up_failures.explain(said, folder, again))


def _lacks_nothing(folder: Path, extra: str) -> bool:
    """Whether the interpreter in `.venv` says that it has everything in the ranges that pyproject.toml names."""
    command = [str(needs.venv_python(folder / ".venv")), "-m", "app.first_start.needs", extra]
    return subprocess.run(command, cwd=folder, capture_output=True).returncode == 0


def _python_of(venv: Path) -> str:
    """Version (major.minor) of the interpreter in `venv`, or an empty string where it does not run."""
    command = [str(needs.venv_python(venv)), "-I", "-c", "import sys; print('%d.%d' % sys.version_info[:2])"]
    try:
        return subprocess.run(command, capture_output=True, text=True).stdout.strip()
    except OSError:
        return ""


@contextmanager
def _only_one_at_a_time(venv: Path) -> Iterator[IO[bytes]]:
    """Hold the lock of `venv`; wait while another process has it. The file stays: to delete it would be a race."""
    venv.mkdir(exist_ok=True)
    with open(venv / "striketrace-setup.lock", "ab") as lock:
        told = False
        while not _locked(lock):
            if not told:
                say("Another start is setting up Striketrace here; waiting for it.")
                told = True
            time.sleep(0.2)
        yield lock


def _locked(lock: IO[bytes]) -> bool:
    """Try to take the lock. True as well where the file system knows no locks: then nobody can be waited for."""
    try:
        if sys.platform == "win32":
            import msvcrt

            lock.seek(0)
            msvcrt.locking(lock.fileno(), msvcrt.LK_NBLCK, 1)
        else:
            import fcntl

            fcntl.flock(lock, fcntl.LOCK_EX | fcntl.LOCK_NB)
    except (BlockingIOError, PermissionError):
        return False
    except OSError:
        return True
    return True
