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
    load_rows,
    material_table,
    segment_table,
)
from app.report.figures.member import member_figure
from app.report.outcome import Material
from app.report.verdict import typical_lines
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
        "Distances run along the member from its struck end. Given numbers are told to 1 part in 20 000 or better, and "
        "in full in the appendix; what follows from them is rounded to three digits."
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
    alike = {
        "Member": _first(before, lambda c: c.member == case.member),
        "far end": _first(before, lambda c: (c.member, c.far_end) == (case.member, case.far_end)),
        "ground": _first(before, lambda c: (c.member, c.ground) == (case.member, case.ground)),
        "gauges": _first(before, lambda c: (c.member, c.gauges) == (case.member, case.gauges)),
    }
    yield from _told_before(alike)
    if alike["Member"] is None:
        yield from _member(case, units)
    yield _load(case, before, units)
    if case.ram_segments and not any(c.ram_segments == case.ram_segments for c in before):
        yield segment_table(
            case.ram_segments, case, units, "Rod that strikes, its far end from the impact first"
        )
    if alike["far end"] is None:
        told = in_one_line(case.far_end, units)
        yield Paragraph(f"Far end: {END_WORDS[case.far_end.kind]}{f', {told}' if told else ''}.")
    if alike["ground"] is None:
        yield from _ground(case, units)
    if case.gauges and alike["gauges"] is None:
        yield gauge_table(case, units)
    yield Paragraph(f"Run: {_run(case, units)}.")


def _told_before(alike: dict[str, Case | None]) -> Iterator[Block]:
    """What is the same as in a case before, in one sentence for each such case."""
    names: dict[str, list[str]] = {}
    for word, case in alike.items():
        if case is not None:
            names.setdefault(case.name, []).append(word)
    for name, words in names.items():
        told = words[0] if len(words) == 1 else f"{', '.join(words[:-1])} and {words[-1]}"
        yield Paragraph(f"{told[:1].upper()}{told[1:]}: as in case '{name}'.")


def _member(case: Case, units: Units) -> Iterator[Block]:
    yield segment_table(case.member.segments, case, units, "Segments of the member, from the struck end on")
    mass = sum(segment_mass(s, case.materials) for s in case.member.segments)
    passage = 2 * time_between(case, 0.0, case.member.length)
    yield Paragraph(
        f"The member is {exact(case.member.length, 'length', units)} long and has a mass of "
        f"{units.show(mass, 'mass')}. A wave runs along it and back in {units.show(passage, 'time')} (2L/c). "
        f"Lateral inertia is {'in' if case.member.lateral_inertia else 'left out of'} the model."
    )
    yield from _attachments(case, units)


def _load(case: Case, before: list[Case], units: Units) -> Block:
    """All of the load, or what is not as in an earlier case that is told by the same words."""
    rows = load_rows(case, units)
    words = [word for word, _ in rows]
    for other in before:
        known = load_rows(other, units)
        if [word for word, _ in known] == words:
            differs = tuple(row for row in rows if row not in known)
            if not differs:
                return Paragraph(f"What strikes: as in case '{other.name}'.")
            return Table(HEAD, differs, (0.4, 0.6), f"What strikes: as in case '{other.name}', but for")
    return Table(HEAD, rows, (0.4, 0.6), "What strikes")


HEAD = ("Of the load", "Given")


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


def _ground(case: Case, units: Units) -> Iterator[Block]:
    if case.ground is None:
        yield Paragraph("There is no ground in this case.")
        return
    depth = case.member.length - case.ground.surface
    surface = f"The ground surface lies {exact(case.ground.surface, 'length', units)} from the struck end"
    surface += f"; the member stands {exact(depth, 'length', units)} in the ground." if depth > 0 else "."
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
    yield from (Paragraph(line, "caution") for line in typical_lines(of.project))
    rows = list(dict.fromkeys(_source_row(of, tree, p, m) for p, m in [*typical.items(), *confirmed.items()]))
    head = ("Value", "Given", "Source", "State")
    yield Table(head, tuple(_in_cases(of, rows)), (0.29, 0.12, 0.36, 0.23), "Sources of values")


def _source_row(of: Material, tree: Any, pointer: str, mark: Provenance) -> tuple[int | None, Row]:
    """The number of the case that a value is in, and its place, value, source and state."""
    label, given = as_given(of.project, pointer, of.units)
    inside = re.fullmatch(r"/cases/(\d+)/.*", pointer)
    number = int(inside.group(1)) if inside else None
    one = {"cases": [tree["cases"][number]]} if number is not None else tree
    part = re.sub(r"^/cases/\d+/", "/cases/0/", pointer).rpartition("/")[0]
    place = f"{place_in_words(part, one)}: {label}"
    state = "✓ confirmed" if mark.state == "confirmed" else "! typical, not confirmed"
    return number, (place, given, mark.source, state)


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
