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


def member_words(case: Case, units: Units) -> str:
    """Member, ram and drop in one or two lines."""
    segments = case.member.segments
    materials = ", ".join(dict.fromkeys(s.material for s in segments))
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
    load = case.load
    if isinstance(load, Drop) and load.cushion is not None:
        stiffness = units.show(load.cushion.loading_stiffness, "stiffness")
        found.append(
            f"Cushion {stiffness}, coefficient of restitution {load.cushion.restitution:g}; cap "
            f"{units.show(load.cap_mass, 'mass')}."
        )
    ground = case.ground
    if ground is not None:
        parts: list[tuple[str, Resistance]] = [(layer.name, layer) for layer in ground.layers]
        parts += [("shaft", ground.shaft_total)] if ground.shaft_total else []
        parts += [("toe", ground.toe)] if ground.toe else []
        words = [
            f"{name} {units.show(part.quake, 'small_length')} and {units.show(part.damping, 'smith_damping')}"
            for name, part in parts
            if part.quake is not None and part.damping is not None
        ]
        if words:
            found.append(f"Quake and damping factor: {'; '.join(words)}.")
    unsettled = [c for c in sheet.cells if c.set is not None and not c.at_rest]
    if unsettled:
        found.append(
            f"{len(unsettled)} of {len(sheet.cells)} points did not come to rest by themselves: settled statically."
        )
    failed = [c for c in sheet.cells if c.problem]
    if failed:
        found.append(f"{len(failed)} points could not be solved: {failed[0].problem}")
    return found


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
