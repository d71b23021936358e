"""Setting up: what a half-made `.venv` is worth, and that only one process makes it. No network is used."""

import contextlib
import os
import subprocess
import sys
from pathlib import Path
from types import SimpleNamespace

import pytest

from app.first_start import needs, set_up_progress, setting_up

ROOT = Path(__file__).resolve().parents[2]


@pytest.fixture
def folder(tmp_path: Path) -> Path:
    """A checkout that needs nothing, on a path with a space and a letter that is not ASCII."""
    folder = tmp_path / "über all"
    (folder / "app" / "first_start").mkdir(parents=True)
    for name in ("__init__.py", "first_start/__init__.py", "first_start/needs.py"):
        source = (ROOT / "app" / name).read_text(encoding="utf-8")
        (folder / "app" / name).write_text(source, encoding="utf-8")
    text = '[project]\nrequires-python = ">=3.11,<3.14"\ndependencies = []\n'
    (folder / "pyproject.toml").write_text(text, encoding="utf-8")
    return folder


@pytest.fixture
def made(monkeypatch: pytest.MonkeyPatch) -> list[str]:
    """A real `.venv`, but without pip (it takes seconds) and without packages; notes what was done."""
    done: list[str] = []
    run = setting_up._run

    def make_quickly(command: list[str], *others: object) -> None:
        done.append("venv" if "venv" in command else "pip")
        if "venv" in command:
            run([*command, "--without-pip"], *others)

    monkeypatch.setattr(setting_up, "_run", make_quickly)
    return done


def whole(folder: Path) -> bool:
    stamp = needs.read_stamp(folder / ".venv")
    return stamp is not None and stamp.whole


def test_the_first_time_makes_it_and_the_second_does_nothing(folder: Path, made: list[str]) -> None:
    setting_up.set_up(folder, "")
    assert made[0] == "venv"
    assert "pip" in made
    assert needs.up_to_date(folder)
    assert not (folder / ".venv" / "set-up").exists()
    made.clear()
    setting_up.set_up(folder, "")
    assert made == []


def test_a_changed_pyproject_installs_into_what_is_there(folder: Path, made: list[str]) -> None:
    setting_up.set_up(folder, "")
    made.clear()
    with open(folder / "pyproject.toml", "a", encoding="utf-8") as file:
        file.write("# changed\n")
    setting_up.set_up(folder, "")
    assert made
    assert "venv" not in made
    assert needs.up_to_date(folder)


@pytest.mark.parametrize("blow", [KeyboardInterrupt(), setting_up.CannotSetUp("No.")])
def test_a_set_up_that_was_cut_off_is_made_anew(
    folder: Path, made: list[str], monkeypatch: pytest.MonkeyPatch, blow: BaseException
) -> None:
    def cut_off(*arguments: object) -> None:
        raise blow

    with monkeypatch.context() as patch:
        patch.setattr(setting_up, "_install", cut_off)
        with pytest.raises((SystemExit, setting_up.CannotSetUp)):
            setting_up.set_up(folder, "")
    assert needs.venv_python(folder / ".venv").exists()
    assert not whole(folder)
    assert not needs.up_to_date(folder)
    made.clear()
    (folder / ".venv" / "half a package").touch()
    setting_up.set_up(folder, "")
    assert made[0] == "venv"
    assert not (folder / ".venv" / "half a package").exists()
    assert whole(folder)


def test_downloads_of_a_cut_off_set_up_are_kept_for_the_next(folder: Path, made: list[str]) -> None:
    fetched = folder / ".venv" / "set-up" / "fetched"
    fetched.mkdir(parents=True)
    (fetched / "a package").touch()
    needs.write_stamp(folder / ".venv", needs.Stamp(False, "", ""))
    seen = []

    def look(*arguments: object) -> None:
        seen.append((fetched / "a package").exists())

    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(setting_up, "_install", look)
        setting_up.set_up(folder, "")
    assert seen == [True]


def test_a_venv_made_by_hand_that_lacks_nothing_is_accepted_as_it_is(folder: Path, made: list[str]) -> None:
    subprocess.run([sys.executable, "-m", "venv", "--without-pip", str(folder / ".venv")], check=True)
    setting_up.set_up(folder, "")
    assert made == []
    assert needs.up_to_date(folder)


def test_packages_that_stay_away_are_not_stamped_as_there(folder: Path, made: list[str]) -> None:
    text = '[project]\nrequires-python = ">=3.11,<3.14"\ndependencies = ["no-such-package>=1,<2"]\n'
    (folder / "pyproject.toml").write_text(text, encoding="utf-8")
    with pytest.raises(setting_up.CannotSetUp, match="missing after all were installed"):
        setting_up.set_up(folder, "")
    assert not whole(folder)


def test_a_python_without_venv_is_told_before_anything_is_made(
    folder: Path, made: list[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(setting_up, "find_spec", lambda name: None)
    with pytest.raises(setting_up.CannotSetUp, match="lacks its 'venv'"):
        setting_up.set_up(folder, "")
    assert made == []


def test_a_disk_without_room_is_told_before_anything_is_made(
    folder: Path, made: list[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr("shutil.disk_usage", lambda place: SimpleNamespace(free=100_000_000))
    with pytest.raises(setting_up.CannotSetUp, match="too little room"):
        setting_up.set_up(folder, "")
    assert made == []


def test_a_folder_that_cannot_be_written_to_is_told(folder: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def refuse(self: Path, **options: object) -> None:
        raise PermissionError(13, "Permission denied", str(self))

    monkeypatch.setattr(Path, "mkdir", refuse)
    with pytest.raises(setting_up.CannotSetUp, match="cannot be written to"):
        setting_up.set_up(folder, "")


HOLD_THE_LOCK = """
import sys
from pathlib import Path
from app.first_start import setting_up
with setting_up._only_one_at_a_time(Path(sys.argv[1])):
    print("held", flush=True)
    sys.stdin.read()
"""


def test_one_set_up_at_a_time_and_a_killed_one_leaves_no_lock(tmp_path: Path) -> None:
    venv = tmp_path / ".venv"
    other = subprocess.Popen(
        [sys.executable, "-c", HOLD_THE_LOCK, str(venv)],
        cwd=ROOT,
        stdin=subprocess.PIPE,
        stdout=subprocess.PIPE,
        text=True,
    )
    with other:
        assert other.stdout is not None
        assert other.stdout.readline() == "held\n"
        with open(venv / "striketrace-setup.lock", "ab") as lock:
            assert not setting_up._locked(lock)
            other.kill()
            other.wait()
            assert setting_up._locked(lock)


def test_the_installer_is_ended_when_the_set_up_is_interrupted(tmp_path: Path) -> None:
    class Interrupts(set_up_progress.Progress):
        def line(self, text: str) -> None:
            child.append(int(text))
            raise KeyboardInterrupt

    child: list[int] = []
    waits = "import os, time; print(os.getpid(), flush=True); time.sleep(60)"
    with (
        open(tmp_path / "lock", "ab") as lock,
        contextlib.suppress(KeyboardInterrupt),
    ):
        set_up_progress.run_shown([sys.executable, "-c", waits], dict(os.environ), Interrupts(tmp_path), lock)
    if os.name != "nt":
        with pytest.raises(ProcessLookupError):
            os.kill(child[0], 0)


@pytest.mark.parametrize(
    ("line", "shown"),
    [
        (
            "  Downloading numpy-2.4.6-cp311-cp311-manylinux_2_28_x86_64.whl (16.9 MB)",
            "  fetching numpy 2.4.6 (16.9 MB)",
        ),
        ("  Using cached scipy-1.17.1-cp312-cp312-win_amd64.whl (36 kB)", "  fetching scipy 1.17.1 (36 kB)"),
        ("Processing ./wheels/pint-0.25.3-py3-none-any.whl (from x)", "  fetching pint 0.25.3"),
        ("  Downloading numpy-2.4.6-cp311-cp311-win_amd64.whl.metadata (62 kB)", ""),
        ("Installing collected packages: numpy, scipy", "  unpacking 2 packages"),
        ("Requirement already satisfied: numpy", ""),
    ],
)
def test_what_is_shown_of_the_installers_lines(line: str, shown: str) -> None:
    assert set_up_progress.shown_as(line) == shown
