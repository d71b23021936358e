"""What an engineer must be told beside a number: slips of units, and peaks that come after a second blow."""

from dataclasses import replace

from solver import Event, findings_of
from solver.answer.cautions import cautions_of
from tests.published.rods import material, part, pulse, solved


def test_a_density_in_the_wrong_unit_shows_by_its_wave_speed() -> None:
    # 7.85 for 7850 kg/m3: c = sqrt(2.1e11 / 7.85) = 163,600 m/s
    slip = material("slip", young_modulus=2.1e11, density=7.85)
    run = solved(pulse("half_sine", 1e-3), part(1.0, of="slip"), materials=[slip], dx=0.1, duration=1e-4)
    told = [one for one in cautions_of(run.case) if one.kind == "wave_speed"]
    assert [one.name for one in told] == ["slip"]
    assert 163_000 < told[0].value < 164_000


def test_steel_needs_no_word_on_its_wave_speed() -> None:
    run = solved(pulse("half_sine", 1e-3), part(1.0), dx=0.1, duration=1e-4)
    assert "wave_speed" not in {one.kind for one in cautions_of(run.case)}


def test_a_peak_after_a_second_blow_says_so() -> None:
    run = solved(pulse("half_sine", 1e-3), part(1.0), dx=0.1, duration=1e-3)
    peak = run.peak_compression.time
    once = replace(run, events=(Event("impact", 0.0, 0.0),))
    again = replace(run, events=(Event("impact", 0.0, 0.0), Event("impact", 0.0, peak / 2)))
    assert findings_of(once).compression.struck_again is None
    assert findings_of(again).compression.struck_again == peak / 2
