"""Every published check, and that the checks themselves can fail."""

from __future__ import annotations

from dataclasses import replace

import pytest

from solver.numerics.chain import build_chain
from solver.run import solve_chain
from tests.published import rods
from tests.published.registry import Check, Outcome, all_checks, history, value

CHECKS = {check.name: check for check in all_checks()}


@pytest.mark.parametrize("name", CHECKS)
def test_published(name):
    outcome = CHECKS[name].run()
    off = [
        f"{c.what}: expected {c.expected:.10g}, found {c.found:.10g} {c.unit}, off by {c.difference:.3g}, "
        f"allowed {outcome.allowed(c):.3g}"
        for c in outcome.compared
        if c.difference > outcome.allowed(c)
    ]
    assert outcome.holds, "\n".join(off) or "nothing was compared"


def test_there_are_enough_and_each_tells_what_it_is():
    assert len(CHECKS) >= 60
    assert len(CHECKS) == len(all_checks()), "two checks have one name"
    for check in CHECKS.values():
        for text in (check.model, check.title, check.source, check.formula, check.why, check.share_of):
            assert text.strip(), check.name
        assert 0 < check.tolerance < 3


@pytest.mark.parametrize(
    ("compared", "holds"),
    [
        ((), False),
        ((value("one", 1.0, 1.0005),), True),
        ((value("one", 1.0, 1.002),), False),
        ((value("one", 1.0, 1.002, tolerance=0.01),), True),
        ((value("one", 1.0, float("nan")),), False),
        ((history("line", [0.0, 1.0], [0.0, 1.0]), history("line", [0.0, 2.0], [0.0, 2.1])), False),
        ((history("line", [0.0, 1.0], [float("nan"), 1.0]),), False),
    ],
)
def test_an_outcome_holds_only_within_its_tolerance(compared, holds):
    assert Outcome(compared, (), 1e-3).holds is holds


#: Checks that hold to round-off at Courant number 1, and so must notice any step that is shorter.
EXACT = [
    name
    for name in CHECKS
    if name.startswith(("dalembert: every_", "impedance_steps: lay", "impedance_steps: def", "striker: "))
]


@pytest.mark.parametrize("name", EXACT)
def test_a_solver_that_is_only_nearly_right_fails(name, monkeypatch):
    """The same program at Courant number 0.99: second-order accurate, and off by more than these checks allow."""

    def a_little_worse(case):
        chain = build_chain(case)
        return solve_chain(replace(chain, dt=0.99 * chain.dt))

    monkeypatch.setattr(rods, "solve", a_little_worse)
    check: Check = CHECKS[name]
    assert not check.run().holds
