"""`solve` on a project with ground, with a striker and with a pulse: files, columns and keys as the README has them."""

from __future__ import annotations

import csv
import json
import subprocess
import sys
from pathlib import Path

import numpy as np
import pytest

from app.command_line import main
from solver import Result, load_project, solve
from tests.project.valid import valid_tree

ROOT = Path(__file__).resolve().parents[2]
QUANTITIES = {
    "force_N": "force",
    "stress_Pa": "stress",
    "strain": "strain",
    "velocity_m_s": "velocity",
    "displacement_m": "displacement",
    "acceleration_m_s2": "acceleration",
    "down_wave_N": "down_wave",
    "up_wave_N": "up_wave",
}
TURNED = {"force_N", "stress_Pa", "strain", "down_wave_N", "up_wave_N"}
ENVELOPE = {
    "position_m": "position",
    "lowest_stress_Pa": "lowest_stress",
    "highest_stress_Pa": "highest_stress",
    "max_velocity_m_s": "max_velocity",
    "max_displacement_m": "max_displacement",
}
EVENTS = {
    "impact",
    "separation",
    "first_yield",
    "crack",
    "joint_opened",
    "joint_closed",
    "wall_contact",
    "toe_lift",
}
FOLDERS = {"Drop": "drop", "Pulse": "pulse", "Striker": "striker"}
Table = dict[str, np.ndarray]


def table(path: Path) -> tuple[list[str], Table]:
    """Comment lines and columns of a CSV file, read with Python's own tools alone."""
    lines = path.read_text(encoding="utf-8").splitlines()
    comments = [line for line in lines if line.startswith("#")]
    header, *rows = csv.reader(lines[len(comments) :])
    return comments, dict(zip(header, np.array(rows, dtype=float).T, strict=True))


@pytest.fixture(scope="module")
def file(tmp_path_factory) -> Path:
    path = tmp_path_factory.mktemp("project") / "three cases.strike"
    path.write_text(json.dumps(valid_tree()), encoding="utf-8")
    return path


@pytest.fixture(scope="module")
def results(file) -> dict[str, Result]:
    return {case.name: solve(case) for case in load_project(file).cases}


@pytest.fixture(scope="module")
def written(file, tmp_path_factory) -> Path:
    """The results of a run in a process of its own, as a shell would start it."""
    out = tmp_path_factory.mktemp("out") / "there" / "results"
    arguments = [sys.executable, "-m", "app", "solve", str(file), "--out", str(out), "--quiet"]
    ended = subprocess.run(arguments, cwd=ROOT, capture_output=True, text=True, timeout=300, encoding="utf-8")
    assert (ended.returncode, ended.stdout, ended.stderr) == (0, "", "")
    return out


def test_each_case_has_its_folder_with_three_files(written):
    assert sorted(path.name for path in written.iterdir()) == sorted(FOLDERS.values())
    for folder in written.iterdir():
        assert {path.name for path in folder.iterdir()} == {"gauges.csv", "envelope.csv", "summary.json"}


@pytest.mark.parametrize("case", FOLDERS)
def test_gauges_read_back_as_the_solver_s_arrays(case: str, written, results):
    comments, columns = table(written / FOLDERS[case] / "gauges.csv")
    gauges = results[case].gauges
    assert list(columns) == ["time_s"] + [f"{name}.{column}" for name in gauges for column in QUANTITIES]
    for name, gauge in gauges.items():
        assert np.array_equal(columns["time_s"], gauge.time)
        for column, quantity in QUANTITIES.items():
            assert np.array_equal(columns[f"{name}.{column}"], getattr(gauge, quantity)), (name, column)
        force, velocity = columns[f"{name}.force_N"], columns[f"{name}.velocity_m_s"]
        assert np.array_equal(columns[f"{name}.down_wave_N"], (force - gauge.impedance * velocity) / 2)
        assert np.array_equal(columns[f"{name}.up_wave_N"], (force + gauge.impedance * velocity) / 2)
    begins = ["title: A project for tests", f"case: {case}", "program: Striketrace ", "date: ", "units: SI"]
    begins += ["sign: tension positive", "elements: ", "time step: ", "energy that does not close: "]
    assert [b for b in begins if not any(line.startswith(f"# {b}") for line in comments)] == []
    assert "licensed engineer" in comments[-1]
    assert "code" in comments[-1]


@pytest.mark.parametrize("case", FOLDERS)
def test_the_envelope_is_that_of_the_result(case: str, written, results):
    _, columns = table(written / FOLDERS[case] / "envelope.csv")
    assert list(columns) == list(ENVELOPE)
    for column, name in ENVELOPE.items():
        assert np.array_equal(columns[column], getattr(results[case].envelope, name)), column


@pytest.mark.parametrize("case", FOLDERS)
def test_the_summary_tells_the_result(case: str, written, results):
    told = json.loads((written / FOLDERS[case] / "summary.json").read_text(encoding="utf-8"))
    r = results[case]
    wanted = {
        "elements": r.elements,
        "steps": r.steps,
        "time_step_s": r.time_step,
        "duration_s": r.duration,
        "courant_worst": r.courant_worst,
        "energy_residual": r.ledger.residual,
        "peak_compression_Pa": r.peak_compression.value,
        "peak_compression_position_m": r.peak_compression.position,
        "peak_compression_time_s": r.peak_compression.time,
        "peak_tension_Pa": r.peak_tension.value,
        "peak_tension_position_m": r.peak_tension.position,
        "peak_tension_time_s": r.peak_tension.time,
        "set_m": r.set,
        "head_set_m": r.head_set,
        "head_rebound_m": r.head_rebound,
        "max_toe_displacement_m": r.max_toe_displacement,
        "transferred_energy_J": {
            name: {"largest": largest, "final": final}
            for name, (largest, final) in r.transferred_energy.items()
        },
        "ledger_J": r.ledger.final,
        "warnings": list(r.warnings),
    }
    assert {key: told[key] for key in wanted} == wanted
    assert told["solve_seconds"] > 0
    assert min(told["peak_compression_Pa"], told["peak_tension_Pa"]) >= 0
    assert (told["set_m"] is None) == (case != "Drop")
    times = [event["time_s"] for event in told["events"]]
    assert times == sorted(times)
    assert all(event.keys() == {"kind", "position_m", "time_s"} for event in told["events"])
    assert {event["kind"] for event in told["events"]} <= EVENTS


def test_a_striker_strikes_and_reaches_the_wall(written):
    told = json.loads((written / "striker" / "summary.json").read_text(encoding="utf-8"))
    kinds = [event["kind"] for event in told["events"]]
    assert kinds[0] == "impact"
    assert "wall_contact" in kinds
    wall = next(event for event in told["events"] if event["kind"] == "wall_contact")
    assert wall["position_m"] == pytest.approx(1.2)


def test_compression_positive_turns_what_is_force_and_nothing_else(file, written, tmp_path):
    assert main(["solve", str(file), "--out", str(tmp_path), "--quiet", "--compression-positive"]) == 0
    for folder in FOLDERS.values():
        _, before = table(written / folder / "gauges.csv")
        comments, after = table(tmp_path / folder / "gauges.csv")
        assert any(line.startswith("# sign: compression positive") for line in comments)
        for column in before:
            sign = -1 if column.rpartition(".")[2] in TURNED else 1
            assert np.array_equal(after[column], sign * before[column]), column
        summaries = [json.loads((at / folder / "summary.json").read_text()) for at in (written, tmp_path)]
        assert len({s["peak_compression_Pa"] for s in summaries}) == 1  # a magnitude, in either sign


def test_one_case_at_another_element_length_in_the_folder_it_always_has(file, tmp_path, capsys):
    arguments = ["solve", str(file), "--out", str(tmp_path), "--case", "Pulse", "--element-length", "0.02"]
    assert main(arguments) == 0
    assert capsys.readouterr().out.startswith("Pulse: 50 elements, solved in ")
    assert [path.name for path in tmp_path.iterdir()] == ["pulse"]


def test_a_case_that_cannot_be_solved_gives_1_and_the_others_are_there(tmp_path, capsys):
    tree = valid_tree()
    # gravity, and nothing holds it
    tree["cases"][0]["far_end"], tree["cases"][0]["ground"] = (
        {"kind": "free"},
        None,
    )
    path, out = tmp_path / "a.strike", tmp_path / "out"
    path.write_text(json.dumps(tree), encoding="utf-8")
    assert main(["check", str(path)]) == 0
    capsys.readouterr()
    assert main(["solve", str(path), "--out", str(out), "--quiet"]) == 1
    said = capsys.readouterr()
    assert said.out == ""
    assert said.err.startswith("Case 'Drop' cannot be solved: ")
    assert said.err.count("\n") == 1
    assert sorted(path.name for path in out.iterdir()) == ["pulse", "striker"]


def test_cases_whose_names_look_alike_keep_their_own_results(tmp_path):
    tree = valid_tree()
    names = ["Drop 1.2 m", "drop-1-2-m", "Drop 1,2 m ", "../drop", "DROP"]
    pulse = tree["cases"][1]
    tree["cases"] = [
        pulse | {"name": name, "load": pulse["load"] | {"peak": 1000.0 * (i + 1)}}
        for i, name in enumerate(names)
    ]
    path, out = tmp_path / "a.strike", tmp_path / "out"
    path.write_text(json.dumps(tree), encoding="utf-8")
    assert main(["solve", str(path), "--out", str(out), "--quiet"]) == 0
    told = [json.loads(p.read_text(encoding="utf-8")) for p in out.glob("*/summary.json")]
    assert {one["case"] for one in told} == set(names)
    assert len({one["peak_compression_Pa"] for one in told}) == len(names)
    assert sorted(p.name for p in tmp_path.iterdir()) == ["a.strike", "out"]
