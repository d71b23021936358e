"""What a checkout needs, and what is there: packages, the own `.venv` and its stamp. Standard library only.

Everything here is read at every start before the program goes on, so it looks at file names and imports nothing big.
`python -m app.first_start.needs [EXTRA]` says what the interpreter that runs it lacks, by exit status and name.
"""

import hashlib
import importlib.util
import json
import os
import re
import sys
import tomllib
from pathlib import Path
from typing import Any, NamedTuple

# The name to import, where it is not the name of the package in lower case with `_` for `-`.
_IMPORTED_AS = {"pyside6-essentials": "PySide6", "pytest-qt": "pytestqt", "import-linter": "importlinter"}

STAMP_NAME = "striketrace-setup.json"


class Requirement(NamedTuple):
    """One line of the dependencies in pyproject.toml: `text` as written; `low <= version < high`."""

    text: str
    name: str
    low: tuple[int, ...]
    high: tuple[int, ...]

    @property
    def imported_as(self) -> str:
        return _IMPORTED_AS.get(self.name, self.name.replace("-", "_"))


class Stamp(NamedTuple):
    """What stands in `.venv` about its set-up. `whole` is False while a set-up is under way, or was cut off."""

    whole: bool
    pyproject: str
    python: str


def checkout() -> Path | None:
    """Folder of the checkout that this file runs from, or None where it was installed as a package."""
    folder = Path(__file__).resolve().parents[2]
    return folder if (folder / "pyproject.toml").is_file() else None


def venv_python(venv: Path) -> Path:
    """The interpreter inside `venv`, on this system."""
    return venv / "Scripts" / "python.exe" if os.name == "nt" else venv / "bin" / "python"


def kernels(folder: Path) -> Path:
    """Where a start from the checkout `folder` keeps what the solver compiles."""
    return folder / ".venv" / "kernels"


def runs_inside(venv: Path) -> bool:
    """Whether this interpreter is the one of `venv`."""
    try:
        return os.path.samefile(sys.prefix, venv)
    except OSError:
        return False


def this_python() -> str:
    return f"{sys.version_info.major}.{sys.version_info.minor}"


def digest(folder: Path) -> str:
    """SHA-256 of pyproject.toml, so that any change of it sets up again."""
    return hashlib.sha256((folder / "pyproject.toml").read_bytes()).hexdigest()


def read_stamp(venv: Path) -> Stamp | None:
    """The stamp of `venv`; None where there is none. One that cannot be read counts as cut off."""
    try:
        found = json.loads((venv / STAMP_NAME).read_bytes())
        return Stamp(found["whole"] is True, str(found["pyproject"]), str(found["python"]))
    except (FileNotFoundError, NotADirectoryError):
        return None
    except (OSError, ValueError, KeyError, TypeError):
        return Stamp(False, "", "")


def write_stamp(venv: Path, stamp: Stamp) -> None:
    """Put the stamp into `venv` in one step: it is never half there."""
    new = venv / (STAMP_NAME + ".new")
    new.write_text(json.dumps(stamp._asdict()), encoding="utf-8")
    os.replace(new, venv / STAMP_NAME)


def numbers(version: str) -> tuple[int, ...]:
    """The release numbers of a version, without trailing zeros, so that 2.0 and 2 compare equal."""
    release = re.match(r"\d+(\.\d+)*", version)
    found = [int(part) for part in release.group().split(".")] if release else []
    while found and found[-1] == 0:
        found.pop()
    return tuple(found)


def parse_requirement(text: str) -> Requirement:
    """Read `name>=low,<high`. Raises `ValueError` for any other form."""
    match = re.fullmatch(r"([A-Za-z0-9._-]+)>=([0-9.]+),<([0-9.]+)", text)
    if match is None:
        raise ValueError(f"pyproject.toml asks for '{text}'; write it as 'name>=LOW,<HIGH'")
    name = _normal(match.group(1))
    return Requirement(text, name, numbers(match.group(2)), numbers(match.group(3)))


def requirements(folder: Path, extra: str = "") -> list[Requirement]:
    """The dependencies in pyproject.toml, and those of the extra where one is named."""
    project = _project_table(folder)
    texts = project["dependencies"] + (project["optional-dependencies"][extra] if extra else [])
    return [parse_requirement(text) for text in texts]


def python_fits(folder: Path, version: str) -> bool:
    """Whether pyproject.toml allows this Python."""
    allowed = parse_requirement("python" + _project_table(folder)["requires-python"])
    return allowed.low <= numbers(version) < allowed.high


def missing(needed: list[Requirement]) -> list[str]:
    """Those of `needed`, as written, that this interpreter cannot import or has in a version outside the range.

    Versions are read from the names of the `*.dist-info` folders, as opening metadata would cost more than the whole
    start is allowed to. A package without such a folder (some distributions make none) is taken as it is.
    """
    versions = _installed_versions()
    return [
        one.text
        for one in needed
        if importlib.util.find_spec(one.imported_as) is None
        or (one.name in versions and not one.low <= versions[one.name] < one.high)
    ]


def ready(folder: Path, extra: str = "") -> bool:
    """Whether this interpreter can go on: it lacks nothing and, if it is the own `.venv`, that is up to date.

    A `.venv` made by hand has no stamp, and is as good as what it holds.
    """
    if missing(requirements(folder, extra)):
        return False
    venv = folder / ".venv"
    return not runs_inside(venv) or read_stamp(venv) is None or up_to_date(folder)


def up_to_date(folder: Path) -> bool:
    """Whether the own `.venv` was set up to the end, for pyproject.toml and Python as they are now."""
    venv = folder / ".venv"
    stamp = read_stamp(venv)
    if stamp is None or not stamp.whole or stamp.pyproject != digest(folder):
        return False
    if runs_inside(venv) and stamp.python != this_python():
        return False
    return venv_python(venv).exists()


def _project_table(folder: Path) -> dict[str, Any]:
    text = (folder / "pyproject.toml").read_text(encoding="utf-8")
    table: dict[str, Any] = tomllib.loads(text)["project"]
    return table


def _normal(name: str) -> str:
    return re.sub(r"[-_.]+", "-", name).lower()


def _installed_versions() -> dict[str, tuple[int, ...]]:
    found: dict[str, tuple[int, ...]] = {}
    for folder in sys.path:
        try:
            names = os.listdir(folder or ".")
        except OSError:  # a zip file, or an entry that does not exist
            continue
        for entry in names:
            if entry.endswith(".dist-info"):
                name, _, version = entry.removesuffix(".dist-info").partition("-")
                found.setdefault(_normal(name), numbers(version))
    return found


if __name__ == "__main__":
    here = checkout()
    absent = missing(requirements(here, *sys.argv[1:2])) if here else []
    print(*absent, sep="\n", end="")
    raise SystemExit(1 if absent else 0)
