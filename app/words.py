"""Facts as sentences: findings, notes, cautions and states, in the units and the sign of the project. Imports no Qt."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass

from app.names import with_kind
from app.units import NO_BREAK, Units, rounded
from solver.answer.cautions import Caution
from solver.answer.findings import (
    EnergyFinding,
    Findings,
    Happening,
    Quality,
    SetFinding,
    State,
    StressAt,
    StressFinding,
    segment_of,
)
from solver.answer.remark import Remark, sentence
from solver.model.project import Case

#: A state is told by a sign and a word, never by a colour alone.
SIGNS: dict[State, str] = {"within": "✓", "near": "!", "over": "✕", "no limit": "–"}
STATES: dict[State, str] = {
    "within": "within the limit",
    "near": "near the limit",
    "over": "over the limit",
    "no limit": "no limit given",
}

MODEL_CAUTION = "A model's answer, for a licensed engineer to judge under local codes."
LIMIT_CAUTION = "Stress limits come from the governing code."
AXIAL_CAUTION = "Axial average only: bending adds to it."
LOAD_CAUTION = "Diesel and vibratory hammers are not modelled."

#: Units of length in which blows are counted for each foot.
FEET = ("ft", "in", "yd")
#: More blows for each 0.25 m or foot than this are as good as no set (a choice of this program).
UNCOUNTED = 1000
#: Stresses below this share of the larger peak are rounding, and are told as none at all.
NOTHING = 1e-9


@dataclass(frozen=True)
class Line:
    """One line of the verdict: a large figure, its name, and details. `time` (s) and `position` (m): where it is."""

    figure: str
    name: str
    detail: str
    state: State | None = None
    time: float | None = None
    position: float | None = None


@dataclass(frozen=True)
class Note:
    """One sentence under the verdict. `time` (s), `position` (m) and `pointer` (in the case) say where it leads."""

    text: str
    time: float | None = None
    position: float | None = None
    pointer: str = ""


def verdict(findings: Findings, units: Units) -> tuple[Line, ...]:
    """The verdict: peaks with their share of the limit, set, energy past the first gauge; and what is near or over its
    limit in a rod that strikes."""
    larger = max(findings.compression.peak.value, findings.tension.peak.value)
    lines = [_stress(findings.compression, units, larger), _stress(findings.tension, units, larger)]
    if findings.set is not None:
        lines.append(_set(findings.set, units))
    if findings.energy is not None:
        lines.append(_energy(findings.energy, units))
    lines += [_in_the_striking_rod(one, units) for one in graver(findings.striking)]
    return tuple(lines)


def graver(striking: tuple[StressFinding, ...]) -> list[StressFinding]:
    """Stresses in a rod that strikes that belong to the verdict: near or over their limit."""
    return [one for one in striking if one.state in ("near", "over")]


def _in_the_striking_rod(of: StressFinding, units: Units) -> Line:
    worst = of.worst
    assert worst is not None
    face = f"{units.show(-worst.position, 'length')} behind its struck face, {units.show(worst.time, 'time')}"
    name = f"{of.sign} in {worst.segment}, which strikes"
    return Line(
        units.show(worst.value, "stress"),
        name,
        f"{_state(worst)} · {face}",
        of.state,
        worst.time,
        worst.position,
    )


def notes(findings: Findings, case: Case, units: Units) -> tuple[Note, ...]:
    """Notes on the run: what happened, the solver's warnings, cautions, and how the run ended."""
    found = list(_happenings(findings.happenings, case, units))
    if findings.set is not None and findings.set.head_rebound is not None:
        found.append(
            Note(f"The struck end rebounds by {units.show(findings.set.head_rebound, 'small_length')}.")
        )
    found += _striking(findings.striking, units)
    found += [
        Note(warning(remark, units), position=remark.place or None)
        for remark in findings.remarks
        if remark.kind != "stopped"  # told below, before all others
    ]
    found += [Note(caution(c, units), pointer=c.pointer) for c in findings.cautions]
    if not findings.quality.finished:
        found.insert(0, Note("Stopped before the end: this is what was solved until then."))
    return tuple(found)


def quality(of: Quality, units: Units) -> tuple[str, ...]:
    """Mesh, step and energy of a run, for those who want to judge it as a computation."""
    return (
        f"{of.elements} elements, {of.steps} steps of {units.show(of.time_step, 'time')}.",
        f"Worst Courant number {of.courant_worst:.4f}.",
        f"The energy closes to {_share(of.energy_residual)} of its largest.",
        "The member has come to rest." if of.at_rest else "The member still moves at the end of the run.",
    )


def as_text(findings: Findings, case: Case, units: Units, also: Sequence[Note] = ()) -> str:
    """A paragraph fit for a report: verdict, notes, what there is `also` to say, and the cautions of every result."""
    lines = [f"{case.name}."]
    for line in verdict(findings, units):
        detail = line.detail.replace(chr(10), "; ").replace(" · ", ", ")
        for sign in SIGNS.values():  # the words beside them say the same
            detail = detail.replace(f"{sign} ", "")
        lines.append(f"{line.name[:1].upper()}{line.name[1:]} {line.figure}: {detail}.")
    lines += [note.text for note in (*notes(findings, case, units), *also)]
    lines += [AXIAL_CAUTION, MODEL_CAUTION, LIMIT_CAUTION]
    return " ".join(lines)


def place_and_time(position: float, time: float, units: Units) -> str:
    """ "at 16.0 m, 4.90 ms"."""
    return f"at {place(position, units)}, {units.show(time, 'time')}"


def place(position: float, units: Units) -> str:
    """A distance near the struck end to thousandths of its unit: more digits than a mesh can tell would follow."""
    number = round(float(units.number(position, "length")), 3)
    if 0 < abs(number) < 0.1:
        return f"{number:.3f}{NO_BREAK}{units.unit('length')}".replace("-", "\u2212")
    return units.show(position if number else 0.0, "length")


def percent(share: float) -> str:
    """A share for reading: "51 %", "0.40 %", "109 %"; next to a limit so finely that it tells on which side."""
    digits = 4 if 0.995 < share < 1.005 and share != 1 else 3 if share >= 1 else 2
    return f"{rounded(100 * share, digits)} %"


def _stress(finding: StressFinding, units: Units, larger: float) -> Line:
    peak, worst = finding.peak, finding.worst
    name = f"peak {finding.sign}"
    if peak.value <= NOTHING * larger:
        return Line(f"0 {units.unit('stress')}", name, f"no {finding.sign} anywhere")
    if worst is None:
        detail = (
            f"{SIGNS['no limit']} {STATES['no limit']} · {place_and_time(peak.position, peak.time, units)}"
        )
    elif finding.differs:
        detail = (
            f"{place_and_time(peak.position, peak.time, units)}\n"
            f"{_state(worst)} in {worst.segment}, {place_and_time(worst.position, worst.time, units)}"
        )
    else:
        detail = f"{_state(worst)} · {place_and_time(peak.position, peak.time, units)}"
    if finding.first is not None and finding.struck_again is not None:
        before, its = finding.first, ""
        if before.share is not None:
            its = f" ({percent(before.share)})"
        detail += (
            f"\nafter a second blow, {units.show(finding.struck_again, 'time')}; before it "
            f"{units.show(before.value, 'stress')}{its} {place_and_time(before.position, before.time, units)}"
        )
    return Line(units.show(peak.value, "stress"), name, detail, finding.state, peak.time, peak.position)


def _striking(both: tuple[StressFinding, ...], units: Units) -> Iterator[Note]:
    """What a rod that strikes sees, where it is not grave enough for the verdict."""
    larger = max((one.peak.value for one in both), default=0.0)
    for one in both:
        if one in graver(both) or one.peak.value <= NOTHING * larger:
            continue
        state = "" if one.worst is None else f", {_state(one.worst)}"
        stress = units.show(one.peak.value, "stress")
        text = f"{one.peak.segment}, which strikes, sees up to {stress} of {one.sign}{state}."
        yield Note(text, one.peak.time, one.peak.position)


def _state(stress: StressAt) -> str:
    assert stress.share is not None
    return f"{SIGNS[stress.state]} {STATES[stress.state]}, {percent(stress.share)}"


def blows(finding: SetFinding, units: Units) -> str:
    """ "54 blows per 0.25 m", or per foot; more than a person would count are not counted."""
    per, name = (0.3048, "foot") if units.unit("length") in FEET else (0.25, "0.25 m")
    if finding.blows_per_metre is None:
        return "the toe does not stay down"
    counted = finding.blows_per_metre * per
    if counted > UNCOUNTED:
        return f"practically none, over {UNCOUNTED} blows per {name}"
    return f"{rounded(counted, 2 if counted < 10 else 3)} blows per {name}"


def _set(finding: SetFinding, units: Units) -> Line:
    detail = f"{blows(finding, units)} · toe moved {units.show(finding.toe_largest, 'small_length')}"
    if not finding.last:
        detail = f"! not the last word: the run ends too early · {detail}"
    figure = units.show(finding.value, "small_length")
    return Line(figure, "set per blow", detail, None, finding.time, finding.position)


SOURCES = {
    "ram": "the ram's energy at impact",
    "striker": "the striker's energy",
    "load": "the work of the load",
}


def _energy(finding: EnergyFinding, units: Units) -> Line:
    parts = []
    if finding.share is not None:
        energy = units.show(finding.source_energy, "energy")
        parts.append(f"{percent(finding.share)} of {SOURCES[finding.source]}, {energy}")
    if finding.drop_energy:
        energy = units.show(finding.drop_energy, "energy")
        parts.append(f"{percent(finding.value / finding.drop_energy)} of the drop energy, {energy}")
    figure = units.show(finding.value, "energy")
    return Line(
        figure,
        f"past {with_kind('gauge', finding.gauge)}",
        "\n".join(parts),
        None,
        finding.time,
        finding.position,
    )


def _happenings(all_of_them: tuple[Happening, ...], case: Case, units: Units) -> Iterator[Note]:
    """Each kind at each place once or twice, and how often in all."""
    times: dict[tuple[str, float], int] = {}
    for one in all_of_them:
        times[one.kind, one.position] = times.get((one.kind, one.position), 0) + 1
    for one in all_of_them:
        if one.again > 1 or (one.kind == "impact" and one.again == 0):
            continue
        count = times[one.kind, one.position]
        text = _happening(one, case, units)
        if one.again == (0 if count == 2 else 1) and count > 2:
            text += f" ({count} times in all)"
        yield Note(f"{text}.", one.time, one.position)


def _happening(one: Happening, case: Case, units: Units) -> str:
    at, when = place(one.position, units), units.show(one.time, "time")
    striking = "Striker" if case.load.kind == "striker" else "Ram"
    bare_cap = case.load.kind == "drop" and case.load.cap_mass > 0 and case.load.pile_cushion is None
    returning = "Ram or cap" if bare_cap else striking
    segment = case.member.segments[int(segment_of(case, one.position))].name  # type: ignore[arg-type]
    again = " again" if one.again else ""
    return {
        "impact": f"{returning} strikes{again} at {when}",
        "separation": f"{striking} leaves{again} at {when}",
        "first_yield": f"{segment} first yields at {at}, {when}",
        "crack": f"{segment} cracks at {at}, {when}",
        "joint_opened": f"The joint at {at} opens{again} at {when}",
        "joint_closed": f"The joint at {at} closes{again} at {when}",
        "wall_contact": f"The far end meets the wall{again} at {when}",
        "toe_lift": f"The toe lifts off the ground{again} at {when}",
    }[one.kind]


def warning(of: Remark, units: Units) -> str:
    """What the solver has to tell about a run, in the units shown."""
    return sentence(of, units.show)


def caution(of: Caution, units: Units) -> str:
    """One caution on the description of a case."""
    if of.kind == "gauge_near_end":
        return (
            f"{with_kind('Gauge', of.name)} is nearer than 1.5 diameters ({units.show(of.bound, 'length')}) "
            "to the struck end: the blow has not spread over the section there."
        )
    if of.kind == "short_pulse":
        return (
            f"The pulse is {units.show(of.value, 'length')} long, less than ten diameters: too short for rod theory, "
            "a real rod would spread it."
        )
    if of.kind == "wave_speed":
        slip = "check the units of its modulus and density"
        if of.suspect:
            slip = f"check the unit of its {of.suspect}, {units.show(of.given, of.suspect)}"
        return f"{of.name} would carry waves at {units.show(of.value, 'velocity')}, as no usual material does: {slip}."
    if of.kind == "stiff_cushion":
        return (
            f"The {of.name} of {units.show(of.value, 'stiffness')} is stiffer than a plate of the member's own section "
            "1 mm thick, and acts as none: check its unit, or leave it out."
        )
    if of.kind == "stiff_spring":
        return (
            f"The {of.name}, {units.show(of.value, 'stiffness')}, is stiffer than a plate of the member's own section "
            "1 mm thick: check its unit. Where a sudden front meets it single elements ring, so read gauges there, or "
            "fix the end."
        )
    if of.kind == "heavy_ram":
        return (
            f"The {of.name} of {units.show(of.value, 'mass')} is heavier than any, the largest of which have "
            "some hundred tonnes: check its unit."
        )
    if of.kind == "static_modulus":
        return (
            f"{of.name} carries waves at {units.show(of.value, 'velocity')}, slow for concrete: "
            "is its modulus the static one? Under a blow the dynamic modulus counts."
        )
    shown, bound = units.show(of.value, "smith_damping"), units.show(of.bound, "smith_damping")
    side = "below" if of.value < of.bound else "above"
    return (
        f"The damping factor of {of.name}, {shown}, is {side} the usual {bound}: "
        "is it in s/m, not in s/ft (1 s/ft = 3.28 s/m)?"
    )


def _share(value: float) -> str:
    return f"{value:.1e}" if value < 1e-3 else percent(value)
