"""What a person chooses about gauge records: which, in what units and sign, how often, and how written."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import asdict, dataclass, fields
from typing import Any, Literal, get_args

System = Literal["si", "metric", "us", "project"]
Format = Literal["csv", "xlsx", "hdf5"]


@dataclass(frozen=True)
class Column:
    """One quantity of a gauge: its words, its dimension (a key of `SI_UNITS`), and whether the sign turns it."""

    word: str
    dimension: str
    signed: bool = False


COLUMNS: dict[str, Column] = {
    "force": Column("force", "force", signed=True),
    "stress": Column("stress", "stress", signed=True),
    "strain": Column("strain", "strain", signed=True),
    "velocity": Column("velocity", "velocity"),
    "displacement": Column("displacement", "small_length"),
    "acceleration": Column("acceleration", "acceleration"),
    "down_wave": Column("down-going wave", "force", signed=True),
    "up_wave": Column("up-going wave", "force", signed=True),
    "transferred_energy": Column("energy passed", "energy"),
}
ENDINGS: dict[Format, str] = {"csv": ".csv", "xlsx": ".xlsx", "hdf5": ".h5"}


@dataclass(frozen=True)
class RecordChoices:
    """`cases` and `gauges` by name, `None` = all. `rate`: samples per second, `None` = every step of the solver.

    `start` and `end` (s after the blow, `None` = all) cut out a window; `zero` (s after the blow) is the moment that
    is written as 0. `digits` that count, `None` = so many that the same number is read back.
    """

    cases: tuple[str, ...] | None = None
    gauges: tuple[str, ...] | None = None
    columns: tuple[str, ...] = tuple(COLUMNS)
    units: System = "si"
    compression_positive: bool = False
    rate: float | None = None
    start: float | None = None
    end: float | None = None
    zero: float = 0.0
    digits: int | None = None
    decimal_comma: bool = False
    byte_order_mark: bool = False
    formats: tuple[Format, ...] = ("csv",)

    def to_tree(self) -> dict[str, Any]:
        """Plain values, to be kept as JSON."""
        return {key: list(v) if isinstance(v, tuple) else v for key, v in asdict(self).items()}


def choices_from_tree(tree: Any) -> RecordChoices:
    """Choices as kept; what cannot be understood is left at its usual value, for a setting may be old."""
    if not isinstance(tree, Mapping):
        return RecordChoices()
    kept: dict[str, Any] = {}
    for field in fields(RecordChoices):
        if field.name in tree and _fits(field.name, tree[field.name]):
            value = tree[field.name]
            kept[field.name] = tuple(value) if isinstance(value, list) else value
    return RecordChoices(**kept)


def _fits(name: str, value: Any) -> bool:
    if name in ("cases", "gauges"):
        return value is None or (isinstance(value, list) and all(isinstance(v, str) for v in value))
    if name == "columns":
        return isinstance(value, list) and bool(value) and all(v in COLUMNS for v in value)
    if name == "formats":
        return isinstance(value, list) and bool(value) and all(v in ENDINGS for v in value)
    if name == "units":
        return value in get_args(System)
    if name in ("compression_positive", "decimal_comma", "byte_order_mark"):
        return isinstance(value, bool)
    if name == "digits":
        return value is None or (type(value) is int and 1 <= value <= 17)
    number = isinstance(value, int | float) and not isinstance(value, bool)
    return (value is None and name != "zero") or number
