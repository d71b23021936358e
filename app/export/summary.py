"""What a run comes to, as JSON for other programs."""

from __future__ import annotations

import json
from math import isfinite
from typing import Any

from app import __version__
from app.units import NO_BREAK, Units
from app.words import AXIAL_CAUTION, LIMIT_CAUTION, MODEL_CAUTION, caution
from solver.answer.cautions import cautions_of
from solver.answer.result import Result


def summary(result: Result, title: str) -> dict[str, Any]:
    """Plain dicts, lists and numbers in SI units; `None` for what the case does not have."""
    found: dict[str, Any] = {
        "title": title,
        "case": result.case.name,
        "program": f"Striketrace {__version__}",
        "finished": result.finished,
        "at_rest": result.at_rest,
        "elements": result.elements,
        "steps": result.steps,
        "time_step_s": result.time_step,
        "duration_s": result.duration,
        "courant_worst": result.courant_worst,
        "energy_residual": result.ledger.residual,
    }
    for sign, peak in (("compression", result.peak_compression), ("tension", result.peak_tension)):
        found[f"peak_{sign}_Pa"] = peak.value
        found[f"peak_{sign}_position_m"] = peak.position
        found[f"peak_{sign}_time_s"] = peak.time
    found |= {
        "set_m": result.set,
        "head_set_m": result.head_set,
        "head_rebound_m": result.head_rebound,
        "max_toe_displacement_m": result.max_toe_displacement,
        "transferred_energy_J": {
            name: {"largest": largest, "final": final}
            for name, (largest, final) in result.transferred_energy.items()
        },
        "ledger_J": result.ledger.final,
        "solve_seconds": result.solve_seconds,
        "warnings": list(result.warnings),
        "cautions": _cautions(result),
        "events": [
            {"kind": event.kind, "position_m": event.position, "time_s": event.time}
            for event in sorted(result.events, key=lambda e: e.time)
        ],
    }
    if result.crack_openings:
        found["crack_openings_m"] = dict(result.crack_openings)
    if result.residual is not None:
        found["set_per_blow_m"] = result.residual.set_per_blow.tolist()
        found["set_repeats"] = result.residual.repeats
    return found


def summary_json(result: Result, title: str) -> str:
    """The file's text; valid JSON always, with `null` for a number that does not exist."""
    return json.dumps(_finite(summary(result, title)), indent=2, ensure_ascii=False, allow_nan=False) + "\n"


def _cautions(result: Result) -> list[str]:
    found = [caution(one, Units()).replace(NO_BREAK, " ") for one in cautions_of(result.case)]
    return [*found, MODEL_CAUTION, LIMIT_CAUTION, AXIAL_CAUTION]


def _finite(node: Any) -> Any:
    if isinstance(node, dict):
        return {key: _finite(value) for key, value in node.items()}
    if isinstance(node, list):
        return [_finite(value) for value in node]
    if isinstance(node, bool | int | str) or node is None:
        return node
    number = float(node)  # numpy's numbers too
    return number if isfinite(number) else None
