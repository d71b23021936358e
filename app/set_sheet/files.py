"""The set sheet as files: CSV and JSON in SI units. Imports no Qt."""

from __future__ import annotations

import csv
import io
import json
from typing import Any

from app import __version__
from solver.answer.findings import StressFinding
from solver.studies import Cell, Sheet
from solver.studies.questions import SafeBlow

HEAD = (
    "total_resistance_N",
    "varied_value",
    "set_m",
    "blows_per_metre",
    "peak_compression_Pa",
    "peak_compression_position_m",
    "peak_tension_Pa",
    "peak_tension_position_m",
    "largest_share_of_limit",
    "share_position_m",
    "energy_past_gauge_J",
    "at_rest",
    "problem",
)


def sheet_csv(sheet: Sheet, title: str) -> str:
    """One row a point, in the order of the sheet; empty where there is no value ("practically no set": no blows)."""
    out = io.StringIO()
    plan = sheet.plan
    varied = plan.levels[0]
    for line in (
        f"Set sheet of {_one_line(plan.case.name)}, project {_one_line(title)}",
        f"Striketrace {__version__}, SI units, stresses are magnitudes",
        f"varied_value is {varied.pointer}; "
        + (
            "all of the resistance is varied" if plan.vary == "all" else "the resistance of the toe is varied"
        ),
    ):
        out.write(f"# {line}\n")
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow(HEAD)
    for cell in sheet.cells:
        writer.writerow(["" if v is None else v for v in _row(cell)])
    return out.getvalue()


def _row(cell: Cell) -> tuple[Any, ...]:
    worst = cell.worst
    return (
        cell.resistance,
        cell.level.value,
        cell.set,
        cell.blows_per_metre,
        *_peak(cell.compression),
        *_peak(cell.tension),
        cell.share,
        worst[1].position if worst else None,
        cell.energy.value if cell.energy else None,
        str(cell.at_rest).lower(),
        cell.problem or None,
    )


def _peak(finding: StressFinding | None) -> tuple[float | None, float | None]:
    return (None, None) if finding is None else (finding.peak.value, finding.peak.position)


def _one_line(text: str) -> str:
    return " ".join(text.split())


def sheet_json(sheet: Sheet, title: str, stop_at: Cell | None, safe: SafeBlow | None, criterion: str) -> str:
    """All of it for other programs: the plan, the points, and the answers."""
    plan = sheet.plan
    tree = {
        "program": f"Striketrace {__version__}",
        "project": title,
        "case": plan.case.name,
        "units": "SI",
        "own_total_resistance_N": plan.own_total,
        "vary": plan.vary,
        "varied": plan.levels[0].pointer,
        "resistances_N": list(plan.resistances),
        "values": [level.value for level in plan.levels],
        "points": [
            dict(zip(HEAD, _row(cell), strict=True)) | {"at_rest": cell.at_rest} for cell in sheet.cells
        ],
        "stopping_criterion": criterion,
        "stop_at": None
        if stop_at is None
        else dict(zip(HEAD, _row(stop_at), strict=True)) | {"at_rest": stop_at.at_rest},
        "largest_blow": None
        if safe is None
        else {
            "resistance_N": safe.resistance,
            "outcome": safe.why,
            "value": safe.level.value if safe.level and safe.why == "found" else None,
            "looked_from": safe.low,
            "looked_to": safe.high,
            "tolerance": safe.tolerance,
        },
    }
    return json.dumps(tree, indent=2, ensure_ascii=False) + "\n"
