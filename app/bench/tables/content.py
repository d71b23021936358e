"""A list of parts as a table, from the same declarations as the forms: a column for each field that any entry has."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from app.bench.forms.part_forms import form_of
from app.bench.forms.spec import CheckSpec, ChoiceSpec, Context, NumberSpec, PointsSpec, Spec, TextSpec
from app.bench.outline.edits import entries_of
from app.unit_text import UnitError, value_of
from app.units import Units

Key = tuple[str, str]
YES, NO = "yes", "no"


@dataclass(frozen=True)
class Column:
    """One column: `key` is the place inside an entry and the kind of field; `spec` the first field found there."""

    key: Key
    heading: str
    unit: str
    spec: Spec


@dataclass(frozen=True)
class Content:
    """`rows[i]` holds the fields of entry `i` by the key of their column; what an entry has not is not in it."""

    list_pointer: str
    columns: tuple[Column, ...]
    rows: tuple[dict[Key, Spec], ...]

    def spec_at(self, row: int, column: int) -> Spec | None:
        """The field of a cell, `None` where the entry has none there."""
        return self.rows[row].get(self.columns[column].key)


def content_of(context: Context, list_pointer: str, units: Units) -> Content:
    """The table of a list of the case, or of the project where the pointer begins with "/"."""
    columns: dict[Key, Column] = {}
    rows = []
    for index in range(len(entries_of(context, list_pointer))):
        entry = f"{list_pointer}/{index}"
        place = context.full(entry)
        fields: dict[Key, Spec] = {}
        before: Key | None = None
        for spec in form_of(context, entry):
            if isinstance(spec, PointsSpec) or (isinstance(spec, ChoiceSpec) and spec.view):
                continue
            key = (spec.pointer.removeprefix(place), type(spec).__name__)
            fields[key] = spec
            if key not in columns:
                unit = units.unit(spec.dimension) if isinstance(spec, NumberSpec) and not spec.whole else ""
                _put_behind(columns, before, Column(key, spec.label, unit, spec))
            before = key
        rows.append(fields)
    return Content(list_pointer, tuple(columns.values()), tuple(rows))


def _put_behind(columns: dict[Key, Column], before: Key | None, column: Column) -> None:
    """Keep the order of the forms: a column that only a later entry has stands behind its neighbour there."""
    ordered = list(columns.values())
    keys = [c.key for c in ordered]
    at = keys.index(before) + 1 if before in keys else len(ordered)
    ordered.insert(at, column)
    columns.clear()
    columns.update({c.key: c for c in ordered})


def text_of(spec: Spec, units: Units, exact: bool = False) -> str:
    """A cell as text: numbers in the unit of their column, choices by their word. `exact` with all digits of numbers
    that are worked out, for pasting back."""
    match spec:
        case NumberSpec(value=None):
            return ""
        case NumberSpec(whole=True):
            return str(int(spec.value or 0))
        case NumberSpec() if exact:
            return f"{float(units.number(spec.value or 0.0, spec.dimension)):.15g}"
        case NumberSpec():
            return units.text(spec.value or 0.0, spec.dimension)
        case TextSpec():
            return spec.value or ""
        case CheckSpec():
            return YES if spec.value else NO
        case ChoiceSpec():
            return next((o.word for o in spec.options if o.key == spec.value), spec.value)
        case _:
            return ""


def value_from(spec: Spec, text: str, units: Units) -> Any:
    """What a text means in a cell: a number in SI, a text, the key of a choice, yes or no.

    Raises `ValueError` with a sentence.
    """
    text = text.strip()
    match spec:
        case NumberSpec(empty=str()) if not text:
            return None
        case NumberSpec(whole=True):
            if not text.isdecimal():
                raise UnitError("A whole number is needed here.")
            return int(text)
        case NumberSpec():
            return value_of(text, spec.dimension, units.unit(spec.dimension))
        case CheckSpec():
            if text.casefold() not in (YES, NO, "1", "0", "true", "false"):
                raise ValueError(f"'{text}' must be {YES} or {NO}.")
            return text.casefold() in (YES, "1", "true")
        case ChoiceSpec():
            wanted = text.casefold()
            for option in spec.options:
                if wanted in (option.word.casefold(), option.key.casefold()):
                    return option.key
            words = ", ".join(f"'{option.word}'" for option in spec.options)
            raise ValueError(f"'{text}' is not among the choices: {words}.")
        case _:
            return text or (None if isinstance(spec, TextSpec) and spec.optional else text)
