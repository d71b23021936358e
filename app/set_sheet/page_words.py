"""What the page for the rig says beside the picture: member and blow, what is assumed, and the cautions."""

from __future__ import annotations

from app.set_sheet.words import force_text, varied_text
from app.units import Units
from app.words import caution, percent
from solver import Case
from solver.answer.cautions import cautions_of
from solver.model.derived import impact_energy, ram_mass
from solver.model.load import Drop
from solver.model.surroundings import Resistance
from solver.studies import Sheet, resistance_of

#: Materials, and parts of the ground with their quakes and dampings, that are told one by one.
NAMED = 8


def member_words(case: Case, units: Units) -> str:
    """Member, ram and drop in one or two lines."""
    segments = case.member.segments
    used = list(dict.fromkeys(s.material for s in segments))
    more = f" and {len(used) - NAMED} more materials" if len(used) > NAMED else ""
    materials = ", ".join(used[:NAMED]) + more
    count = "" if len(segments) == 1 else f" of {len(segments)} segments"
    parts = [f"Member: {units.show(case.member.length, 'length')}{count}, {materials}."]
    load = case.load
    if isinstance(load, Drop):
        mass = units.show(ram_mass(load, case.materials), "mass")
        energy = units.show(impact_energy(load, case.materials), "energy")
        fall = ""
        if load.drop_height is not None and load.efficiency is not None:
            fall = f", falls {units.show(load.drop_height, 'length')} with an efficiency of {percent(load.efficiency)}"
        parts.append(f"Ram: {mass}{fall}, {energy} as it strikes.")
    now = resistance_of(case)
    share = percent(now.toe / now.total) if now.total else "no"
    parts.append(f"Ground of the case: {force_text(now.total, units)} in all, {share} of it under the toe.")
    return " ".join(parts)


def assumed(sheet: Sheet, units: Units) -> list[str]:
    """What stands behind the picture."""
    plan, case = sheet.plan, sheet.plan.case
    kept = (
        "the distribution along the shaft and the toe's share are kept"
        if plan.vary == "all"
        else "the shaft is kept and the toe takes the rest"
    )
    blows = (
        "one blow on ground that was at rest"
        if case.run.blows == 1
        else "the last of repeated blows, each on ground as the one before left it"
    )
    low, high = units.show(plan.resistances[0], "force"), units.show(plan.resistances[-1], "force")
    found = [
        f"Total resistance from {low} to {high}: {kept}. Lines differ in the {varied_text(plan.levels[0])}; "
        "all else is as in the case.",
        f"Each point is {blows}, solved until the member is at rest; the set is the permanent movement of the toe.",
    ]
    found += [*_cushions(case, units), *_quakes(case, units)]
    unsettled = [c for c in sheet.cells if c.set is not None and not c.at_rest]
    if unsettled:
        found.append(
            f"{len(unsettled)} of {len(sheet.cells)} points did not come to rest by themselves: settled statically."
        )
    failed = [c for c in sheet.cells if c.problem]
    if failed:
        found.append(f"{len(failed)} points could not be solved: {failed[0].problem}")
    return found


def _cushions(case: Case, units: Units) -> list[str]:
    load = case.load
    if not isinstance(load, Drop):
        return []
    both = [("Cushion", load.cushion), ("pile cushion", load.pile_cushion)]
    words = [
        f"{name} {units.show(one.loading_stiffness, 'stiffness')}, coefficient of restitution {one.restitution:g}"
        for name, one in both
        if one is not None
    ]
    cap = [f"cap {units.show(load.cap_mass, 'mass')}"] if load.cap_mass else []
    told = "; ".join([*words, *cap])
    return [f"{told[0].upper()}{told[1:]}."] if told else []


def _quakes(case: Case, units: Units) -> list[str]:
    """Each part by its name; of many only from where to where."""
    ground = case.ground
    if ground is None:
        return []
    parts: list[tuple[str, Resistance]] = [(layer.name, layer) for layer in ground.layers]
    parts += [("shaft", ground.shaft_total)] if ground.shaft_total else []
    parts += [("toe", ground.toe)] if ground.toe else []
    told = [(name, one.quake, one.damping) for name, one in parts]
    known = [
        (name, quake, damping) for name, quake, damping in told if quake is not None and damping is not None
    ]
    if len(known) > NAMED:
        quakes, dampings = [quake for _, quake, _ in known], [damping for _, _, damping in known]
        spans = [
            f"{units.show(min(values), dimension)} to {units.show(max(values), dimension)}"
            for values, dimension in ((quakes, "small_length"), (dampings, "smith_damping"))
        ]
        return [f"Quake and damping factor of {len(known)} layers and toe: {spans[0]} and {spans[1]}."]
    words = [
        f"{name} {units.show(quake, 'small_length')} and {units.show(damping, 'smith_damping')}"
        for name, quake, damping in known
    ]
    return [f"Quake and damping factor: {'; '.join(words)}."] if words else []


def cautions(sheet: Sheet, units: Units) -> list[str]:
    """In few words, what the page does not say."""
    found = [
        "A model's answer, for a licensed engineer to judge under local codes. Resistance during driving is not the "
        "resistance later: ground sets up or relaxes.",
        "Stresses are the axial average; bending adds to them.",
    ]
    if all(c.share is None for c in sheet.cells):
        found.append("No limit is given for the member: whether it survives is not judged.")
    found += [caution(one, units) for one in cautions_of(sheet.plan.case)]
    return found[:5]
