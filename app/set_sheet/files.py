"""The set sheet as files: CSV and JSON in SI units. Imports no Qt."""

from __future__ import annotations

import csv
import io
import json
from dataclasses import dataclass
from typing import Any

from app import __version__
from app.set_sheet.depth_files import depth_tree
from app.words import LIMIT_CAUTION, MODEL_CAUTION
from solver.answer.findings import StressFinding
from solver.studies import Cell, Sheet
from solver.studies.depth import Depths
from solver.studies.largest_blow import LargestBlow
from solver.studies.questions import ShownResistance
from solver.studies.uncertainty import Bands, Sampled

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
    "passed_only_after_ram_struck_again",
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
        f"{MODEL_CAUTION} {LIMIT_CAUTION}",
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
        str(cell.again_only).lower(),
        cell.energy.value if cell.energy else None,
        str(cell.at_rest).lower(),
        cell.problem or None,
    )


def _peak(finding: StressFinding | None) -> tuple[float | None, float | None]:
    return (None, None) if finding is None else (finding.peak.value, finding.peak.position)


def _one_line(text: str) -> str:
    return " ".join(text.split())


@dataclass(frozen=True)
class Answers:
    """To the questions of the settings: the point to stop at, the largest blow, the samples where asked for, the study
    of depths, or why there is none, and what a measured set shows."""

    stop_at: Cell | None = None
    largest: LargestBlow | None = None
    sampled: Sampled | None = None
    depths: Depths | None = None
    no_depths: str = ""
    shown: ShownResistance | None = None


def sheet_json(sheet: Sheet, title: str, answers: Answers, criterion: str) -> str:
    """All of it for other programs: the plan, the points, and the answers."""
    plan, largest = sheet.plan, answers.largest
    tree: dict[str, Any] = {
        "program": f"Striketrace {__version__}",
        "project": title,
        "case": plan.case.name,
        "units": "SI",
        "own_total_resistance_N": plan.own_total,
        "vary": plan.vary,
        "varied": plan.levels[0].pointer,
        "resistances_N": list(plan.resistances),
        "values": [level.value for level in plan.levels],
        "points": [_point(cell) for cell in sheet.cells],
        "stopping_criterion": criterion,
        "stop_at": None if answers.stop_at is None else _point(answers.stop_at),
    }
    if largest is not None:
        tree["largest_blow"] = {
            "resistance_N": largest.resistance,
            "outcome": largest.why,
            "value": largest.level.value if largest.level and largest.why == "found" else None,
            "looked_from": largest.low,
            "looked_to": largest.high,
            "steps_looked_at": largest.steps,
            "admissible_from": largest.at_least if largest.level else None,
            "smaller_values_pass_a_limit": largest.smaller_pass or "none",
            "passed_above_only_after_the_ram_struck_again": largest.passed.again_only
            if largest.passed
            else None,
            "tolerance": largest.tolerance,
        }
    if answers.shown is not None:
        tree["measured_set"] = _shown(answers.shown)
    if answers.sampled is not None:
        tree["not_known"] = _sampled(answers.sampled)
    if answers.depths is not None:
        tree["depth"] = depth_tree(answers.depths)
    return json.dumps(tree, indent=2, ensure_ascii=False) + "\n"


def _point(cell: Cell) -> dict[str, Any]:
    told = {"at_rest": cell.at_rest, "passed_only_after_ram_struck_again": cell.again_only}
    return dict(zip(HEAD, _row(cell), strict=True)) | told


def _shown(shown: ShownResistance) -> dict[str, Any]:
    return {
        "set_m": shown.measured,
        "reading_error_m": shown.error,
        "value": shown.level.value,
        "total_resistance_N": {"least": shown.at_least, "middle": shown.middle, "most": shown.at_most},
        "looked_from_N": shown.lowest,
        "looked_to_N": shown.highest,
        "tolerance": shown.tolerance,
    }


def _sampled(sampled: Sampled) -> dict[str, Any]:
    return {
        "samples": sampled.samples,
        "failed": sampled.failed,
        "seed": sampled.seed,
        "asked": None if sampled.asked is None else _bands(sampled.asked),
        "lines": [_bands(bands) for bands in sampled.lines],
        "rank_correlation": [
            {"input": one.label, "with_set": one.on_set, "with_stress": one.on_stress}
            for one in sampled.influences
        ],
    }


def _bands(bands: Bands) -> dict[str, Any]:
    """Quantiles are of 10, 50 and 90 %."""
    return {
        "value": bands.level.value,
        "samples_each": bands.each,
        "resistances_N": bands.resistances.tolist(),
        "set_m": bands.set.tolist(),
        "peak_compression_Pa": bands.compression.tolist(),
        "peak_tension_Pa": bands.tension.tolist(),
        "share_of_samples_over_a_limit": None if bands.over is None else bands.over.tolist(),
    }
