"""The options of `records` on the command line."""

from __future__ import annotations

import argparse
from datetime import datetime
from math import isfinite
from pathlib import Path

from app.export.record_choices import COLUMNS, ENDINGS, RecordChoices


def records_parser() -> argparse.ArgumentParser:
    """Arguments after the word `records`."""
    parser = argparse.ArgumentParser(
        prog="striketrace records",
        description="Solve the cases of a project and write the records of their gauges, a file a case.",
    )
    add = parser.add_argument
    add("file", metavar="FILE.strike", type=Path)
    add("--out", metavar="DIR", type=Path, required=True, help="folder for the records")
    add("--case", metavar="NAME", action="append", help="this case only (may be given again)")
    add("--gauge", metavar="NAME", action="append", help="this gauge only (may be given again)")
    add("--columns", metavar="A,B", type=_columns, default=tuple(COLUMNS), help=", ".join(COLUMNS))
    add("--format", choices=list(ENDINGS), action="append", help="default csv (may be given again)")
    add("--units", choices=("si", "metric", "us", "project"), default="si")
    add("--compression-positive", action="store_true", help="write compression as positive")
    add("--rate", metavar="HZ", type=positive, help="samples a second, filtered; default every step")
    add("--from", metavar="S", dest="start", type=number, help="begin of the window, s after the blow")
    add("--to", metavar="S", dest="end", type=number, help="end of the window, s after the blow")
    add("--zero", metavar="S", type=number, default=0.0, help="moment that is written as time 0")
    add("--digits", metavar="N", type=_digits, help="digits that count; default all")
    add("--decimal-comma", action="store_true", help="comma for the point, semicolon between columns")
    add("--bom", action="store_true", help="byte order mark, so that spreadsheets see UTF-8")
    add("--date", metavar="DATE", type=date_of, help="date to write, as 2026-12-01 or 2026-12-01T08:30:00")
    add("--quiet", action="store_true", help="say nothing but errors")
    return parser


def run_records(given: argparse.Namespace) -> int:
    """Write what the arguments ask for; returns the exit status."""
    from app.export.records_command import write_records_of

    choices = RecordChoices(
        cases=tuple(given.case) if given.case else None,
        gauges=tuple(given.gauge) if given.gauge else None,
        columns=given.columns,
        units=given.units,
        compression_positive=given.compression_positive,
        rate=given.rate,
        start=given.start,
        end=given.end,
        zero=given.zero,
        digits=given.digits,
        decimal_comma=given.decimal_comma,
        byte_order_mark=given.bom,
        formats=tuple(dict.fromkeys(given.format or ["csv"])),
    )
    return write_records_of(given.file, given.out, choices, given.date, None if given.quiet else print)


def _columns(text: str) -> tuple[str, ...]:
    names = tuple(dict.fromkeys(name.strip() for name in text.split(",") if name.strip()))
    unknown = [name for name in names if name not in COLUMNS]
    if unknown or not names:
        raise argparse.ArgumentTypeError(
            f"'{', '.join(unknown) or text}' is no column (there are: {', '.join(COLUMNS)})"
        )
    return names


def number(text: str) -> float:
    """A finite number, for argparse."""
    try:
        value = float(text)
    except ValueError:
        value = float("nan")
    if not isfinite(value):
        raise argparse.ArgumentTypeError(f"'{text}' is no number")
    return value


def positive(text: str) -> float:
    """A finite number above 0, for argparse."""
    value = number(text)
    if value <= 0:
        raise argparse.ArgumentTypeError(f"'{text}' must be above 0")
    return value


def _digits(text: str) -> int:
    if not text.isdecimal() or not 1 <= int(text) <= 17:
        raise argparse.ArgumentTypeError(f"'{text}' is no number of digits: give 1 to 17")
    return int(text)


def date_of(text: str) -> datetime:
    """A date, or date and time, as ISO 8601 writes them, for argparse."""
    try:
        return datetime.fromisoformat(text)
    except ValueError:
        raise argparse.ArgumentTypeError(
            f"'{text}' is no date: write it as 2026-12-01 or 2026-12-01T08:30:00"
        ) from None
