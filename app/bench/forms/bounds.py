"""The bounds that the model declares, told in the shown unit before the document is asked."""

from __future__ import annotations

from app.bench.forms.spec import NumberSpec
from app.units import Units


def breach_of(spec: NumberSpec, value: float | None, units: Units) -> str | None:
    """The sentence on the bound that a number breaks, `None` where it keeps all."""
    if value is None:
        return None
    bounds = spec.bounds
    for word, bound, broken in (
        ("more than", bounds.above, bounds.above is not None and value <= bounds.above),
        ("at least", bounds.at_least, bounds.at_least is not None and value < bounds.at_least),
        ("less than", bounds.below, bounds.below is not None and value >= bounds.below),
        ("at most", bounds.at_most, bounds.at_most is not None and value > bounds.at_most),
    ):
        if broken and bound is not None:
            sentence = f"Must be {word} {f'{bound:g}' if spec.whole else _beside(bound, value, spec, units)}."
            percent = spec.dimension == "none" and bound == 1 and 5 <= value <= 100
            return (
                f"{sentence} {value:g} of a hundred is {value / 100:g} or '{value:g} %'."
                if percent
                else sentence
            )
    return None


def _beside(bound: float, value: float, spec: NumberSpec, units: Units) -> str:
    """The bound with as many digits as tell it apart from the number."""
    shown = [
        (units.show(bound, spec.dimension, n), units.show(value, spec.dimension, n)) for n in range(3, 8)
    ]
    return next((mine for mine, other in shown if mine != other or bound == value), shown[-1][0])
