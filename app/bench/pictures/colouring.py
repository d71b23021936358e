"""From values to colours: one scale for the x-t diagram and the member, zero at the colour of the paper."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray
from PySide6.QtGui import QImage

from app.bench.field_values import DIMENSIONS, largest_of
from app.bench.pictures.axes import rounded_up
from app.look.colour_maps import map_of
from app.look.palette import Palette
from app.sight import ShownQuantity
from app.units import Units
from solver import Result


def scale_top(result: Result, quantity: ShownQuantity, units: Units) -> float:
    """Magnitude (SI) at both ends of the colour scale: tidy in the unit shown, never below the largest value."""
    largest, dimension = largest_of(result, quantity), DIMENSIONS[quantity]
    one = float(units.number(1.0, dimension, largest))
    return rounded_up(largest * one) / one


def table_of(quantity: ShownQuantity, palette: Palette) -> NDArray[np.uint32]:
    """The colour table as 0xffrrggbb, shape (511,); entry 0 is the lowest number in the sign of the solver."""
    table = map_of(quantity, palette).astype(np.uint32)
    packed = np.uint32(0xFF000000) | table[:, 0] << 16 | table[:, 1] << 8 | table[:, 2]
    return packed.astype(np.uint32)


def entries_of(values: NDArray[np.float32] | NDArray[np.float64], top: float) -> NDArray[np.uint16]:
    """Entry of the table for each value, same shape; beyond the ends of the scale the end colour."""
    half = 255
    scaled = np.rint(values * (half / top)) + half
    return np.clip(scaled, 0, 2 * half).astype(np.uint16)


def image_of(colours: NDArray[np.uint32]) -> QImage:
    """An image of its own from 0xffrrggbb values, shape (height, width)."""
    height, width = colours.shape
    whole = np.ascontiguousarray(colours)
    return QImage(whole.data, width, height, 4 * width, QImage.Format.Format_RGB32).copy()


def columns_under(edges: NDArray[np.float64], places: NDArray[np.float64]) -> NDArray[np.int64]:
    """Column of the field in which each place (m) lies, same shape; -1 where there is none."""
    found = np.searchsorted(edges, places, side="right") - 1
    outside = (places < edges[0]) | (places > edges[-1])
    return np.where(outside, -1, np.minimum(found, len(edges) - 2))
