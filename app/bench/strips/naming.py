"""The names on a strip: of its curves and of the area between a pair, each where it can be read."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from PySide6.QtCore import QRectF
from PySide6.QtGui import QFontMetricsF, QPainter

from app.bench.pictures.curve_labels import Drawn, Heights, Wanted, crosses, place_labels
from app.bench.pictures.lettering import put_on, width_of
from app.bench.strips.contents import Content
from app.look.palette import palette

#: A pair of curves nearer to each other than that, pixels, encloses no area to be named.
CLOSE = 3.0


@dataclass(frozen=True)
class Name:
    """Words that belong to the curve at an index of those drawn."""

    curve: int
    words: str
    hue: str
    of_area: bool = False


class Names:
    """Keeps where the names stood last. They stay there while the curves change, as in a drag, as long as no curve more
    runs through them: names that jump about cannot be read, and to place them anew takes longer than to draw them."""

    def __init__(self) -> None:
        self._of: object = None
        self._boxes: list[QRectF | None] = []
        self._crossed: list[int] = []

    def draw(
        self,
        painter: QPainter,
        content: Content,
        drawn: list[Drawn],
        plot: QRectF,
        taken: Sequence[QRectF],
    ) -> None:
        names, curves = _names(content, drawn)
        height = QFontMetricsF(painter.font()).height()
        widths = [width_of(name.words, painter.font()) for name in names]
        boxes = self._placed(names, widths, curves, plot, height, taken)
        for name, box in zip(names, boxes, strict=True):
            # what names an area and finds no free place in it is left out; it would strike through a curve
            if box is not None and not (name.of_area and any(crosses(curve, box) for curve in drawn[:2])):
                put_on(painter, box.left(), box.center().y(), name.words, name.hue, palette().paper)

    def _placed(
        self,
        names: list[Name],
        widths: list[float],
        curves: list[Drawn],
        plot: QRectF,
        height: float,
        taken: Sequence[QRectF],
    ) -> list[QRectF | None]:
        of, heights = (names, widths, plot, height, tuple(taken)), Heights(curves, plot)
        if of != self._of or not self._stand(names, heights, height):
            wanted = [Wanted(name.curve, width) for name, width in zip(names, widths, strict=True)]
            self._of = of
            self._boxes = place_labels(heights, wanted, plot, height, taken)
            self._crossed = [0 if box is None else heights.through(box) for box in self._boxes]
        return self._boxes

    def _stand(self, names: list[Name], curves: Heights, height: float) -> bool:
        """Whether every name is still beside its curve, with no more curves through it than when it was put there."""
        return all(
            box is None or (curves.through(box) <= crossed and curves.reaches(name.curve, box, height))
            for name, box, crossed in zip(names, self._boxes, self._crossed, strict=True)
        )


def _names(content: Content, drawn: list[Drawn]) -> tuple[list[Name], list[Drawn]]:
    """The names, and the curves that they belong to: those drawn, and one in the middle of the area that is named."""
    # of a pair that is laid over, the first one's name tells for both
    names = [
        Name(i, curve.name, curve.hue)
        for i, curve in enumerate(content.curves)
        if curve.over is None or not curve.faint
    ]
    if not content.filled or len(drawn) < 2:
        return names, drawn
    first, second = drawn[:2]
    other = np.interp(first.x, second.x, second.y)
    apart = np.abs(first.y - other) > 2 * CLOSE
    lower = Drawn(first.x[apart], np.maximum(first.y, other)[apart])
    return [*names, Name(len(drawn), content.filled, palette().soft_ink, of_area=True)], [*drawn, lower]
