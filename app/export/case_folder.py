"""One folder a case, with names that no system refuses and that never collide."""

from __future__ import annotations

import re
import unicodedata
from collections.abc import Sequence
from pathlib import Path

from app.disk import write_whole
from app.export.envelope_csv import envelope_csv
from app.export.gauge_csv import gauge_csv
from app.export.summary import summary_json
from solver.answer.result import Result

CASE_FILES = ("gauges.csv", "envelope.csv", "summary.json")
#: Windows keeps these names for devices, in any case of letters.
KEPT_BY_WINDOWS = {"con", "prn", "aux", "nul"} | {f"{d}{n}" for d in ("com", "lpt") for n in range(10)}
LONGEST = 60


def folder_names(names: Sequence[str]) -> list[str]:
    """A folder name for each case name, in order: small letters, digits and hyphens, all different."""
    plain = [_slug(name) for name in names]
    given: list[str] = []
    for slug in plain:
        number, candidate = 1, slug
        while candidate in given or (number > 1 and candidate in plain):
            number += 1
            candidate = f"{slug}-{number}"
        given.append(candidate)
    return given


def _slug(name: str) -> str:
    letters = unicodedata.normalize("NFKD", name).encode("ascii", "ignore").decode().casefold()
    slug = re.sub(r"[^a-z0-9]+", "-", letters).strip("-")[:LONGEST].strip("-") or "case"
    return f"{slug}-case" if slug in KEPT_BY_WINDOWS else slug


def write_case(result: Result, title: str, folder: Path, *, compression_positive: bool = False) -> None:
    """Write the three files of a case, each whole or not at all. Raises `OSError`."""
    texts = (
        gauge_csv(result, title, compression_positive=compression_positive),
        envelope_csv(result, compression_positive=compression_positive),
        summary_json(result, title),
    )
    folder.mkdir(parents=True, exist_ok=True)
    for name, text in zip(CASE_FILES, texts, strict=True):
        write_whole(folder / name, text)
