"""What published practice wants in a report, item by item, with the section in which a reader finds it.

The items are those of the reporting section of ASTM D4945 (high-strain dynamic testing), from memory: to be checked
against the standard. Left out is what only a test in the field can have: serial numbers and calibrations of gauges,
dates of driving and of the test, blow numbers, measured records. DEVELOPERS.md has the same list for readers.
"""

from __future__ import annotations

import json
import re
from datetime import datetime

import pypdfium2
import pytest

from app.demo_files import demo_paths
from app.report.build import build_report
from app.report.choices import SECTIONS
from app.report.pdf import pdf_of
from app.report.solve_cases import solve_cases
from solver import project_from_tree

DATE = datetime(2026, 12, 1)
PARTICULARS = {
    "client": "Harbour Board",
    "project": "North quay",
    "place": "Ferry berth 4",
    "author": "A. N. Engineer",
    "checked": "C. Hecker",
    "company": "Example Ltd",
}
#: Item, section ("" = first page), and what is read there.
ITEMS = [
    ("client, project and place", "", "Harbour Board.*North quay.*Ferry berth 4"),
    ("who made it, who checked it, for whom", "", r"A\. N\. Engineer.*C\. Hecker.*Example Ltd"),
    ("date, program with version, identity of the input", "", "1 December 2026.*Striketrace.*SHA-256"),
    ("the answer, and what nobody has confirmed", "", r"within the limits.*not\s+confirmed"),
    ("peak stresses with place and share of the limit", "summary", r"within\s+the\s+limit, 65.%.*16\.0.m"),
    ("set per blow and blow count", "summary", r"9\.31.mm.*26\.8.blows"),
    ("energy past the gauge, as a share of the ram's", "summary", r"67\.1.kJ.*of\s+the\s+ram"),
    ("drawing of the member in the ground", "input", "The member, to scale in length"),
    ("material: modulus, density, wave speed", "input", r"210.GPa.*7850.kg/m.*5172.m/s"),
    ("member: length, section, area, impedance, joints", "input", r"16\.0.m.*pipe.*299.cm.*1212.kN"),
    ("mass, and time of a wave down and up", "input", r"mass\s+of\s+5\.22.t.*9\.28.ms \(2L/c\)"),
    (
        "what strikes: ram, drop, efficiency, cushion, cap",
        "input",
        r"7\.00.t.*1\.20.m.*0\.85.*0\.900.t.*cushion",
    ),
    ("energy and velocity as it strikes", "input", r"4\.47.m/s.*70\.0.kJ"),
    ("penetration", "input", r"stands\s+19\.0.m\s+in\s+the\s+ground"),
    ("ground: layers, resistance, quake, damping", "input", r"Soft clay.*144.kN.*quake.2\.54.mm"),
    ("resistance of shaft and toe together", "input", r"1100.kN.*2968.kN"),
    ("gauges: where, and time to the far end and back", "input", r"Head.*1\.20.m.*8\.82.ms"),
    ("sources of assumed values", "input", "typical, not confirmed"),
    ("method, assumptions, what is left out", "model", r"E\. A\. L\. Smith 1960.*not\s+modelled"),
    ("force and impedance times velocity over time", "results", "Force and impedance × velocity"),
    ("stresses along the member against the limits", "results", "Envelope"),
    (
        "waves through time, movement, energy",
        "results",
        "A wave is a slanting band.*Movement.*Where the energy",
    ),
    ("what happened: leaving of the ram, lifting of the toe", "results", "Ram leaves.*toe lifts off"),
    ("limits allowed, with formula, numbers and source", "limits", r"0\.9 φ f_y, with φ = 1.*10\.7\.8"),
    ("quality of the computation", "quality", "Worst.*Energy that"),
    ("cautions of judgement", "cautions", "licensed engineer"),
    ("how to repeat it, and the whole input", "appendix", r'striketrace report.*"format"'),
]


@pytest.fixture(scope="module")
def pages() -> list[str]:
    tree = json.loads(demo_paths()[0].read_text(encoding="utf-8"))
    tree["studies"] = {"report": {"particulars": PARTICULARS, "mesh_check": False}}
    project = project_from_tree(tree)
    pdf = pypdfium2.PdfDocument(pdf_of(build_report(project, solve_cases(project, False), DATE), DATE))
    found = [page.get_textpage().get_text_range() for page in pdf]
    pdf.close()
    return found


@pytest.mark.parametrize(("item", "section", "words"), ITEMS, ids=[item for item, _, _ in ITEMS])
def test_it_is_found_in_its_section(pages: list[str], item: str, section: str, words: str) -> None:
    text = "\n".join(pages)
    body = text[
        text.index("1. Summary", text.index("1. Summary") + 1) :
    ]  # the contents name every section before
    if section:
        number = list(SECTIONS).index(section) + 1
        titles = list(SECTIONS.values())
        end = f"{number + 1}. {titles[number]}" if number < len(titles) else None
        start = body.index(f"{number}. {titles[number - 1]}")
        part = body[start : body.index(end, start) if end else None]
    else:
        part = pages[0]
    assert re.search(words, part, re.DOTALL)
