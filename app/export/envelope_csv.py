"""The extremes along the member as CSV."""

from __future__ import annotations

from app.export.columns import csv_text
from solver.answer.result import Result

HEADER = ("position_m", "lowest_stress_Pa", "highest_stress_Pa", "max_velocity_m_s", "max_displacement_m")


def envelope_csv(result: Result, *, compression_positive: bool = False) -> str:
    """One row per element. `lowest` stays the most compressive and `highest` the most tensile stress in either sign."""
    sign = -1.0 if compression_positive else 1.0
    of = result.envelope
    return csv_text(
        HEADER,
        (
            of.position,
            sign * of.lowest_stress,
            sign * of.highest_stress,
            of.max_velocity,
            of.max_displacement,
        ),
    )
