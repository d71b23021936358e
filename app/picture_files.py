"""What is drawn on the screen as a file of its own: PNG at the resolution wanted, SVG and PDF with real text."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import asdict, dataclass
from typing import Any

from PySide6.QtCore import QBuffer, QByteArray, QIODevice, QMarginsF, QMimeData, QRectF, QSize, QSizeF
from PySide6.QtGui import QGuiApplication, QImage, QPageSize, QPainter, QPdfWriter
from PySide6.QtSvg import QSvgGenerator

from app.look.palette import in_print

FORMATS = {"png": "PNG", "svg": "SVG", "pdf": "PDF"}
MM_PER_INCH = 25.4
#: Bounds of what can be chosen.
WIDTHS, SCALES, DPIS = (20.0, 1000.0), (0.01, 10.0), (50, 1200)
#: More pixels than this are no picture any more.
MOST_PIXELS = 100_000_000


@dataclass(frozen=True)
class Drawing:
    """Something that can be painted at its own size, in pixels of the screen."""

    name: str
    width: float
    height: float
    paint: Callable[[QPainter], None]

    def height_at(self, width: float) -> float:
        """Its height where it is so wide, in the same unit."""
        return width * self.height / self.width


@dataclass(frozen=True)
class PictureChoices:
    """`scale`: mm on paper for a pixel of the screen, so that letters are as large in every picture. `dpi` counts for
    PNG alone. `print_colours`: dark on white paper, whatever the screen's look is."""

    format: str = "png"
    scale: float = MM_PER_INCH / 96
    dpi: int = 300
    print_colours: bool = True

    def to_tree(self) -> dict[str, Any]:
        return asdict(self)

    def width_of(self, drawing: Drawing) -> float:
        """On paper, in mm."""
        return min(max(self.scale * drawing.width, WIDTHS[0]), WIDTHS[1])

    def pixels(self, drawing: Drawing) -> tuple[int, int]:
        """Of a PNG."""
        wide = round(self.width_of(drawing) / MM_PER_INCH * self.dpi)
        return wide, max(round(drawing.height_at(wide)), 1)


def choices_from_tree(tree: Any) -> PictureChoices:
    """The choices that were kept; what cannot be understood is left at its usual value."""
    usual = PictureChoices()
    if not isinstance(tree, Mapping):
        return usual
    scale, dpi = tree.get("scale"), tree.get("dpi")
    return PictureChoices(
        tree["format"] if tree.get("format") in FORMATS else usual.format,
        float(scale) if isinstance(scale, int | float) and SCALES[0] <= scale <= SCALES[1] else usual.scale,
        dpi if isinstance(dpi, int) and DPIS[0] <= dpi <= DPIS[1] else usual.dpi,
        tree.get("print_colours") is not False,
    )


def picture_file(drawing: Drawing, choices: PictureChoices) -> bytes:
    """The file's bytes. Raises `ValueError` with a sentence where a PNG would be too large."""
    writers = {"png": _png, "svg": _svg, "pdf": _pdf}
    with in_print(choices.print_colours):
        return writers[choices.format](drawing, choices)


def copy_picture(drawing: Drawing, choices: PictureChoices) -> None:
    """Onto the clipboard, as pixels and as SVG for programs that take it. Raises `ValueError`."""
    with in_print(choices.print_colours):
        data = QMimeData()
        data.setImageData(_image(drawing, choices))
        data.setData("image/svg+xml", QByteArray(_svg(drawing, choices)))
    QGuiApplication.clipboard().setMimeData(data)


def _image(drawing: Drawing, choices: PictureChoices) -> QImage:
    wide, high = choices.pixels(drawing)
    if wide * high > MOST_PIXELS:
        raise ValueError(f"{wide} × {high} pixels are too many: choose a smaller size or resolution.")
    image = QImage(wide, high, QImage.Format.Format_RGB32)
    scale = wide / drawing.width
    image.setDevicePixelRatio(scale)  # so that fields of colour are drawn as finely as the paper shows them
    painter = QPainter(image)
    drawing.paint(painter)
    painter.end()
    image.setDevicePixelRatio(1.0)
    per_metre = round(choices.dpi / MM_PER_INCH * 1000)
    image.setDotsPerMeterX(per_metre)
    image.setDotsPerMeterY(per_metre)
    return image


def _png(drawing: Drawing, choices: PictureChoices) -> bytes:
    image = _image(drawing, choices)
    # the stubs want bytes for the format, the call itself wants text
    return _through_buffer(lambda buffer: image.save(buffer, "PNG"))  # type: ignore[call-overload]


def _svg(drawing: Drawing, choices: PictureChoices) -> bytes:
    def write(buffer: QBuffer) -> None:
        generator = QSvgGenerator()
        generator.setOutputDevice(buffer)
        generator.setResolution(_screen_dpi())
        wide = choices.width_of(drawing) / MM_PER_INCH * _screen_dpi()
        generator.setSize(QSize(round(wide), round(drawing.height_at(wide))))
        generator.setViewBox(QRectF(0, 0, drawing.width, drawing.height))
        generator.setTitle(drawing.name)
        painter = QPainter(generator)
        drawing.paint(painter)
        painter.end()

    return _through_buffer(write)


def _pdf(drawing: Drawing, choices: PictureChoices) -> bytes:
    def write(buffer: QBuffer) -> None:
        writer = QPdfWriter(buffer)
        size = QSizeF(choices.width_of(drawing), drawing.height_at(choices.width_of(drawing)))
        writer.setPageSize(
            QPageSize(size, QPageSize.Unit.Millimeter, "", QPageSize.SizeMatchPolicy.ExactMatch)
        )
        writer.setPageMargins(QMarginsF(0, 0, 0, 0))
        writer.setResolution(_screen_dpi())
        writer.setTitle(drawing.name)
        writer.setCreator("Striketrace")
        painter = QPainter(writer)
        scale = choices.width_of(drawing) / MM_PER_INCH * _screen_dpi() / drawing.width
        painter.scale(scale, scale)
        drawing.paint(painter)
        painter.end()

    return _through_buffer(write)


def _screen_dpi() -> int:
    """What fonts in points are drawn with on the screen: with another one they would not fit their places."""
    return round(QGuiApplication.primaryScreen().logicalDotsPerInchY())


def _through_buffer(write: Callable[[QBuffer], object]) -> bytes:
    data = QByteArray()
    buffer = QBuffer(data)
    buffer.open(QIODevice.OpenModeFlag.WriteOnly)
    write(buffer)
    buffer.close()
    return bytes(data.data())
