"""What each kind of strip shows, as curves over time in SI, in the sign of the screen."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass, field, replace

import numpy as np
from numpy.typing import NDArray
from PySide6.QtCore import Qt

from app.energies import energies_by_word
from app.laid_over import Over
from app.look.palette import palette
from app.units import Units
from solver import Case, GaugeRecord, Result
from solver.model.derived import travel_time

Array = NDArray[np.float64]
SOLID, DASHED, DOTTED = Qt.PenStyle.SolidLine, Qt.PenStyle.DashLine, Qt.PenStyle.DotLine

#: Words of the chips, in their order. Those of one gauge take its name.
CHIPS = {
    "force_pair": "Force pair",
    "velocity": "Velocity",
    "stress": "Stress",
    "displacement": "Displacement",
    "waves": "Waves ↓ ↑",
    "energy": "Energy",
}
#: Strips of one gauge.
OF_ONE_GAUGE = ("force_pair", "waves")
#: Share of its largest value from which on a wave counts as being at its top.
FLAT = 0.995


@dataclass(frozen=True, eq=False)
class Curve:
    """One curve: its name as it stands on it, its colour, times (s) and values (SI), both of shape (n,). `faint`: the
    second of a pair, drawn lighter than the first; `over`: number of the case laid over that it belongs to."""

    name: str
    hue: str
    time: Array
    values: Array
    style: Qt.PenStyle = SOLID
    faint: bool = False
    over: int | None = None


@dataclass(frozen=True, eq=False)
class Content:
    """Curves of one strip. `filled`: the area between the first two is filled and named so. `ticks`: times (s) from
    the first on at which something comes back, named so."""

    dimension: str
    curves: tuple[Curve, ...]
    filled: str = ""
    ticks: tuple[float, ...] = ()
    ticks_named: str = ""
    zero: bool = field(default=True)


def content_of(kind: str, result: Result, gauge: str | None, units: Units) -> Content:
    """The curves of a kind of strip; `gauge` is the one that a strip of one gauge is about."""
    record = result.gauges.get(gauge) if gauge is not None else None
    if kind in OF_ONE_GAUGE:
        if record is None:
            return Content("force", ())
        return (_force_pair if kind == "force_pair" else _waves)(result, record, units)
    return MAKERS[kind](result, units)


def content_over(own: Content, strip: str, over: Sequence[Over], units: Units) -> Content:
    """The curves of a strip with those of the cases laid over it, of the gauges with the same names."""
    kind, curves = strip.partition(":")[0], list(own.curves)
    for one in over:
        if one.result is None:
            continue
        for curve in content_of(kind, one.result, gauge_of(strip, one.result.case), units).curves:
            named = f"{curve.name} · {one.name}"
            curves.append(replace(curve, name=named, over=one.number))
    return replace(own, curves=tuple(curves))


def gauge_of(strip: str, case: Case) -> str | None:
    """Name of the gauge that a strip of one gauge is about: "force_pair:Toe" says it, otherwise the first one."""
    names = [g.name for g in case.gauges]
    wanted = strip.partition(":")[2]
    return wanted if wanted in names else next(iter(names), None)


def time_to_far_end(case: Case, position: float) -> float:
    """Time a wave needs from a place on the member to its far end, s."""
    total, start = 0.0, 0.0
    for segment in case.member.segments:
        beyond = min(max(start + segment.length - position, 0.0), segment.length)
        total += travel_time(segment, case.materials) * beyond / segment.length
        start += segment.length
    return total


def _hue(result: Result, name: str) -> str:
    return palette().gauge([g.name for g in result.case.gauges].index(name))


def _force_pair(result: Result, gauge: GaugeRecord, units: Units) -> Content:
    hue, sign = _hue(result, gauge.name), units.sign
    moved = -sign * gauge.impedance * gauge.velocity
    # With tension positive it is minus impedance times velocity that lies on the force in a down-going wave.
    product = "impedance × velocity" if sign < 0 else "− impedance × velocity"
    curves = (
        Curve("force", hue, gauge.time, sign * gauge.force),
        Curve(product, hue, gauge.time, moved, faint=True),
    )
    ticks: tuple[float, ...] = ()
    if gauge.on == "member" and len(gauge.time):
        there_and_back = 2 * time_to_far_end(result.case, gauge.position)
        first = _first_arrival(gauge, there_and_back)
        if there_and_back > 0:
            ticks = _returns(first, there_and_back, 2 * time_to_far_end(result.case, 0.0), gauge.time[-1])
    named = ""
    if len(ticks) > 1:
        named = f"2L/c = {units.show(ticks[1] - ticks[0], 'time')}, gauge to far end and back"
    return Content("force", curves, "gap = 2 × up-going wave", ticks, named)


def _returns(first: float, there_and_back: float, period: float, last: float) -> tuple[float, ...]:
    """The blow at the gauge (s), and when it comes back from the far end: once, and then, sent down again by the
    struck end, after each further period 2L/c of the whole member."""
    count = int(max(last - first - there_and_back, 0.0) / period) + 1
    back = (first + there_and_back + n * period for n in range(min(count, 50)))
    return (first, *(moment for moment in back if moment <= last))


def _first_arrival(gauge: GaugeRecord, there_and_back: float) -> float:
    """When the blow itself is largest at a gauge, s: the top of the down-going wave, or where its flat top begins, in
    the time that its beginning takes to the far end."""
    down = np.abs(gauge.down_wave)
    begun = float(gauge.time[int(np.argmax(down >= 0.3 * down.max()))])
    within = np.where(gauge.time <= begun + there_and_back / 2, down, 0.0)
    return float(gauge.time[int(np.argmax(within >= FLAT * within.max()))])


def _waves(result: Result, gauge: GaugeRecord, units: Units) -> Content:
    hue, sign = _hue(result, gauge.name), units.sign
    return Content(
        "force",
        (
            Curve("↓ down-going wave", hue, gauge.time, sign * gauge.down_wave),
            Curve("↑ up-going wave", hue, gauge.time, sign * gauge.up_wave, faint=True),
        ),
    )


def _of_all_gauges(quantity: str, dimension: str, signed: bool) -> Callable[[Result, Units], Content]:
    def make(result: Result, units: Units) -> Content:
        sign = units.sign if signed else 1
        curves = (
            Curve(g.name, _hue(result, g.name), g.time, sign * getattr(g, quantity))
            for g in result.gauges.values()
        )
        return Content(dimension, tuple(curves))

    return make


def _energy(result: Result, units: Units) -> Content:
    curves = [
        Curve(
            word,
            palette().ink if word == "put in" else palette().soft_ink,
            result.ledger.time,
            values,
            SOLID if word in ("put in", "motion", "elastic") else DASHED,
        )
        for word, values in energies_by_word(result.ledger).items()
    ]
    first = next((g for g in result.gauges.values() if g.on == "member"), None)
    if first is not None:
        passed = first.transferred_energy
        curves.append(Curve(f"past {first.name}", _hue(result, first.name), first.time, passed))
    return Content("energy", tuple(curves))


MAKERS: dict[str, Callable[[Result, Units], Content]] = {
    "velocity": _of_all_gauges("velocity", "velocity", False),
    "stress": _of_all_gauges("stress", "stress", True),
    "displacement": _of_all_gauges("displacement", "small_length", False),
    "energy": _energy,
}
