"""What was analysed: drawings and tables of the input, and where its values came from."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterator
from typing import Any

from app.faults import place_in_words
from app.report.blocks import Block, Heading, Paragraph, Picture, Table
from app.report.described import (
    Row,
    as_given,
    exact,
    gauge_table,
    ground_tables,
    in_one_line,
    load_table,
    material_table,
    segment_table,
)
from app.report.figures.member import member_figure
from app.report.outcome import Material
from app.units import Units
from solver import Case
from solver.model.derived import segment_mass, time_between
from solver.model.project import Provenance


def analysed(of: Material) -> Iterator[Block]:
    """Materials once, then each case; a part that is the same as in a case before is not told again."""
    if of.project.notes.strip():
        yield Heading("Notes of the project")
        yield Paragraph(of.project.notes)
    yield Paragraph(
        "Distances run along the member from its struck end. Numbers are as given, up to six digits; what follows "
        "from them is rounded to three."
    )
    yield material_table(of.project, of.units)
    before: list[Case] = []
    for one in of.cases:
        yield Heading(f"Case: {one.case.name}")
        yield from _case(one.case, before, of)
        before.append(one.case)
    yield from _sources(of)


def _case(case: Case, before: list[Case], of: Material) -> Iterator[Block]:
    units = of.units
    if "member" in of.choices.figures:
        same = _first(before, lambda c: _drawn(c) == _drawn(case))
        if same is None:
            yield Picture(
                member_figure(case, units), "The member, to scale in length; widths are exaggerated."
            )
    same = _first(before, lambda c: c.member == case.member)
    if same is not None:
        yield Paragraph(f"Member: as in case '{same.name}'.")
    else:
        yield segment_table(
            case.member.segments, case, units, "Segments of the member, from the struck end on"
        )
        mass = sum(segment_mass(s, case.materials) for s in case.member.segments)
        passage = 2 * time_between(case, 0.0, case.member.length)
        yield Paragraph(
            f"The member is {exact(case.member.length, 'length', units)} long and has a mass of "
            f"{units.show(mass, 'mass')}. A wave runs along it and back in {units.show(passage, 'time')} (2L/c). "
            f"Lateral inertia is {'in' if case.member.lateral_inertia else 'left out of'} the model."
        )
        yield from _attachments(case, units)
    yield load_table(case, units)
    if case.ram_segments:
        yield segment_table(
            case.ram_segments, case, units, "Rod that strikes, its far end from the impact first"
        )
    yield from _ground_and_end(case, before, units)
    if case.gauges:
        yield gauge_table(case, units)
    yield Paragraph(f"Run: {_run(case, units)}.")


def _drawn(case: Case) -> tuple[object, ...]:
    """What decides the drawing of a case."""
    load = case.load
    train = (
        (load.cushion is None, load.cap_mass > 0, load.pile_cushion is None) if load.kind == "drop" else ()
    )
    return case.member, case.ground, case.far_end, case.gauges, load.kind, train


def _first(cases: list[Case], holds: Callable[[Case], bool]) -> Case | None:
    return next((case for case in cases if holds(case)), None)


def _attachments(case: Case, units: Units) -> Iterator[Block]:
    if not case.member.attachments:
        return
    dimensions = {"mass": "mass", "spring": "stiffness", "dashpot": "impedance"}
    rows = tuple(
        (a.kind, exact(a.position, "length", units), exact(a.value, dimensions[a.kind], units))
        for a in case.member.attachments
    )
    yield Table(("Attachment", "Position", "Value"), rows, (0.34, 0.33, 0.33), "Attached to the member")


def _ground_and_end(case: Case, before: list[Case], units: Units) -> Iterator[Block]:
    end = case.far_end
    told = in_one_line(end, units)
    yield Paragraph(f"Far end: {END_WORDS[end.kind]}{f', {told}' if told else ''}.")
    if case.ground is None:
        yield Paragraph("There is no ground in this case.")
        return
    same = _first(before, lambda c: c.ground == case.ground and c.member == case.member)
    if same is not None:
        yield Paragraph(f"Ground: as in case '{same.name}'.")
        return
    surface = f"The ground surface lies {exact(case.ground.surface, 'length', units)} from the struck end."
    if case.ground.inner_share:
        surface += (
            f" {100 * case.ground.inner_share:g} % of the unit resistance acts inside open pipes as well."
        )
    yield Paragraph(surface)
    yield from ground_tables(case, units)


END_WORDS = {
    "free": "free",
    "fixed": "fixed",
    "spring": "on a spring",
    "dashpot": "on a dashpot",
    "matched": "the member goes on unchanged for ever",
    "wall": "rigid wall",
    "ground": "stands in the ground",
}


def _run(case: Case, units: Units) -> str:
    run = case.run
    lasts = "until the member is at rest" if run.duration is None else exact(run.duration, "time", units)
    mesh = (
        "elements chosen by the program"
        if run.element_length is None
        else f"elements of at most {exact(run.element_length, 'length', units)}"
    )
    blows = ""
    if not isinstance(run.blows, int):
        blows = f", blows until the set repeats within {exact(run.blows.tolerance, 'small_length', units)}"
    elif run.blows > 1:
        blows = f", {run.blows} blows"
    return f"{lasts}, {mesh}, gravity {'acts' if run.gravity else 'left out'}{blows}"


def _sources(of: Material) -> Iterator[Block]:
    """Where values came from, typical ones that nobody has confirmed first."""
    marks = of.project.provenance or {}
    yield Heading("Where values came from")
    if not marks:
        yield Paragraph("No source is noted for any value: all were given by hand.")
        return
    tree = of.project.model_dump(mode="json")
    typical = {p: m for p, m in marks.items() if m.state == "typical"}
    confirmed = {p: m for p, m in marks.items() if m.state == "confirmed"}
    if typical:
        yield Paragraph(
            f"! {len(typical)} value{'s are' if len(typical) > 1 else ' is'} typical and not confirmed for this site.",
            "caution",
        )
    rows = list(dict.fromkeys(_source_row(of, tree, p, m) for p, m in [*typical.items(), *confirmed.items()]))
    head = ("Value", "Given", "Source", "State")
    yield Table(head, tuple(_in_cases(of, rows)), (0.32, 0.14, 0.36, 0.18), "Sources of values")


def _source_row(of: Material, tree: Any, pointer: str, mark: Provenance) -> tuple[int | None, Row]:
    """The number of the case that a value is in, and its place, value, source and state."""
    inside = re.fullmatch(r"/cases/(\d+)/.*", pointer)
    number = int(inside.group(1)) if inside else None
    one = {"cases": [tree["cases"][number]]} if number is not None else tree
    place = place_in_words(re.sub(r"^/cases/\d+/", "/cases/0/", pointer), one)
    state = "✓ confirmed" if mark.state == "confirmed" else "! typical, not confirmed"
    return number, (place, as_given(of.project, pointer, of.units), mark.source, state)


def _in_cases(of: Material, rows: list[tuple[int | None, Row]]) -> Iterator[Row]:
    """Each row once, with the cases that it holds for, where that is not all of them."""
    found: dict[Row, list[int | None]] = {}
    for number, row in rows:
        found.setdefault(row, []).append(number)
    count = len(of.project.cases)
    for (place, *others), numbers in found.items():
        names = [of.project.cases[n].name for n in numbers if n is not None]
        where = f" ({', '.join(names)})" if names and len(names) < count else ""
        yield (f"{place}{where}", *others)
