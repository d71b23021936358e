"""What a study of depths says, in sentences and units of the reader. No Qt."""

from __future__ import annotations

from app.set_sheet.words import force_text, reading
from app.units import Units
from solver.studies.depth import REFUSAL, DepthPoint, Depths


def depth_summary(depths: Depths, units: Units) -> str:
    """What happens on the way down, in one line."""
    last = depths.points[-1]
    parts = [f"At {units.show(last.penetration, 'length')}: {force_text(last.shaft + last.toe, units)}"]
    blows, seconds = depths.blows[-1], depths.seconds[-1]
    first = units.show(depths.points[0].penetration, "length")
    if blows < float("inf"):
        parts.append(f"{blows:.0f} blows and {seconds / 60:.0f} minutes from {first} on")
    parts += [refusal_words(depths, units), limit_passed_words(depths, units)]
    failed = [p for p in depths.points if p.cell.problem]
    if failed:
        parts.append(f"not solved at {units.show(failed[0].penetration, 'length')}: {failed[0].cell.problem}")
    return " · ".join(parts)


def refusal_words(depths: Depths, units: Units) -> str:
    refusal, least = depths.first_refusal, units.show(REFUSAL, "small_length", 2)
    if refusal is None:
        return "the member does not refuse on the way"
    return f"refuses from {units.show(refusal.penetration, 'length')} on (set below {least})"


def limit_passed_words(depths: Depths, units: Units) -> str:
    over = depths.first_over
    if over is not None and over.cell.worst is not None:
        sign, stress = over.cell.worst
        place = f"{stress.segment} at {units.show(stress.position, 'length')}"
        later = ", after the ram struck again" if over.cell.again_only else ""
        return f"✕ {sign} limit first passed at {units.show(over.penetration, 'length')}, in {place}{later}"
    if any(p.cell.share is not None for p in depths.points):
        return "✓ within limits all the way"
    return "no limit given"


def depth_reading(point: DepthPoint, per: str, units: Units) -> str:
    """One depth in one line."""
    shares = f"shaft {force_text(point.shaft, units)}, toe {force_text(point.toe, units)}"
    figures = reading(point.cell, per, units).partition(": ")[2]
    return f"{units.show(point.penetration, 'length')} deep, {shares} · {figures}"
