"""Answers to the questions of a set sheet, as sentences."""

from __future__ import annotations

from typing import NamedTuple

from app.set_sheet.depth_words import limit_passed_words, refusal_words
from app.set_sheet.files import Answers
from app.set_sheet.words import (
    beside_criterion,
    criterion,
    force_text,
    level_below,
    level_text,
    on_the_way,
    varied_text,
)
from app.units import Units, rounded
from app.words import percent
from solver.studies import Cell, Sheet
from solver.studies.largest_blow import LargestBlow
from solver.studies.plan import at_value
from solver.studies.questions import ShownResistance
from solver.studies.uncertainty import Bands, Sampled


class Told(NamedTuple):
    """All that the answers say: when to stop, what is needed beside that, and what else was found out."""

    criterion: str
    beside: tuple[str, ...] = ()
    further: tuple[str, ...] = ()


def told_of(answers: Answers, sheet: Sheet, units: Units) -> Told:
    if answers.stop_at is None:
        return Told("")
    beside = [beside_criterion(answers.stop_at, units), on_the_way(sheet, answers.stop_at, units)]
    if answers.largest is not None:
        beside.append(largest_words(answers.largest, answers.stop_at, units))
    further = [shown_words(answers.shown, units)] if answers.shown is not None else []
    if answers.sampled is not None:
        further.append(sampled_words(answers.sampled, units))
    if answers.depths is not None:
        words = f"{refusal_words(answers.depths, units)}; {limit_passed_words(answers.depths, units)}"
        further.append(f"Down to depth: {words}.")
    elif answers.no_depths:
        further.append(f"Down to depth: {answers.no_depths}")
    return Told(criterion(answers.stop_at, units), tuple(words for words in beside if words), tuple(further))


#: A largest blow is looked for at one resistance; tension is often largest where the ground yields easily.
EASIER = " That is for this resistance alone: in easier driving before it, tension can be larger."


def largest_words(answer: LargestBlow, cell: Cell, units: Units) -> str:
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
        return f"Every {what} looked at up to {high} keeps all stresses within their limits at {at}.{smaller}{EASIER}"
    later = answer.passed is not None and answer.passed.again_only
    above = " Above it a limit is passed only after the ram has struck again." if later else ""
    return (
        f"Up to a {what} of {level_below(answer.level, units)} every stress stays within its limit at {at} "
        f"(to {percent(answer.tolerance)}).{_stop_with_it(answer, cell, units)}{above}{smaller}{EASIER}"
    )


def _stop_with_it(answer: LargestBlow, asked: Cell, units: Units) -> str:
    """Where the blow that was asked about is too hard: what set to stop at with the largest admissible one."""
    if not asked.over or answer.cell is None or answer.cell.set is None or not answer.cell.moves:
        return ""
    return f" With it, stop at a mean set of {units.show(answer.cell.set, 'small_length', 2)} or less."


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
    over = float(bands.over[row])
    if over in (0.0, 1.0):
        return f"A limit is passed in {'none' if over == 0 else 'all'} of these samples."
    return f"A limit is passed with a probability of {percent(over)}."
