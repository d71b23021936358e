"""Line icons, drawn for this program on a grid of 16 by 16, in the colour of the text beside them."""

from __future__ import annotations

from PySide6.QtCore import QByteArray, QRectF, Qt
from PySide6.QtGui import QIcon, QPainter, QPixmap
from PySide6.QtSvg import QSvgRenderer

from app.look.palette import palette

#: Outlines as SVG path data; those after "|" are filled.
SHAPES: dict[str, str] = {
    # parts, in the order in which the blow passes them
    "ram": "M5 2.5h6v7H5z M3 13.5h10",
    "cushion": "M3.5 5.5h9a2.5 2.5 0 0 1 0 5h-9a2.5 2.5 0 0 1 0-5z",
    "cap": "M2.5 12.5v-7h11v7",
    "pile_cushion": "M2.5 12.5v-7h11v7 M5 9.5h6",
    "pulse": "M1.5 12.5h3c1.5 0 1.5-9 3.5-9s2 9 3.5 9h3",
    "history": "M1.5 9h2l1.5-5 2 9 2-7 1.5 4 1-1h3",
    "striker": "M1.5 6h7v4h-7z M10 8h4.5 M12.5 6l2 2-2 2",
    "none": "M3 8h10",
    "segment": "M5.5 1.5h5v13h-5z",
    "taper": "M4.5 1.5h7l-2 13h-3z",
    "ground": "M1.5 4h13 M1.5 8h13 M1.5 12h13",
    "toe": "M5 1.5v8l3 5 3-5v-8",
    "far_end": "M5.5 1.5v9h5v-9 M2 14.5h12",
    "gauge": "M12.5 3v10 M9.5 5.5v5L5 8z",
    "run": "M8 1.5a6.5 6.5 0 1 0 .01 0 M8 4.5V8l2.5 1.5",
    "material": "M8 1.5l6 3.5v6l-6 3.5-6-3.5V5z M2 5l6 3.5L14 5 M8 8.5v6",
    "attachment": "M8 1.5v3 M5 4.5h6v5H5z M8 9.5v2 M4.5 14.5h7 M6 14.5v-3h4v3",
    # actions
    "new": "M3.5 1.5h6l3 3v10h-9z M9.5 1.5v3h3 M8 7v5 M5.5 9.5h5",
    "open": "M1.5 13.5v-10h4.5l1.5 2h7v8z",
    "save": "M8 1.5v8 M5 6.5l3 3 3-3 M2.5 10.5v3.5h11v-3.5",
    "undo": "M5.5 2.5l-3.5 3.5 3.5 3.5 M2 6h7.5a4 4 0 0 1 0 8H6",
    "redo": "M10.5 2.5L14 6l-3.5 3.5 M14 6H6.5a4 4 0 0 0 0 8H10",
    "add": "M8 3v10 M3 8h10",
    "remove": "M3 8h10",
    "up": "M8 13V3 M4 7l4-4 4 4",
    "down": "M8 3v10 M4 9l4 4 4-4",
    "duplicate": "M5.5 5.5h8v8h-8z M10.5 5.5v-3h-8v8h3",
    "split": "M5 1.5h6v5H5z M5 9.5h6v5H5z M2 8h12",
    "table": "M1.5 2.5h13v11h-13z M1.5 6h13 M1.5 9.5h13 M6 2.5v11",
    "unfold": "M6 4l4 4-4 4",
    "fold": "M4 6l4 4 4-4",
    "close": "M4 4l8 8 M12 4l-8 8",
    "more": "|M2.5 8a1.2 1.2 0 1 0 2.4 0a1.2 1.2 0 1 0-2.4 0 M6.8 8a1.2 1.2 0 1 0 2.4 0a1.2 1.2 0 1 0-2.4 0"
    " M11.1 8a1.2 1.2 0 1 0 2.4 0a1.2 1.2 0 1 0-2.4 0",
    "export": "M8 9.5v-8 M5 4.5l3-3 3 3 M2.5 8.5v5.5h11V8.5",
    "report": "M3.5 1.5h9v13h-9z M6 5h4 M6 8h4 M6 11h2.5",
    "look": "M8 2.5a5.5 5.5 0 1 0 .01 0|M8 2.5a5.5 5.5 0 0 1 0 11z",
    "play": "|M4.5 2.5l9 5.5-9 5.5z",
    "pause": "|M4 2.5h3v11H4z M9 2.5h3v11H9z",
    "stop": "|M3.5 3.5h9v9h-9z",
    "step_back": "M10 3.5L5.5 8l4.5 4.5",
    "step_forward": "M6 3.5L10.5 8 6 12.5",
    "to_start": "M12 3.5L7.5 8l4.5 4.5 M4.5 3.5v9",
    # states
    "within": "M3 8.5l3.5 3.5L13 4.5",
    "near": "M8 2v8 M8 12.5v1.5",
    "over": "M4 4l8 8 M12 4l-8 8",
}
STROKE = 'stroke-width="1.25" stroke-linecap="round" stroke-linejoin="round"'
SIZES = (16, 20, 24, 32, 48)


def svg(name: str, colour: str) -> str:
    """The icon as SVG text. Raises `KeyError` for a name that is not drawn."""
    outline, _, filled = SHAPES[name].partition("|")
    drawn = f'<path d="{outline}" fill="none" stroke="{colour}" {STROKE}/>' if outline else ""
    drawn += f'<path d="{filled}" fill="{colour}"/>' if filled else ""
    return f'<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 16 16">{drawn}</svg>'


def icon(name: str, colour: str | None = None) -> QIcon:
    """The icon in a colour, that of text where none is given. Ask again when the palette has changed."""
    made = QIcon()
    for size in SIZES:
        made.addPixmap(pixmap(name, size, colour))
        made.addPixmap(pixmap(name, size, palette().line), QIcon.Mode.Disabled)
    return made


def pixmap(name: str, size: int, colour: str | None = None, ratio: float = 1.0) -> QPixmap:
    """The icon as a picture of `size` device-independent pixels."""
    picture = QPixmap(round(size * ratio), round(size * ratio))
    picture.setDevicePixelRatio(ratio)
    picture.fill(Qt.GlobalColor.transparent)
    painter = QPainter(picture)
    QSvgRenderer(QByteArray(svg(name, colour or palette().ink).encode())).render(
        painter, QRectF(0, 0, size, size)
    )
    painter.end()
    return picture
