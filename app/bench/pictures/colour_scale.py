"""The scale of the colours in the heading of the x-t diagram: as much of it as there is room for."""

from __future__ import annotations

from collections.abc import Iterator

from PySide6.QtCore import QRectF
from PySide6.QtGui import QFontMetricsF, QPainter

from app.bench.field_values import DIMENSIONS
from app.bench.pictures.colouring import image_of, scale_top, table_of
from app.bench.pictures.lettering import RIGHT, put, width_of
from app.look.palette import palette
from app.sight import ShownQuantity
from app.units import Units, rounded
from solver import Result

#: What the two ends of the scale mean, most negative in the solver's sign first; in words and in signs.
ENDS = {
    "stress": (("compression", "tension"), ("−", "")),
    "force": (("compression", "tension"), ("−", "")),
    "velocity": (("↑ to the struck end", "↓ to the far end"), ("↑", "↓")),
    "displacement": (("↑ to the struck end", "↓ to the far end"), ("↑", "↓")),
}
#: Least length of the bar, pixels, and its usual one in lines of text; gap around it.
SHORT, USUAL, GAP = 30.0, 6.0, 6.0


def draw_scale(
    painter: QPainter,
    left: float,
    right: float,
    y: float,
    result: Result,
    quantity: ShownQuantity,
    units: Units,
) -> None:
    """The bar with the number and the meaning of each end, between two pixels."""
    flip = quantity in ("stress", "force") and units.sign < 0
    line = QFontMetricsF(painter.font()).height()
    for first, last in _texts(result, quantity, units, flip):
        words = width_of(first, painter.font()) + width_of(last, painter.font()) + 2 * GAP
        bar = min(right - left - words, USUAL * line)
        if bar >= SHORT:
            break
    else:
        first, bar = "", 0.0
    x = put(painter, right, y, last, palette().soft_ink, RIGHT).left() - GAP
    if bar:
        # the end that the project calls positive stands on the right, as it does in the profile
        table = table_of(quantity, palette())[None, :: -1 if flip else 1]
        painter.drawImage(QRectF(x - bar, y - 0.275 * line, bar, 0.55 * line), image_of(table))
        put(painter, x - bar - GAP, y, first, palette().soft_ink, RIGHT)


def _texts(result: Result, quantity: ShownQuantity, units: Units, flip: bool) -> Iterator[tuple[str, str]]:
    """What stands at either end: in words, in signs, and the far one alone."""
    top, dimension = scale_top(result, quantity, units), DIMENSIONS[quantity]
    number = rounded(float(units.number(top, dimension, top)))
    with_unit = f"{number} {units.unit(dimension, top)}"
    (low, high), signs = ENDS[quantity]
    first, last = (high, low) if flip else (low, high)
    yield f"{first} {number}", f"{with_unit} {last}"
    yield f"{signs[0]} {number}", f"{with_unit} {signs[1]}".strip()
    yield "", f"{with_unit} {signs[1]}".strip()
