"""Samples of what is not known: repeatable, spread as they should be, and telling what matters."""

import numpy as np
import pytest

from solver.studies import StudyError, plan_of, resistance_of
from solver.studies.uncertainty import factors_of, sampled
from solver.studies.unknowns import INPUTS, USUAL, Unknown, usual_unknowns
from tests.studies.piles import layer, pile


def test_hypercube_has_one_sample_in_each_stripe_and_the_quantiles_asked_for() -> None:
    unknowns = (
        Unknown(what="quake", low=0.5, high=1.5),
        Unknown(what="damping", low=0.5, high=2.0, spread="likely"),
    )
    factors = factors_of(unknowns, 400, (7, 3))
    stripes = np.floor((factors[:, 0] - 0.5) * 400).astype(int)
    assert sorted(stripes) == list(range(400))
    # a Latin hypercube of 400 has 20 samples in each 5 % tail, to one
    assert abs((factors[:, 1] < 0.5).sum() - 20) <= 1
    assert abs((factors[:, 1] > 2.0).sum() - 20) <= 1
    assert np.array_equal(factors, factors_of(unknowns, 400, (7, 3)))
    assert not np.array_equal(factors, factors_of(unknowns, 400, (8, 3)))


@pytest.mark.parametrize("unknown", USUAL, ids=lambda u: u.what)
def test_each_input_changes_what_it_names_and_keeps_the_total(unknown: Unknown) -> None:
    for case in (pile(), pile(layers=[layer("Clay", 4.0, 20e3), layer("Sand", 10.0, 60e3)])):
        entry = INPUTS[unknown.what]
        assert entry.present(case)
        changed = entry.changed(case, 0.9)
        assert changed != case
        assert resistance_of(changed).total == pytest.approx(resistance_of(case).total, rel=1e-12)
        assert entry.changed(changed, 1 / 0.9).model_dump_json() != changed.model_dump_json()


def test_bands_repeat_with_the_seed_whatever_the_number_of_workers() -> None:
    plan = plan_of(pile(elements=20), [0.5e6, 1.0e6])
    unknowns = usual_unknowns(plan.case)
    one = sampled(plan, unknowns, samples=60, seed=5, workers=1)
    two = sampled(plan, unknowns, samples=60, seed=5, workers=3)
    assert one is not None
    assert two is not None
    assert np.array_equal(one.lines[0].set, two.lines[0].set)
    assert one.influences == two.influences
    assert (one.lines[0].set[:, 0] < one.lines[0].set[:, 1]).all()
    assert (one.lines[0].set[:, 1] < one.lines[0].set[:, 2]).all()
    # twice the resistance moves less, whatever is unknown here
    assert one.lines[0].set[1, 2] < one.lines[0].set[0, 0]
    other = sampled(plan, unknowns, samples=60, seed=6)
    assert other is not None
    assert not np.array_equal(one.lines[0].set, other.lines[0].set)


def test_what_matters_most_is_what_was_made_to() -> None:
    plan = plan_of(pile(elements=20, limit=None), [0.8e6])
    wide = (Unknown(what="efficiency", low=0.5, high=1.2), Unknown(what="damping", low=0.99, high=1.01))
    bands = sampled(plan, wide, samples=60)
    assert bands is not None
    assert bands.lines[0].over is None
    assert bands.influences[0].label == "energy of the blow"
    assert bands.influences[0].on_set > 0.95
    assert abs(bands.influences[1].on_set) < 0.5


def test_probability_counts_the_samples_beyond_the_limit() -> None:
    unknowns = (Unknown(what="efficiency", low=0.5, high=1.2),)
    plan = plan_of(pile(elements=20, limit=1e6), [0.8e6])
    bands = sampled(plan, unknowns, samples=50)
    assert bands is not None
    assert bands.lines[0].over is not None
    assert bands.lines[0].over[0] == 1.0
    middle = plan_of(pile(elements=20, limit=float(bands.lines[0].compression[0, 1])), [0.8e6])
    half = sampled(middle, unknowns, samples=50)
    assert half is not None
    assert half.lines[0].over is not None
    assert half.lines[0].over[0] == pytest.approx(0.5, abs=0.03)


def test_ranges_that_fit_no_case_are_refused_with_a_sentence() -> None:
    plan = plan_of(pile(elements=20, efficiency=0.9), [0.8e6])
    with pytest.raises(StudyError, match="more than 1"):
        sampled(plan, (Unknown(what="efficiency", low=0.9, high=1.4),), samples=50)
    with pytest.raises(StudyError, match="50 to 5000"):
        sampled(plan, usual_unknowns(plan.case), samples=10)
    assert all(u.high * 0.9 <= 1 + 1e-9 for u in usual_unknowns(plan.case) if u.what == "efficiency")


def test_where_no_sample_can_be_solved_the_reason_is_told() -> None:
    """Two million elements are refused by the mesh, in every sample alike."""
    plan = plan_of(pile(elements=2_000_000), [0.5e6])
    with pytest.raises(StudyError, match=r"None of the samples could be solved.*longer one"):
        sampled(plan, usual_unknowns(plan.case), samples=50)
