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
            return f"Must be {word} {f'{bound:g}' if spec.whole else units.show(bound, spec.dimension)}."
    return None
