"""What a number in the project means: declared once beside the field, used by everything else.

From one declaration come the check of a value and its message, the row of a form with its tooltip, the
column of a table, the unit shown, and the key in the file.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Annotated, Any

from pydantic import BaseModel, ConfigDict, Field

#: SI unit of each dimension: the unit of the file, of the solver and of the command line.
SI_UNITS = {
    "length": "m",
    "small_length": "m",
    "area": "m^2",
    "volume": "m^3",
    "mass": "kg",
    "time": "s",
    "velocity": "m/s",
    "acceleration": "m/s^2",
    "force": "N",
    "stress": "Pa",
    "modulus": "Pa",
    "unit_resistance": "Pa",
    "strain": "",
    "energy": "J",
    "density": "kg/m^3",
    "stiffness": "N/m",
    "impedance": "N*s/m",
    "smith_damping": "s/m",
    "viscosity": "Pa*s",
    "none": "",
}


@dataclass(frozen=True)
class Quantity:
    """Meaning of one number: its dimension (a key of `SI_UNITS`), the words for it, and where they come from."""

    dimension: str
    label: str
    tells: str = ""
    source: str = ""

    @property
    def unit(self) -> str:
        """SI unit as text, empty for a pure number."""
        return SI_UNITS[self.dimension]


@dataclass(frozen=True)
class Bounds:
    """Limits of a number as declared; `None` where there is none."""

    above: float | None = None
    at_least: float | None = None
    below: float | None = None
    at_most: float | None = None


class Described(BaseModel):
    """Base of everything a person describes: frozen, and an unknown key is an error."""

    model_config = ConfigDict(frozen=True, extra="forbid")


Number = Annotated[float, Field(strict=True, allow_inf_nan=False)]
Positive = Annotated[float, Field(strict=True, allow_inf_nan=False, gt=0)]
NotNegative = Annotated[float, Field(strict=True, allow_inf_nan=False, ge=0)]
Fraction = Annotated[float, Field(strict=True, allow_inf_nan=False, ge=0, le=1)]
PositiveFraction = Annotated[float, Field(strict=True, allow_inf_nan=False, gt=0, le=1)]
Name = Annotated[str, Field(strict=True, min_length=1, max_length=300)]


def quantity_of(model: type[BaseModel], field: str) -> Quantity | None:
    """The declaration beside a field, or `None` for a field that is no quantity."""
    return next((m for m in _metadata(model, field) if isinstance(m, Quantity)), None)


def bounds_of(model: type[BaseModel], field: str) -> Bounds:
    """The limits declared for a numeric field."""
    found: dict[str, Any] = {}
    for item in _metadata(model, field):
        for attribute, name in (("gt", "above"), ("ge", "at_least"), ("lt", "below"), ("le", "at_most")):
            value = getattr(item, attribute, None)
            if value is not None:
                found[name] = float(value)
    return Bounds(**found)


def _metadata(model: type[BaseModel], field: str) -> list[Any]:
    """Metadata of a field, also where it sits inside an optional (`Annotated[...] | None`)."""
    info = model.model_fields[field]
    items = list(info.metadata)
    pending = [info.annotation]
    while pending:
        annotation = pending.pop()
        for item in getattr(annotation, "__metadata__", ()):
            items.append(item)
            items.extend(getattr(item, "metadata", ()))
        pending.extend(getattr(annotation, "__args__", ()))
    return items
