"""Curves over time: the force pair at a gauge, one quantity at several gauges, set and energy."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from app.energies import energies_by_word
from app.look.colours import PRINT
from app.report.figures.marks import Anchor, Figure, Mark, Text
from app.report.figures.plot import SMALL, WIDTH, legend, plot_in
from app.report.figures.scales import Array, bounds_of
from app.report.lettering import fitted
from app.units import Units
from solver import GaugeRecord, Result
from solver.answer.waves import arrivals, returns_at

HEIGHT = 190.0
#: Of the plots that share a page with the x-t diagram.
LOWER = 168.0
SECOND: tuple[float, ...] = (5, 2)
#: Curves in one plot; more gauges than that go into further plots.
MOST_CURVES = 6
#: Kinds of line beside the hue, so that curves are told apart in print without colour.
DASHES: tuple[tuple[float, ...], ...] = ((), (6, 2), (2, 1.5), (8, 2, 2, 2), (4, 1, 1, 1), (10, 3))
SIGNED = ("force", "stress")


def largest(*values: Array) -> float:
    """Largest magnitude, 0 of nothing."""
    return max((float(np.abs(v).max()) for v in values if len(v)), default=0.0)


def sign_words(units: Units) -> str:
    """ "compression +" for the label of an axis."""
    return units.sign_word.lower()


def force_pair(result: Result, gauge: GaugeRecord, units: Units) -> Figure:
    """Force and impedance times velocity: apart by twice the up-going wave (d'Alembert)."""
    sign = units.sign
    near = largest(gauge.force, gauge.impedance * gauge.velocity)
    force = units.number(sign * gauge.force, "force", near)
    moved = units.number(-sign * gauge.impedance * gauge.velocity, "force", near)
    minus = "" if sign < 0 else "−"
    time, unit = _time(gauge.time, units)
    label = f"Force, {units.unit('force', near)} ({sign_words(units)})"
    plot = plot_in((0, time[-1]), bounds_of(force, moved), WIDTH, 0, HEIGHT, (f"Time, {unit}", label))
    every = max(1, len(time) // 600)
    plot.area(time[::every], force[::every], moved[::every], PRINT.soft_ink, 0.12)
    plot.curve(time, force, PRINT.ink, 1.0)
    plot.curve(time, moved, PRINT.gauge(0), 1.0, SECOND)
    if gauge.on == "member":
        for arrival in arrivals(result.case, passages=1):
            when = returns_at(result.case, arrival, gauge.position)
            if when is not None and arrival.kind in ("toe", "far_end") and when < gauge.time[-1]:
                at = units.number(when, "time", float(gauge.time[-1]))
                plot.upright(at, PRINT.line)
                told = f"return from the {arrival.kind.replace('_', ' ')}, {units.show(when, 'time')}"
                place, late = plot.x.at(at), when > 0.6 * gauge.time[-1]
                anchor: Anchor = "end" if late else "start"
                plot.say(place + (-3 if late else 3), plot.y.end + SMALL, told, PRINT.soft_ink, anchor)
    entries = [
        ("force", PRINT.ink, ()),
        (f"{minus}impedance × velocity", PRINT.gauge(0), SECOND),
    ]
    marks, taken = legend(entries, plot.x.start, HEIGHT + 4, plot.x.end - plot.x.start)
    name = f"Force and impedance times velocity at gauge {fitted(gauge.name, 8, 240)}"
    return Figure(name, WIDTH, HEIGHT + taken, (*plot.marks, *marks))


def gauge_traces(
    result: Result, gauges: Sequence[GaugeRecord], quantity: str, dimension: str, units: Units
) -> Figure:
    """One quantity at up to `MOST_CURVES` gauges over time."""
    signed = quantity in SIGNED
    sign = units.sign if signed else 1
    series = [sign * getattr(g, quantity) for g in gauges]
    near = largest(*series)
    shown = [units.number(s, dimension, near) for s in series]
    time, unit = _time(gauges[0].time, units)
    turned = f" ({sign_words(units)})" if signed else " (positive towards the far end)"
    label = f"{quantity.capitalize()}, {units.unit(dimension, near)}{turned}"
    plot = plot_in((0, time[-1]), bounds_of(*shown), WIDTH, 0, HEIGHT, (f"Time, {unit}", label))
    names = [g.name for g in result.case.gauges]
    entries = []
    for gauge, values in zip(gauges, shown, strict=True):
        number = names.index(gauge.name)
        hue, dash = PRINT.gauge(number), DASHES[number % len(DASHES)]
        plot.curve(time, values, hue, 0.9, dash)
        entries.append((fitted(gauge.name, SMALL, 150), hue, dash))
    marks, taken = legend(entries, plot.x.start, HEIGHT + 4, plot.x.end - plot.x.start)
    return Figure(f"{quantity.capitalize()} at the gauges", WIDTH, HEIGHT + taken, (*plot.marks, *marks))


def energy_over_time(result: Result, units: Units) -> Figure:
    """Where the energy is at each time: put in, in motion, stored, lost."""
    energies = energies_by_word(result.ledger)
    near = largest(*energies.values())
    shown = {word: units.number(values, "energy", near) for word, values in energies.items()}
    time, unit = _time(result.ledger.time, units)
    labels = (f"Time, {unit}", f"Energy, {units.unit('energy', near)}")
    plot = plot_in((0, time[-1]), bounds_of(*shown.values()), WIDTH, 0, LOWER, labels)
    entries = []
    for number, (word, values) in enumerate(shown.items()):
        hue = PRINT.ink if word == "put in" else PRINT.gauge(number)
        dash = DASHES[number % len(DASHES)]
        plot.curve(time, values, hue, 1.2 if word == "put in" else 0.9, dash)
        entries.append((word, hue, dash))
    marks, taken = legend(entries, plot.x.start, LOWER + 4, plot.x.end - plot.x.start)
    return Figure("Energy over time", WIDTH, LOWER + taken, (*plot.marks, *marks))


def set_over_time(result: Result, units: Units) -> Figure:
    """Movement of the struck end and of the toe, and the set that stays."""
    fields = result.fields
    member = np.flatnonzero(fields.position > 0)
    first = fields.displacement[:, member[0]].astype(float)
    last = fields.displacement[:, member[-1]].astype(float)
    near = largest(first, last)
    shown = [units.number(values, "small_length", near) for values in (first, last)]
    time, unit = _time(fields.time, units)
    labels = (
        f"Time, {unit}",
        f"Movement, {units.unit('small_length', near)} (positive towards the far end)",
    )
    plot = plot_in((0, time[-1]), bounds_of(*shown), WIDTH, 0, LOWER, labels)
    plot.curve(time, shown[0], PRINT.ink, 1.0)
    plot.curve(time, shown[1], PRINT.gauge(0), 1.0, SECOND)
    extra: list[Mark] = []
    if result.set is not None:
        at = float(units.number(result.set, "small_length", near))
        plot.level(at, PRINT.line)
        told = f"set {units.show(result.set, 'small_length')}"
        extra.append(Text(plot.x.end - 2, plot.y.at(at) - 3, told, PRINT.ink, SMALL, "end"))
    entries = [("struck end", PRINT.ink, ()), ("toe or far end", PRINT.gauge(0), SECOND)]
    marks, taken = legend(entries, plot.x.start, LOWER + 4, plot.x.end - plot.x.start)
    return Figure("Movement of both ends", WIDTH, LOWER + taken, (*plot.marks, *extra, *marks))


def _time(time: Array, units: Units) -> tuple[Array, str]:
    last = float(time[-1]) if len(time) else 0.0
    shown = np.asarray(units.number(np.asarray(time), "time", last))
    return (shown if last > 0 else np.array([0.0, 1.0])), units.unit("time", last)
