"""Answers to the questions of a set sheet, as sentences."""

from __future__ import annotations

from app.set_sheet.words import force_text, level_below, level_text, varied_text
from app.units import Units, rounded
from app.words import percent
from solver.studies import Cell
from solver.studies.plan import at_value
from solver.studies.questions import ShownResistance
from solver.studies.safe_blow import SafeBlow
from solver.studies.uncertainty import Bands, Sampled


def safe_words(answer: SafeBlow, cell: Cell, units: Units) -> str:
    """Which blow keeps every stress inside its limit?"""
    what, at = varied_text(cell.level), force_text(answer.resistance, units)
    if answer.why == "no limit":
        return "No material of the member has a limit: give one to be told the largest blow."
    low, high, least = (
        level_text(at_value(cell.level, value), units) for value in (answer.low, answer.high, answer.at_least)
    )
    if answer.why == "none within" or answer.level is None:
        return f"None of {answer.steps} values of the {what} from {low} to {high} keeps within the limits at {at}."
    smaller = {
        "": "",
        "later": f" Below {least} a limit is passed, but only after the ram has struck again on the ringing member.",
        "at once": f" Below {least} a limit is passed as well.",
    }[answer.smaller_pass]
    if answer.why == "all within":
        return f"Every {what} looked at up to {high} keeps all stresses within their limits at {at}.{smaller}"
    later = answer.passed is not None and answer.passed.again_only
    above = " Above it a limit is passed only after the ram has struck again." if later else ""
    return (
        f"Up to a {what} of {level_below(answer.level, units)} every stress stays within its limit at {at} "
        f"(to {percent(answer.tolerance)}).{above}{smaller}"
    )


def shown_words(answer: ShownResistance, units: Units) -> str:
    """What does a measured set show? A band, and what lies outside of the range."""
    measured = f"{units.show(answer.measured, 'small_length')} ± {units.show(answer.error, 'small_length')}"
    lead = f"A mean set of {measured} shows"
    low, high = answer.at_least, answer.at_most
    if low is None and high is None:
        return (
            f"{lead} no resistance in the range from {force_text(answer.lowest, units)} "
            f"to {force_text(answer.highest, units)}."
        )
    below = force_text(low, units) if low is not None else f"less than {force_text(answer.lowest, units)}"
    above = force_text(high, units) if high is not None else f"more than {force_text(answer.highest, units)}"
    middle = f", {force_text(answer.middle, units)} in the middle" if answer.middle is not None else ""
    return f"{lead} {below} to {above}{middle} (each to {percent(answer.tolerance)})."


def sampled_words(sampled: Sampled, units: Units) -> str:
    """What the samples say at the point that was asked for, and what matters most."""
    bands, parts = sampled.asked, []
    if bands is not None:
        at = f"At {force_text(float(bands.resistances[0]), units)} with {level_text(bands.level, units)}"
        parts.append(f"{at}, eight of ten of {bands.each} samples give {_ranges(bands, 0, units)}.")
        parts.append(_passed(bands, 0))
    ranked = [f"{one.label} ({rounded(one.on_set, 2)})" for one in sampled.influences[:3]]
    parts.append(f"What matters most for the set (rank correlation): {', '.join(ranked)}.")
    stress = sorted(sampled.influences, key=lambda one: -abs(one.on_stress))[:2]
    parts.append(
        f"For the stresses: {', '.join(f'{one.label} ({rounded(one.on_stress, 2)})' for one in stress)}."
    )
    if sampled.failed:
        parts.append(f"{sampled.failed} samples could not be solved.")
    return " ".join(parts)


def bands_at(sampled: Sampled, cell: Cell, units: Units) -> str:
    """What the samples say at one point of the sheet; "" where it was not sampled."""
    bands = sampled.of(cell.level)
    rows = [] if bands is None else [i for i, r in enumerate(bands.resistances) if r == cell.resistance]
    if bands is None or not rows:
        return ""
    return (
        f"Eight of ten of {bands.each} samples: {_ranges(bands, rows[0], units)}. {_passed(bands, rows[0])}"
    )


def _ranges(bands: Bands, row: int, units: Units) -> str:
    found = []
    for name, values, dimension in (
        ("a set of", bands.set[row], "small_length"),
        ("compression", bands.compression[row], "stress"),
        ("tension", bands.tension[row], "stress"),
    ):
        low, middle, high = (units.show(max(float(v), 0.0), dimension) for v in values)
        found.append(f"{name} {low} to {high} (middle {middle})")
    return ", ".join(found)


def _passed(bands: Bands, row: int) -> str:
    if bands.over is None:
        return "No limit is given, so no probability can be told."
    return f"A limit is passed with a probability of {percent(float(bands.over[row]))}."
