"""Pictures as files of their own: right in size, with all their axes, text as text, dark on white paper when asked."""

from __future__ import annotations

import pypdfium2
import pytest
from PySide6.QtGui import QGuiApplication, QImage

from app.bench.pictures.plot_export import drawing_of
from app.look.colours import PRINT
from app.picture_dialog import PictureDialog
from app.picture_files import MM_PER_INCH, PictureChoices, picture_file
from app.settings import Settings


@pytest.fixture
def the(open_bench, pile):
    return open_bench(pile)


def words_of(pdf: bytes) -> str:
    document = pypdfium2.PdfDocument(pdf)
    text = document[0].get_textpage().get_text_range()
    document.close()
    return text


def pictures_of(bench):
    return bench.member, bench.xt, bench.profile, *bench.strips.shown()


def test_a_png_has_the_pixels_of_its_size_and_says_its_resolution(the):
    for picture in pictures_of(the.bench):
        drawing = drawing_of(picture)
        choices = PictureChoices("png", dpi=200)
        image = QImage.fromData(picture_file(drawing, choices))
        assert image.width() == pytest.approx(choices.width_of(drawing) / MM_PER_INCH * 200, abs=1)
        assert image.height() / image.width() == pytest.approx(drawing.height / drawing.width, abs=0.01)
        assert image.dotsPerMeterX() == pytest.approx(200 / 0.0254, rel=1e-3)
        assert image.pixelColor(2, image.height() - 3).name() == PRINT.paper


def test_the_x_t_diagram_alone_has_its_axes_its_scale_and_text_that_can_be_read(the):
    drawing = drawing_of(the.bench.xt)
    text = words_of(picture_file(drawing, PictureChoices("pdf")))
    for words in ("Stress through time", "Time, ms", "Distance, m", "compression", "tension"):
        assert words in text
    svg = picture_file(drawing, PictureChoices("svg")).decode()
    assert svg.count("<text") > 8
    assert f'width="{PictureChoices().width_of(drawing):.0f}' in svg


def test_a_word_with_a_rim_is_written_once(the):
    text = words_of(picture_file(drawing_of(the.bench.member), PictureChoices("pdf")))
    assert text.count("Head") == 1


def test_the_screen_keeps_its_look_and_print_has_its_own(the, qapp):
    qapp.setProperty("striketrace_look", "dark")
    try:
        papers = [
            QImage.fromData(picture_file(drawing_of(the.bench.xt), PictureChoices(print_colours=on)))
            for on in (True, False)
        ]
    finally:
        qapp.setProperty("striketrace_look", "light")
    assert papers[0].pixelColor(1, 1).lightness() == 255
    assert papers[1].pixelColor(1, 1).lightness() < 60


def test_the_dialog_keeps_its_choices_and_tells_why_a_file_was_not_saved(the, qtbot, tmp_path, monkeypatch):
    settings = Settings(tmp_path / "settings")
    dialog = PictureDialog(drawing_of(the.bench.xt), settings)
    qtbot.addWidget(dialog)
    dialog.dpi.setValue(96)
    dialog.width_mm.setValue(120)
    assert "120 ×" in dialog.state.text()
    assert dialog.save_to(tmp_path / "wave.png")
    assert QImage(str(tmp_path / "wave.png")).width() == pytest.approx(120 / MM_PER_INCH * 96, abs=1)

    dialog.copy_it()
    assert QGuiApplication.clipboard().image().width() == pytest.approx(120 / MM_PER_INCH * 96, abs=1)

    again = PictureDialog(drawing_of(the.bench.xt), settings)
    qtbot.addWidget(again)
    assert (again.dpi.value(), again.width_mm.value()) == (96, 120)

    def locked(*_names):
        raise PermissionError(13, "The process cannot access the file")

    monkeypatch.setattr("os.replace", locked)
    before = sorted(tmp_path.iterdir())
    assert not again.save_to(tmp_path / "wave.png")
    assert "open in another program" in again.state.text()
    assert sorted(tmp_path.iterdir()) == before


def test_a_picture_that_would_be_too_large_is_refused_in_a_sentence(the):
    with pytest.raises(ValueError, match="are too many"):
        picture_file(drawing_of(the.bench.xt), PictureChoices(scale=10.0, dpi=1200))
