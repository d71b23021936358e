"""The report: the same bytes each time, nothing that a person typed is taken for markup, pages break between rows."""

from __future__ import annotations

import copy
import io
import re
from datetime import datetime

import numpy as np
import pypdfium2
import pytest
from PIL import Image

from app.command_line import main
from app.report.animation import wave_gif
from app.report.build import build_report
from app.report.choices import FIGURES, SECTIONS, ReportChoices, report_choices, written_date
from app.report.decimals import with_commas
from app.report.figure_files import write_figures
from app.report.figures.envelope import stress_envelope
from app.report.figures.marks import Path, Text
from app.report.figures.scales import thinned, tick_texts
from app.report.html import html_of
from app.report.lettering import MISSING, fitted, printable, text_width
from app.report.outcome import Solved, solved
from app.report.pdf import pdf_of
from app.report.solve_cases import solve_cases
from app.units import units_of
from app.words import verdict
from solver import parse_project, project_from_tree, project_to_text, solve
from solver.answer.findings import findings_of
from tests.export.conftest import UNLUCKY, bar_tree

DATE = datetime(2026, 12, 1, 8, 30)


def report_of(tree, mesh_check=False, **choices):
    tree = copy.deepcopy(tree)
    if choices:
        tree["studies"] = {"report": choices}
    project = project_from_tree(tree)
    return build_report(project, solve_cases(project, mesh_check), DATE)


def pages_of(pdf):
    document = pypdfium2.PdfDocument(pdf)
    texts = [page.get_textpage().get_text_bounded() for page in document]
    document.close()
    return texts


@pytest.fixture(scope="module")
def plain():
    return report_of(bar_tree(cases=2), mesh_check=True)


@pytest.fixture(scope="module")
def plain_pages(plain):
    return pages_of(pdf_of(plain, DATE))


def test_the_same_input_gives_the_same_bytes(plain):
    again = report_of(bar_tree(cases=2), mesh_check=True)
    assert pdf_of(plain, DATE) == pdf_of(again, DATE)
    assert html_of(plain) == html_of(again)


def test_report_and_screen_say_the_same(plain_pages):
    """Every figure of the verdict, in the words and units of the screen, stands in the report."""
    project = project_from_tree(bar_tree(cases=2))
    told = " ".join(" ".join(plain_pages).replace("\u00a0", " ").split())
    for case in project.cases:
        for line in verdict(findings_of(solve(case)), units_of(project)):
            assert line.figure.replace("\u00a0", " ") in told


def test_every_section_is_there_and_numbered_pages_are_right(plain_pages):
    told = " ".join(plain_pages)
    for title in SECTIONS.values():
        assert title in told
    for number, text in enumerate(plain_pages, 1):
        assert f"page {number} of {len(plain_pages)}" in " ".join(text.split())
    assert "to be confirmed against the governing code" in " ".join(told.split()).casefold()


def test_the_contents_name_the_pages(plain_pages):
    for entry in re.findall(r"^\d\. (.+?)[ .]+(\d+)\s*$", plain_pages[0], flags=re.MULTILINE):
        title, page = entry
        assert title in plain_pages[int(page) - 1]


def test_sections_figures_words_and_particulars_are_as_chosen():
    report = report_of(
        bar_tree(),
        sections=["cautions", "summary"],
        figures=["xt"],
        words={"summary": "Read this first."},
        particulars={"client": "Harbour office"},
        paper="Letter",
        dates="iso",
    )
    assert [section.key for section in report.sections] == ["cautions", "summary"]
    assert report.sections[1].blocks[0].text == "Read this first."
    assert ("Client", "Harbour office") in report.front.particulars
    assert ("Date", "2026-12-01") in report.front.particulars
    document = pypdfium2.PdfDocument(pdf_of(report, DATE))
    assert document.get_page_size(0) == (612, 792)
    document.close()


def test_choices_go_into_the_project_and_back():
    chosen = ReportChoices(sections=("results",), logo="logo.png", decimal_comma=True, mesh_check=False)
    assert report_choices({"report": chosen.to_tree()}) == chosen
    assert ReportChoices().to_tree() == {}
    nonsense = {"report": {"sections": ["colours"], "paper": "A0", "figures": 3, "words": [], "dates": {}}}
    assert report_choices(nonsense) == ReportChoices(sections=())
    assert report_choices(None) == ReportChoices()


@pytest.mark.parametrize("where", ["html", "pdf"])
def test_markup_is_text(where):
    tree = bar_tree(UNLUCKY, gauges=("<script>alert(1)</script>", "&amp;</para>"))
    tree["notes"] = "<img src=x onerror=alert(1)> \u0007 \ud800"
    tree["cases"][0]["name"] = "</td><b>x"
    report = report_of(tree, words={"summary": "<font size=90>big</font>"})
    if where == "html":
        text = html_of(report)
        for tag in ("<script", "<img src=x", "<b>", "<font", "</td><b"):
            assert tag not in text
        assert "&lt;script&gt;alert(1)&lt;/script&gt;" in text
    else:
        text = " ".join(pages_of(pdf_of(report, DATE)))
        for written in ("<b>Pier</b> & =1+1", "<script>alert(1)</script>", "&amp;</para>", "<font size=90>"):
            assert written in text


def test_long_names_many_gauges_and_layers_fit_on_pages():
    tree = bar_tree("T" * 3000, gauges=[f"{i} " + "G" * 290 for i in range(20)])
    case = tree["cases"][0]
    case["name"], case["far_end"] = "C" * 300, {"kind": "ground"}
    layer = {"thickness": 0.05, "unit_resistance": 1e4, "quake": 0.0025, "damping": 0.2}
    case["ground"] = {
        "surface": 0.5,
        "layers": [{"name": f"layer number {i}", **layer} for i in range(60)],
        "toe": {"resistance": 1e4, "quake": 0.0025, "damping": 0.5},
    }
    pages = pages_of(pdf_of(report_of(tree, sections=["input"], figures=[]), DATE))
    head = "From the struck end"
    with_layers = [text for text in pages if "layer number" in text]
    assert len(with_layers) > 1
    for text in with_layers:  # a long table repeats its head on every page
        assert head in " ".join(text.split())
    for i in range(60):
        assert sum(bool(re.search(rf"layer number {i}\b", text)) for text in pages) == 1


def test_no_heading_stands_alone_at_the_foot_of_a_page(plain, plain_pages):
    titles = {b.text for s in plain.sections for b in s.blocks if hasattr(b, "level")}
    for text in plain_pages[1:]:
        lines = [line.strip() for line in text.splitlines() if line.strip()]
        body = [line for line in lines if "Striketrace 0" not in line and not line.startswith("page ")]
        assert body[-1] not in titles


def test_the_input_read_from_the_appendix_of_the_pdf_is_the_project():
    """What a reader copies out of the PDF, its page ends taken away and its broken lines joined."""
    tree = bar_tree(title=UNLUCKY)
    tree["notes"] = "long line, with blanks in it; " * 40 + UNLUCKY
    project = project_from_tree(tree)
    pages = pages_of(pdf_of(report_of(tree), DATE))
    first = next(n for n, text in enumerate(pages) if "The input" in text and "goes on in the next" in text)
    lines = [line for text in pages[first:] for line in re.split(r"\r?\n", text)]
    lines = [
        line for line in lines if not re.search(r"page \d+ of \d+", line) and "Striketrace 0" not in line
    ]
    text = "\n".join(lines).replace("↩\n", "")
    text = text[text.index('{\n"format"') if '{\n"format"' in text else text.index("{") :]
    assert parse_project(text[: text.rindex("}") + 1]) == project


def test_decimal_commas_change_numbers_and_no_names():
    tree = bar_tree("Version 1.5 of the bar", gauges=("Gauge 2.5",))
    tree["cases"][0]["name"] = "Drop 1.2 m"
    report = report_of(tree, decimal_comma=True, sections=["summary", "input", "limits"])
    text = html_of(report)
    assert "Drop 1.2 m" in text
    assert "Gauge 2.5" in text
    assert "Version 1.5 of the bar" in text
    assert "article 10.7.8" in text
    assert not re.search(r"\d\.\d+ ?(MPa|kN|ms)", text.replace("\u00a0", " "))
    assert with_commas(report, project_from_tree(tree)).front == report.front


def test_a_case_without_an_answer_says_so_and_the_others_are_there():
    project = project_from_tree(bar_tree(cases=2))
    first = solved(project.cases[0], solve(project.cases[0]))
    refused = Solved(project.cases[1], None, "This cannot be computed.")
    text = html_of(build_report(project, (first, refused), DATE))
    assert "This cannot be computed." in text
    assert "Case: Pulse 2" in text


def test_letters_without_a_shape_are_seen_and_right_to_left_is_turned():
    assert printable("a🙂b") == f"a{MISSING}b"
    assert printable("abc שלום עולם x") == "abc " + "שלום עולם"[::-1] + " x"
    assert printable("ρ ∂ √ ≤ → ✓ ✕ µε φ ↓ ↑") == "ρ ∂ √ ≤ → ✓ ✕ µε φ ↓ ↑"
    assert text_width(fitted("W" * 300, 7, 100), 7) <= 100


def test_dates_are_english_whatever_the_system_speaks():
    assert [written_date(DATE, way) for way in ("words", "iso", "us")] == [
        "1 December 2026",
        "2026-12-01",
        "12/01/2026",
    ]


def test_thinned_curves_keep_their_peaks():
    x = np.linspace(0, 1, 100_001)
    y = np.sin(50 * x)
    y[33_444] = 9.0  # within a stretch, not at one of its ends, which are kept in any case
    seen_x, seen_y = thinned(x, y)
    assert len(seen_x) <= 1000
    assert seen_y.max() == 9.0
    assert x[0] in seen_x
    assert x[-1] in seen_x
    assert tick_texts([0.0, 0.5, 1.0]) == ["0.0", "0.5", "1.0"]


def test_figures_as_files_have_real_text(tmp_path, plain):
    written = write_figures(plain, tmp_path, DATE, dpi=96)
    assert len(written) == 3 * len({path.stem for path in written})
    xt = next(path for path in written if path.suffix == ".svg" and "x-t-diagram" in path.stem)
    assert "Distance from the struck end" in xt.read_text(encoding="utf-8")
    assert "Stress, MPa (tension +)" in pages_of(xt.with_suffix(".pdf").read_bytes())[0]
    assert xt.with_suffix(".png").read_bytes().startswith(b"\x89PNG")


def test_command_writes_the_report_or_says_why_not(tmp_path, capsys):
    path = tmp_path / "bar.strike"
    tree = bar_tree()
    tree["studies"] = {"report": {"figures": ["member"], "mesh_check": False}}
    path.write_text(project_to_text(project_from_tree(tree)), encoding="utf-8")
    for name in ("a.pdf", "b.pdf", "c.html"):
        assert main(["report", str(path), "--out", str(tmp_path / name), "--date", "2026-12-01"]) == 0
    assert (tmp_path / "a.pdf").read_bytes() == (tmp_path / "b.pdf").read_bytes()
    assert "http" not in (tmp_path / "c.html").read_text(encoding="utf-8").replace(
        "http://www.w3.org/2000/svg", ""
    )
    assert main(["report", str(path), "--out", str(tmp_path / "a.doc")]) == 2
    assert main(["report", str(path), "--out", str(tmp_path / "nowhere" / "a.pdf")]) == 2
    (tmp_path / "taken.pdf").mkdir()
    assert main(["report", str(path), "--out", str(tmp_path / "taken.pdf")]) == 1
    told = capsys.readouterr()
    assert "cannot be written" in told.err
    assert "Traceback" not in told.err
    assert not [p.name for p in tmp_path.iterdir() if p.name.endswith(".part")]


def test_every_figure_that_can_be_chosen_is_drawn(plain):
    names = [block.figure.name for s in plain.sections for block in s.blocks if hasattr(block, "figure")]
    assert len(set(names)) == len(FIGURES)


def test_the_envelope_in_print_keeps_the_peak_of_a_long_member():
    """4,000 elements are drawn with fewer points, and the largest stress is among them."""
    tree = bar_tree()
    tree["cases"][0]["run"] = {"duration": 0.0009, "element_length": 0.001}
    project = project_from_tree(tree)
    result = solve(project.cases[0])
    figure = stress_envelope(result, units_of(project))
    curves = [m for m in figure.marks if isinstance(m, Path) and m.stroke and len(m.points) > 100]
    assert all(len(curve.points) < 1000 for curve in curves)
    plain = [float(np.min(c.points[:, 0])) for c in curves]
    # tension positive: the most compressive stress is farthest to the left, where its mark stands
    mark = next(m for m in figure.marks if isinstance(m, Text) and m.text.startswith("compression"))
    assert abs(abs(min(plain) - mark.x) - 6) < 0.01


def test_the_wave_as_an_animated_picture(monkeypatch):
    monkeypatch.setattr("app.report.animation.FRAMES", 5)
    project = project_from_tree(bar_tree())
    made = wave_gif(solve(project.cases[0]), units_of(project))
    with Image.open(io.BytesIO(made)) as picture:
        assert picture.format == "GIF"
        assert picture.n_frames == 5
        assert picture.size == (640, 280)  # 480 by 210 points at 96 dots an inch
