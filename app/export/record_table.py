"""Gauge records as one table with its particulars: what every format writes."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import datetime

import numpy as np
from numpy.typing import NDArray

from app import __version__
from app.export.plain_text import all_different, harmless
from app.export.record_choices import COLUMNS, RecordChoices
from app.export.sampling import filter_words, resampled, sample_times
from app.unit_text import factor_of
from app.units import NO_BREAK, Units
from app.words import AXIAL_CAUTION, LIMIT_CAUTION, MODEL_CAUTION, caution
from solver.answer.cautions import cautions_of
from solver.answer.result import Array, GaugeRecord, Result
from solver.model.quantity import SI_UNITS


@dataclass(frozen=True, eq=False)
class RecordColumn:
    """One column: the gauge's `name` ("" for time), what it is, its unit as written, its `heading`, its values."""

    gauge: str
    quantity: str
    unit: str
    heading: str
    values: Array


@dataclass(frozen=True, eq=False)
class RecordTable:
    """Columns of one length, the first one time, and particulars as pairs of word and text."""

    columns: tuple[RecordColumn, ...]
    particulars: tuple[tuple[str, str], ...]
    date: datetime


@dataclass(frozen=True)
class Origin:
    """What a record belongs to: the project's title, the hash of the input, the date, and the project's units."""

    title: str
    hash: str
    date: datetime
    units: Units


def record_table(result: Result, origin: Origin, choices: RecordChoices) -> RecordTable:
    """The table of one case. Raises `ValueError` with a sentence for choices that this case cannot fulfil."""
    gauges = [g for g in result.gauges.values() if choices.gauges is None or g.name in choices.gauges]
    if not gauges:
        raise ValueError(f"Case '{result.case.name}' has none of the gauges that were chosen.")
    times, kept = _times(gauges[0], result, choices)
    unit, factor = _unit("time", choices, origin)
    columns = [RecordColumn("", "time", unit, f"time_{_slug(unit)}", (times - choices.zero) / factor)]
    names = all_different(harmless(g.name) for g in gauges)
    for gauge, name in zip(gauges, names, strict=True):
        for key in choices.columns:
            columns.append(_column(gauge, name, key, times, kept, choices, origin))
    return RecordTable(tuple(columns), tuple(_particulars(result, gauges, origin, choices)), origin.date)


def _times(gauge: GaugeRecord, result: Result, choices: RecordChoices) -> tuple[Array, NDArray[np.bool_]]:
    """Times to write, s after the blow, and which of all samples they are."""
    low = -np.inf if choices.start is None else choices.start
    high = np.inf if choices.end is None else choices.end
    every = gauge.time
    if choices.rate is not None:
        every = sample_times(len(gauge.force), gauge.time_step, choices.rate)
    kept = (every >= low - 1e-12) & (every <= high + 1e-12)
    if not kept.any():
        raise ValueError(
            f"The time window holds no sample of case '{result.case.name}', which runs from 0 to "
            f"{result.duration:g} s after the blow."
        )
    return every[kept], kept


def _column(
    gauge: GaugeRecord,
    name: str,
    key: str,
    times: Array,
    kept: NDArray[np.bool_],
    choices: RecordChoices,
    origin: Origin,
) -> RecordColumn:
    column = COLUMNS[key]
    values = getattr(gauge, key)
    if choices.rate is None:
        values = values[kept]
    else:
        values = resampled(np.asarray(values), gauge.time_step, times, choices.rate)
    unit, factor = _unit(column.dimension, choices, origin)
    sign = -1.0 if column.signed and choices.compression_positive else 1.0
    slug = _slug(unit)
    heading = f"{name}.{key}_{slug}" if slug else f"{name}.{key}"
    return RecordColumn(name, key, unit, heading, np.asarray(values) * (sign / factor) + 0.0)


def _unit(dimension: str, choices: RecordChoices, origin: Origin) -> tuple[str, float]:
    """Unit as written and its size in SI."""
    if choices.units == "si":
        return SI_UNITS[dimension].replace("^2", "²").replace("*", "·"), 1.0
    unit = (origin.units if choices.units == "project" else Units(choices.units)).unit(dimension)
    return unit, float(factor_of(unit, dimension))


def _slug(unit: str) -> str:
    """A unit in letters that need no quotes: "m_s2", "microstrain"."""
    written = unit.replace("µε", "microstrain").replace("µ", "u").replace("²", "2").replace("³", "3")
    return "".join(c if c.isalnum() else "_" for c in written).strip("_")


def _particulars(
    result: Result, gauges: list[GaugeRecord], origin: Origin, choices: RecordChoices
) -> Iterator[tuple[str, str]]:
    positive, negative = (
        ("compression", "tension") if choices.compression_positive else ("tension", "compression")
    )
    down, up = ("+", "−") if choices.compression_positive else ("−", "+")
    yield "title", origin.title
    yield "case", result.case.name
    yield "program", f"Striketrace {__version__}"
    yield "input", f"SHA-256 {origin.hash}"
    yield "date", origin.date.isoformat(timespec="seconds")
    used = dict.fromkeys(("time", *(COLUMNS[key].dimension for key in choices.columns)))
    words = ", ".join(f"{d.replace('_', ' ')} {_unit(d, choices, origin)[0] or '1'}" for d in used)
    yield "units", f"{words.replace('small length', 'displacement')}"
    yield "sign", f"{positive} positive, {negative} negative; motion positive towards the far end"
    yield "waves", f"forces, down_wave = (F {down} Z v)/2, up_wave = (F {up} Z v)/2; force is their sum"
    yield "sampling", _sampling(result, choices)
    yield "time zero", f"{choices.zero:g} s after the beginning of the run (the blow)"
    yield "elements", str(result.elements)
    yield "energy that does not close", f"{result.ledger.residual:.3g} of the largest energy"
    if result.case.run.gravity:
        yield "gravity", "forces include the static force at rest before the blow"
    if not result.finished:
        yield "unfinished", "the run was stopped before its end"
    for gauge in gauges:
        place = "" if gauge.on == "member" else f" on the {gauge.on}"
        yield (
            "gauge",
            f"{gauge.name}{place} at {gauge.position:g} m, area {gauge.area:.6g} m², "
            f"impedance Z {gauge.impedance:.6g} N·s/m",
        )
    for warning in result.warnings:
        yield "warning", warning
    for one in cautions_of(result.case):
        yield "caution", caution(one, origin.units).replace(NO_BREAK, " ")
    yield "caution", f"{MODEL_CAUTION} {LIMIT_CAUTION} {AXIAL_CAUTION}"


def _sampling(result: Result, choices: RecordChoices) -> str:
    own = f"{result.time_step:.9g} s"
    if choices.rate is None:
        return f"every step of the solver, {own}, {1 / result.time_step:.6g} Hz"
    return f"{choices.rate:g} Hz from steps of {own}; {filter_words(choices.rate)}"
