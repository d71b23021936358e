"""A study of depths as files: CSV and JSON in SI units. Imports no Qt."""

from __future__ import annotations

import csv
import io
from math import isfinite
from typing import Any

from app import __version__
from app.words import LIMIT_CAUTION, MODEL_CAUTION
from solver import Case
from solver.studies.depth import REFUSAL, DepthPoint, Depths

HEAD = (
    "penetration_m",
    "shaft_resistance_N",
    "toe_resistance_N",
    "set_m",
    "blows_from_first_depth",
    "driving_time_s",
    "peak_compression_Pa",
    "peak_tension_Pa",
    "largest_share_of_limit",
    "share_position_m",
    "passed_only_after_ram_struck_again",
    "refuses",
    "problem",
)


def depth_csv(depths: Depths, case: Case, title: str) -> str:
    """One row a depth; empty where there is no value (no blows count where the member practically does not move)."""
    out = io.StringIO()
    for line in (
        f"Down to depth, {' '.join(case.name.split())}, project {' '.join(title.split())}",
        f"Striketrace {__version__}, SI units, stresses are magnitudes, depths below the surface of the ground",
        f"refuses: the set is below {REFUSAL:g} m",
        f"{MODEL_CAUTION} {LIMIT_CAUTION}",
    ):
        out.write(f"# {line}\n")
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow(HEAD)
    for row in _rows(depths):
        writer.writerow(["" if v is None else str(v).lower() if isinstance(v, bool) else v for v in row])
    return out.getvalue()


def depth_tree(depths: Depths) -> dict[str, Any]:
    """For JSON: the points, and the first depths that matter."""
    refusal, over = depths.first_refusal, depths.first_over
    return {
        "points": [dict(zip(HEAD, row, strict=True)) for row in _rows(depths)],
        "refuses_below_set_m": REFUSAL,
        "first_refusal_m": None if refusal is None else refusal.penetration,
        "first_limit_passed_m": None if over is None else over.penetration,
    }


def _rows(depths: Depths) -> list[tuple[Any, ...]]:
    counted = zip(depths.points, depths.blows, depths.seconds, strict=True)
    return [_row(point, blows, seconds) for point, blows, seconds in counted]


def _row(point: DepthPoint, blows: float, seconds: float) -> tuple[Any, ...]:
    cell = point.cell
    return (
        point.penetration,
        point.shaft,
        point.toe,
        cell.set,
        blows if isfinite(blows) else None,
        seconds if isfinite(seconds) else None,
        cell.compression.peak.value if cell.compression else None,
        cell.tension.peak.value if cell.tension else None,
        cell.share,
        cell.worst[1].position if cell.worst else None,
        cell.again_only,
        point.refuses,
        cell.problem or None,
    )
