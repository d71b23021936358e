"""What must hold between the parts of a project: each breach as a place and a sentence."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from difflib import get_close_matches

from solver.model.member import Segment
from solver.model.problem import Problem, step
from solver.model.project import Case, Project
from solver.model.quantity import SI_UNITS


def problems_of(project: Project) -> list[Problem]:
    """All breaches between parts, in the order of the file."""
    found = list(_display_units(project))
    found += _repeated("/materials", "materials", [m.name for m in project.materials])
    found += _repeated("/cases", "cases", [c.name for c in project.cases])
    known = {m.name for m in project.materials}
    for index, case in enumerate(project.cases):
        found += _case(f"/cases/{index}", case, known)
    return found


def _display_units(project: Project) -> Iterator[Problem]:
    """Which quantities have a unit of their own; what a unit's name means is the screen's to know."""
    chosen = project.display_units
    known = ["system", *SI_UNITS]
    for key in () if isinstance(chosen, str) else chosen:
        if key not in known:
            close = get_close_matches(key, known, n=1) or [", ".join(known)]
            yield Problem(f"/display_units{step(key)}", f"is no quantity that has a unit (known: {close[0]})")


def _case(at: str, case: Case, known: set[str]) -> Iterator[Problem]:
    yield from _segments(f"{at}/member/segments", case.member.segments, known)
    yield from _gauges(at, case)
    for i, attachment in enumerate(case.member.attachments):
        if attachment.position > case.member.length * (1 + 1e-12):
            yield Problem(
                f"{at}/member/attachments/{i}/position",
                f"{attachment.position:g} m lies beyond the member's end at {case.member.length:g} m",
            )
    yield from _ground(at, case)
    yield from _load(at, case, known)


def _segments(at: str, segments: Sequence[Segment], known: set[str]) -> Iterator[Problem]:
    yield from _repeated(at, "segments", [s.name for s in segments])
    for i, segment in enumerate(segments):
        if segment.material not in known:
            yield Problem(f"{at}/{i}/material", _no_material(segment.material, known))
        fill = getattr(segment.section, "fill", None)
        if fill is not None and fill not in known:
            yield Problem(f"{at}/{i}/section/fill", _no_material(fill, known))
    if segments[0].joint_above.kind != "bonded":
        yield Problem(
            f"{at}/0/joint_above", "the first segment has nothing above it: its joint must be 'bonded'"
        )


def _no_material(name: str, known: set[str]) -> str:
    there = ", ".join(f"'{k}'" for k in sorted(known)) or "none"
    return f"the project has no material named '{name}' (it has: {there})"


def _gauges(at: str, case: Case) -> Iterator[Problem]:
    yield from _repeated(f"{at}/gauges", "gauges", [g.name for g in case.gauges])
    for i, gauge in enumerate(case.gauges):
        place = f"{at}/gauges/{i}"
        if gauge.on == "member":
            length, what = case.member.length, "member"
        else:
            has = case.load.kind == "striker" if gauge.on == "striker" else bool(case.ram_segments)
            has = has and (gauge.on == "striker") == (case.load.kind == "striker")
            if not has:
                yield Problem(
                    f"{place}/on", f"gauge '{gauge.name}' is on the {gauge.on}, but this load has no such rod"
                )
                continue
            length, what = sum(s.length for s in case.ram_segments), gauge.on
        if gauge.position > length * (1 + 1e-12):
            yield Problem(
                f"{place}/position",
                f"gauge '{gauge.name}' at {gauge.position:g} m lies beyond the {what}'s end at {length:g} m",
            )


def _ground(at: str, case: Case) -> Iterator[Problem]:
    ground = case.ground
    if case.far_end.kind == "ground" and (ground is None or ground.toe is None):
        yield Problem(f"{at}/far_end", "the far end stands in the ground: give 'ground' with its 'toe'")
    if ground is None:
        return
    if ground.toe is not None and case.far_end.kind != "ground":
        yield Problem(f"{at}/far_end", "'ground' has a toe, so the far end must be of kind 'ground'")
    if ground.surface > case.member.length * (1 + 1e-12):
        yield Problem(
            f"{at}/ground/surface",
            f"the ground surface at {ground.surface:g} m lies below the member's end at {case.member.length:g} m",
        )
    yield from _repeated(f"{at}/ground/layers", "layers", [layer.name for layer in ground.layers])


def _load(at: str, case: Case, known: set[str]) -> Iterator[Problem]:
    load, run = case.load, case.run
    if load.kind == "striker":
        yield from _segments(f"{at}/load/segments", load.segments, known)
    elif load.kind == "drop" and load.ram is not None:
        yield from _segments(f"{at}/load/ram/segments", load.ram.segments, known)
    if load.kind == "none" and not run.initial_velocity:
        yield Problem(f"{at}/load", "nothing moves: with load 'none', give 'run.initial_velocity' (not 0)")


def _repeated(at: str, what: str, names: Sequence[str]) -> Iterator[Problem]:
    for i, name in enumerate(names):
        first = names.index(name)
        if first < i:
            yield Problem(
                f"{at}/{i}/name", f"numbers {first + 1} and {i + 1} of the {what} are both called '{name}'"
            )
