"""What an engineer must be told beside a number: slips of units, and peaks that come after a second blow."""

import numpy as np
import pytest

from solver import Result, SolveError, findings_of, first_blow
from solver.answer.cautions import cautions_of
from tests.published.rods import case_of, material, part, pulse, solved


def test_a_density_in_the_wrong_unit_shows_by_its_wave_speed() -> None:
    # 7.85 for 7850 kg/m3: c = sqrt(2.1e11 / 7.85) = 163,600 m/s
    slip = material("slip", young_modulus=2.1e11, density=7.85)
    run = solved(pulse("half_sine", 1e-3), part(1.0, of="slip"), materials=[slip], dx=0.1, duration=1e-4)
    told = [one for one in cautions_of(run.case) if one.kind == "wave_speed"]
    assert [one.name for one in told] == ["slip"]
    assert 163_000 < told[0].value < 164_000
    assert (told[0].suspect, told[0].given) == ("density", 7.85)


@pytest.mark.parametrize("density", [7.85e-9, 7.85e-6])
def test_a_density_of_millimetres_is_refused_at_once(density: float) -> None:
    """Its steps would be so short that half a minute went by before the run was refused for another reason."""
    slip = material("slip", density=density)
    with pytest.raises(SolveError, match=r"'slip'.*faster than in any solid"):
        solved(pulse("half_sine", 1e-3), part(1.0, of="slip"), materials=[slip])


def test_a_modulus_in_the_wrong_unit_is_named() -> None:
    # 210 GPa written as 210e9 GPa
    slip = material("slip", young_modulus=2.1e20, density=7850.0)
    (told,) = (
        one for one in cautions_of(case_of(pulse("half_sine", 1e-3), part(of="slip"), materials=[slip]))
    )
    assert (told.kind, told.suspect) == ("wave_speed", "modulus")


def test_a_ram_and_a_cushion_that_cannot_be_meant_are_told_at_their_place() -> None:
    drop = {
        "kind": "drop",
        "ram_mass": 1e12,
        "impact_velocity": 1.0,
        "cushion": {"stiffness": 2e9, "restitution": 0.8},
        "cap_mass": 500.0,
        "pile_cushion": {"stiffness": 1e30, "restitution": 0.5},
    }
    told = {one.pointer: one for one in cautions_of(case_of(drop))}
    assert {key: one.kind for key, one in told.items()} == {
        "load": "heavy_ram",
        "load/pile_cushion": "stiff_cushion",
    }
    # EA = 2e9 N over 1 mm
    assert told["load/pile_cushion"].bound == pytest.approx(2e12)


def test_steel_needs_no_word_on_its_wave_speed() -> None:
    run = solved(pulse("half_sine", 1e-3), part(1.0), dx=0.1, duration=1e-4)
    assert "wave_speed" not in {one.kind for one in cautions_of(run.case)}


def test_a_spring_as_good_as_fixed_is_told() -> None:
    spring = {"position": 5.0, "kind": "spring", "value": 1e14}
    far_end = {"kind": "spring", "stiffness": 1e13}
    told = cautions_of(case_of(pulse("half_sine", 1e-3), far_end=far_end, attachments=[spring]))
    assert [one.pointer for one in told if one.kind == "stiff_spring"] == ["member/attachments/0", "far_end"]


def bounced(duration: float) -> Result:
    """A 2 t ram from 5 cm on a lively cushion: it is thrown up, and falls again 0.1 s later on a pile that rings."""
    cushion = {"stiffness": 2e9, "restitution": 0.95}
    drop = {"kind": "drop", "ram_mass": 2000.0, "drop_height": 0.05, "efficiency": 1.0, "cushion": cushion}
    toe = {"resistance": 4e5, "quake": 0.0025, "damping": 0.0}
    return solved(
        drop, far_end="ground", ground={"surface": 9.0, "toe": toe}, gravity=True, duration=duration, dx=0.1
    )


def test_a_peak_after_a_second_blow_says_so_and_what_it_was_before() -> None:
    whole = bounced(0.6)
    again = whole.struck_again
    assert again is not None
    assert again in [event.time for event in whole.events if event.kind == "impact"]
    # the envelope kept is that of a run which ends as the ram comes back
    until = bounced(again).envelope
    kept = whole.first_envelope
    assert kept is not None
    for name in (
        "lowest_stress",
        "highest_stress",
        "highest_stress_time",
        "max_velocity",
        "max_displacement",
    ):
        assert np.array_equal(getattr(kept, name), getattr(until, name)), name
    told = findings_of(whole)
    for finding, before in zip((told.compression, told.tension), first_blow(whole), strict=True):
        late = finding.peak.time >= again
        assert finding.struck_again == (again if late else None)
        assert finding.first == (before.peak if late else None)
        assert before.peak.time < again
        assert before.peak.value <= finding.peak.value
    assert told.tension.first is not None, "this case shows nothing"


def test_a_ram_that_flies_up_with_its_cap_is_told() -> None:
    """A stiff pile in firm ground throws both up. Free flight tells when the ram strikes again, but for the set of the
    cushion and the tremor of the head: within a tenth of the flight."""
    drop = {
        "kind": "drop",
        "ram_mass": 12e3,
        "impact_velocity": 4.0,
        "cap_mass": 1200.0,
        "cushion": {"stiffness": 2.5e8, "restitution": 0.4},
    }
    shaft = {"resistance": 6e6, "distribution": "uniform", "quake": 0.0025, "damping": 0.6}
    ground = {
        "surface": 0.5,
        "shaft_total": shaft,
        "toe": {"resistance": 2e6, "quake": 0.005, "damping": 0.2},
    }
    pile = part(10.0, area=0.08)
    ends, longer = (
        solved(drop, pile, far_end="ground", ground=ground, gravity=True, duration=d, dx=0.1)
        for d in (0.06, 0.6)
    )
    assert all(event.kind != "impact" for event in ends.events[1:])
    returns = [remark.value for remark in ends.remarks if remark.kind == "ram_returns"]
    _, cap, ram = [event.time for event in longer.events if event.kind == "impact"][:3]
    assert returns == [pytest.approx(ram, rel=0.1)]
    # the cap comes down before it, and pulls the pile more than the blow did
    assert longer.struck_again == cap < longer.peak_tension.time < ram
    tension = findings_of(longer).tension
    assert tension.first is not None
    assert tension.first.value < tension.peak.value / 2


@pytest.mark.parametrize(("passages", "told"), [(0.5, True), (1.5, True), (20.0, False)])
def test_a_set_that_is_read_too_early_is_told(passages: float, told: bool) -> None:
    """A pile of 10 m, 2L/c = 4 ms, under a pulse of 8 ms: until it is over, the ground gives way."""
    shaft = {"resistance": 3e5, "distribution": "uniform", "quake": 0.0025, "damping": 0.2}
    toe = {"resistance": 2e5, "quake": 0.0025, "damping": 0.4}
    ground = {"surface": 1.0, "shaft_total": shaft, "toe": toe}
    load, pile, duration = pulse("half_sine", 8e-3), part(10.0), passages * 4e-3
    run = solved(load, pile, far_end="ground", ground=ground, gravity=True, duration=duration, dx=0.1)
    assert ("still_giving" in {remark.kind for remark in run.remarks}) == told
    found = findings_of(run).set
    assert found is not None
    assert found.last == (not told)


def test_faces_that_part_and_touch_while_the_wave_runs_are_one_blow() -> None:
    """Ram, stiff cushion, cap: they chatter within the passage of the wave; the ram has not fallen again."""
    drop = {
        "kind": "drop",
        "ram_mass": 2000.0,
        "drop_height": 0.5,
        "efficiency": 1.0,
        "cushion": {"stiffness": 2e10, "restitution": 0.8},
    }
    run = solved({**drop, "cap_mass": 300.0}, far_end="fixed", gravity=True, duration=0.006)
    assert [event.kind for event in run.events].count("impact") > 1
    assert run.struck_again is None
    assert first_blow(run)[0] == findings_of(run).compression


@pytest.mark.parametrize("kind", ["drop", "striker"])
def test_a_rod_that_strikes_is_held_against_its_own_limits(kind: str) -> None:
    """Equal rods at 3 m/s: E v / 2c = 60 MPa in both. The lower half of the one that strikes allows 50 MPa only."""
    soft = material("soft", limits={"compression": 50e6, "tension": 1e6})
    rod = [part(1.0), part(1.0, of="soft")]
    load = {"kind": "striker", "velocity": 3.0, "segments": rod}
    if kind == "drop":
        load = {"kind": "drop", "impact_velocity": 3.0, "cap_mass": 0.0, "ram": {"segments": rod}}
    compression, tension = findings_of(solved(load, materials=[soft], duration=0.002)).striking
    assert compression.worst is not None
    assert compression.peak.value == pytest.approx(60e6, rel=1e-9)
    assert (compression.state, compression.worst.segment) == ("over", "part 2")
    assert compression.worst.share == pytest.approx(1.2, rel=1e-9)
    assert -1.0 < compression.worst.position < 0.0
    assert tension.state == "within"


def test_a_lumped_mass_that_touches_is_told() -> None:
    """At a wall and under a cap; a mass anywhere else needs no word."""
    wall = {"kind": "wall", "gap": 0.0}
    push = pulse("half_sine", 1e-3)
    drop = {"kind": "drop", "ram_mass": 1e3, "impact_velocity": 1.0, "cap_mass": 200.0}
    drop["cushion"] = {"stiffness": 1e9, "restitution": 0.8}
    for load, place, far_end, told in (
        (push, 10.0, wall, [10.0]),
        (push, 5.0, wall, []),
        (push, 10.0, "free", []),
        (drop, 0.0, "free", [0.0]),
        ({**drop, "pile_cushion": drop["cushion"]}, 0.0, "free", []),
    ):
        mass = {"position": place, "kind": "mass", "value": 50.0}
        run = solved(load, far_end=far_end, attachments=[mass], duration=1e-3, dx=0.2)
        assert [r.place for r in run.remarks if r.kind == "mass_at_contact"] == told
