"""The records of all gauges of a case as one CSV file, with a block of comments that says what it is."""

from __future__ import annotations

from collections.abc import Iterator
from datetime import datetime

from app import __version__
from app.export.columns import csv_text, one_line
from app.words import AXIAL_CAUTION, LIMIT_CAUTION, MODEL_CAUTION
from solver.answer.result import Array, GaugeRecord, Result


def gauge_csv(
    result: Result, title: str, *, compression_positive: bool = False, date: datetime | None = None
) -> str:
    """The file's text: comment lines beginning with "#", one header row, SI columns, one row per recorded time.

    Tension is positive in force, stress, strain and the waves (which are forces), or compression where asked for.
    """
    sign = -1.0 if compression_positive else 1.0
    header: list[str] = ["time_s"]
    columns: list[Array] = []
    for gauge in result.gauges.values():
        if not columns:
            columns.append(gauge.time)
        for name, values in _columns(gauge, sign):
            header.append(f"{gauge.name}.{name}")
            columns.append(values)
    block = "".join(f"# {one_line(line)}\n" for line in _about(result, title, compression_positive, date))
    return block + csv_text(header, columns or [result.ledger.time[:0]])


def _columns(gauge: GaugeRecord, sign: float) -> Iterator[tuple[str, Array]]:
    yield "force_N", sign * gauge.force
    yield "stress_Pa", sign * gauge.stress
    yield "strain", sign * gauge.strain
    yield "velocity_m_s", gauge.velocity
    yield "displacement_m", gauge.displacement
    yield "acceleration_m_s2", gauge.acceleration
    yield "down_wave_N", sign * gauge.down_wave
    yield "up_wave_N", sign * gauge.up_wave


def _about(result: Result, title: str, compression_positive: bool, date: datetime | None) -> list[str]:
    positive, negative = ("compression", "tension") if compression_positive else ("tension", "compression")
    waves = (
        "down_wave = (F + Z v)/2, up_wave = (F - Z v)/2"
        if compression_positive
        else ("down_wave = (F - Z v)/2, up_wave = (F + Z v)/2")
    )
    lines = [
        f"title: {title}",
        f"case: {result.case.name}",
        f"program: Striketrace {__version__}",
        f"date: {(date or datetime.now().astimezone()).isoformat(timespec='seconds')}",
        "units: SI (s, N, Pa, m, m/s, m/s2); strain is a pure number",
        f"sign: {positive} positive, {negative} negative; motion positive towards the far end",
        f"waves: forces, {waves}; force = down_wave + up_wave",
        f"elements: {result.elements}",
        f"time step: {result.time_step!r} s, {result.steps} steps",
        f"energy that does not close: {result.ledger.residual!r} of the largest energy",
    ]
    if result.case.run.gravity:
        lines.append("gravity: forces include the static force at rest before the blow")
    if not result.finished:
        lines.append("unfinished: the run was stopped before its end")
    for gauge in result.gauges.values():
        place = "" if gauge.on == "member" else f" on the {gauge.on}"
        lines.append(
            f"gauge: {gauge.name}{place} at {gauge.position!r} m, area {gauge.area!r} m2, "
            f"impedance {gauge.impedance!r} N s/m"
        )
    lines += [f"warning: {text}" for text in result.warnings]
    lines.append(f"caution: {MODEL_CAUTION} {LIMIT_CAUTION} {AXIAL_CAUTION}")
    return lines
