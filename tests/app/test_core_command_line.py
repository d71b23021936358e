"""The command line as other programs see it: files, columns, exit statuses, and never a traceback."""

from __future__ import annotations

import csv
import json
import subprocess
import sys
from errno import ENOSPC, EPIPE
from io import StringIO

import numpy as np
import pandas as pd
import pytest

from app.command_line import main
from app.export import folder_names, gauge_csv, summary_json
from solver import SolveError, load_project, project_from_tree, project_to_text, solve

GAUGE_COLUMNS = [
    "force_N",
    "stress_Pa",
    "strain",
    "velocity_m_s",
    "displacement_m",
    "acceleration_m_s2",
    "down_wave_N",
    "up_wave_N",
]
SUMMARY_KEYS = {
    "elements",
    "steps",
    "time_step_s",
    "duration_s",
    "courant_worst",
    "energy_residual",
    "peak_compression_Pa",
    "peak_compression_position_m",
    "peak_compression_time_s",
    "peak_tension_Pa",
    "peak_tension_position_m",
    "peak_tension_time_s",
    "set_m",
    "head_set_m",
    "head_rebound_m",
    "max_toe_displacement_m",
    "transferred_energy_J",
    "ledger_J",
    "solve_seconds",
    "warnings",
    "events",
}


def bar(**case):
    """A steel bar under a half-sine of force, with two gauges; two cases that differ in their peak."""
    material = {"name": "steel", "young_modulus": 2.1e11, "density": 7850.0}
    section = {"shape": "solid_round", "diameter": 0.05}
    first = {
        "name": "Drop 1.2 m",
        "member": {"segments": [{"name": "Bar", "length": 4.0, "material": "steel", "section": section}]},
        "load": {"kind": "pulse", "quantity": "force", "shape": "half_sine", "peak": 1e5, "duration": 5e-4},
        "far_end": {"kind": "free"},
        "gauges": [{"name": "Head", "position": 1.0}, {"name": "Mid, 2", "position": 2.0}],
        "run": {"duration": 2e-3, "element_length": 0.05},
    }
    second = first | {"name": "drop 1.2 M", "load": first["load"] | {"peak": 2e5}} | case
    return {
        "format": "striketrace-project",
        "version": 1,
        "title": "A title\nin two lines, with \u2028 and # in it",
        "materials": [material],
        "cases": [first, second],
    }


@pytest.fixture
def file(tmp_path):
    path = tmp_path / "a bar.strike"
    path.write_text(project_to_text(project_from_tree(bar())), encoding="utf-8")
    return path


def read(path):
    """The comment lines and the table of a gauge file."""
    lines = path.read_text(encoding="utf-8").split("\n")
    block = [line for line in lines if line.startswith("#")]
    assert lines[: len(block)] == block  # all of it stands at the top
    return block, pd.read_csv(path, skiprows=len(block))


def test_solve_writes_a_folder_for_each_case(file, tmp_path, capsys):
    out = tmp_path / "out"
    assert main(["solve", str(file), "--out", str(out)]) == 0
    assert sorted(p.name for p in out.iterdir()) == ["drop-1-2-m", "drop-1-2-m-2"]
    for folder in out.iterdir():
        assert sorted(p.name for p in folder.iterdir()) == ["envelope.csv", "gauges.csv", "summary.json"]
    said = capsys.readouterr()
    assert "peak compression" in said.out
    assert said.err == ""


def test_the_gauge_file_holds_the_solver_s_numbers_to_the_last_bit(file, tmp_path):
    main(["solve", str(file), "--out", str(tmp_path), "--case", "Drop 1.2 m", "--quiet"])
    block, table = read(tmp_path / "drop-1-2-m" / "gauges.csv")
    result = solve(load_project(file).cases[0])
    assert list(table.columns) == ["time_s"] + [f"{g}.{c}" for g in ("Head", "Mid, 2") for c in GAUGE_COLUMNS]
    for name, gauge in result.gauges.items():
        for column, array in zip(
            GAUGE_COLUMNS,
            (
                gauge.force,
                gauge.stress,
                gauge.strain,
                gauge.velocity,
                gauge.displacement,
                gauge.acceleration,
                (gauge.force - gauge.impedance * gauge.velocity) / 2,
                (gauge.force + gauge.impedance * gauge.velocity) / 2,
            ),
            strict=True,
        ):
            written = pd.to_numeric(table[f"{name}.{column}"]).to_numpy()
            assert np.array_equal(written, array), column
    assert block[0] == "# title: A title in two lines, with and # in it"
    for word in ("case: Drop 1.2 m", "program: Striketrace", "date: ", "units: SI", "sign: tension positive"):
        assert any(line.startswith(f"# {word}") for line in block), word
    for word in ("elements: ", "time step: ", "energy that does not close: ", "caution: "):
        assert any(line.startswith(f"# {word}") for line in block), word
    assert "licensed engineer" in block[-1]


def test_python_reads_the_numbers_back_the_same(file, tmp_path):
    main(["solve", str(file), "--out", str(tmp_path), "--quiet"])
    text = (tmp_path / "drop-1-2-m" / "gauges.csv").read_text(encoding="utf-8")
    rows = list(csv.reader(line for line in StringIO(text) if not line.startswith("#")))
    gauge = solve(load_project(file).cases[0]).gauges["Head"]
    assert [float(row[1]) for row in rows[1:]] == gauge.force.tolist()


def test_compression_positive_turns_forces_stresses_strains_and_waves_only(file, tmp_path):
    main(["solve", str(file), "--out", str(tmp_path / "t"), "--quiet"])
    main(["solve", str(file), "--out", str(tmp_path / "c"), "--quiet", "--compression-positive"])
    _, tension = read(tmp_path / "t" / "drop-1-2-m" / "gauges.csv")
    block, compression = read(tmp_path / "c" / "drop-1-2-m" / "gauges.csv")
    for column in tension.columns:
        turned = column.rpartition(".")[2] in ("force_N", "stress_Pa", "strain", "down_wave_N", "up_wave_N")
        assert np.array_equal(compression[column], -tension[column] if turned else tension[column]), column
    assert "# sign: compression positive, tension negative; motion positive towards the far end" in block
    waves = compression["Head.down_wave_N"] + compression["Head.up_wave_N"]
    # rounding of two halves: 4 units in the last place of the largest force
    assert np.allclose(waves, compression["Head.force_N"], rtol=0, atol=4 * np.spacing(2e5))
    first = pd.read_csv(tmp_path / "t" / "drop-1-2-m" / "envelope.csv")
    other = pd.read_csv(tmp_path / "c" / "drop-1-2-m" / "envelope.csv")
    assert np.array_equal(first["lowest_stress_Pa"], -other["lowest_stress_Pa"])


def test_envelope_and_summary_tell_the_same_as_the_result(file, tmp_path):
    main(["solve", str(file), "--out", str(tmp_path), "--quiet"])
    result = solve(load_project(file).cases[0])
    envelope = pd.read_csv(tmp_path / "drop-1-2-m" / "envelope.csv")
    assert list(envelope.columns) == [
        "position_m",
        "lowest_stress_Pa",
        "highest_stress_Pa",
        "max_velocity_m_s",
        "max_displacement_m",
    ]
    summary = json.loads((tmp_path / "drop-1-2-m" / "summary.json").read_text(encoding="utf-8"))
    assert SUMMARY_KEYS <= summary.keys()
    assert summary["peak_compression_Pa"] == result.peak_compression.value
    # of peaks that are equal to 1e-9 the solver tells the earliest
    assert summary["peak_compression_Pa"] == pytest.approx(-envelope["lowest_stress_Pa"].min(), rel=1e-9)
    assert summary["peak_tension_Pa"] == pytest.approx(envelope["highest_stress_Pa"].max(), rel=1e-9)
    assert summary["set_m"] is None  # no ground
    assert summary["transferred_energy_J"].keys() == {"Head", "Mid, 2"}
    assert summary["transferred_energy_J"]["Head"].keys() == {"largest", "final"}
    assert summary["elements"] == result.elements == 80
    times = [event["time_s"] for event in summary["events"]]
    assert times == sorted(times)


def test_element_length_and_case_are_heeded(file, tmp_path, capsys):
    arguments = [
        "solve",
        str(file),
        "--out",
        str(tmp_path / "o"),
        "--case",
        "drop 1.2 M",
        "--element-length",
        "0.1",
    ]
    assert main([*arguments, "--quiet"]) == 0
    assert capsys.readouterr() == ("", "")
    assert [p.name for p in (tmp_path / "o").iterdir()] == [
        "drop-1-2-m-2"
    ]  # the same folder as without --case
    summary = json.loads((tmp_path / "o" / "drop-1-2-m-2" / "summary.json").read_text(encoding="utf-8"))
    assert summary["elements"] == 40


@pytest.mark.parametrize(
    ("text", "says"),
    [
        (None, "cannot be read"),
        ("{", "not valid JSON at line 1"),
        ('{"format": "other"}', "/format"),
        (json.dumps(bar() | {"version": 99}), "newer version"),
        (json.dumps(bar() | {"colour": "red"}), "/colour: is not a key"),
        (json.dumps(bar(far_end={"kind": "loose"})), "/cases/1/far_end"),
        (json.dumps(bar(name="Drop 1.2 m")), "/cases/1/name"),
        ("[" * 100_000, "nested too deeply"),
    ],
)
@pytest.mark.parametrize("command", ["solve", "check"])
def test_a_file_that_is_not_usable_gives_2_and_writes_nothing(text, says, command, tmp_path, capsys):
    path, out = tmp_path / "bad.strike", tmp_path / "out"
    if text is not None:
        path.write_text(text)
    extra = ["--out", str(out)] if command == "solve" else []
    assert main([command, str(path), *extra]) == 2
    said = capsys.readouterr()
    assert says in said.err
    assert str(path) in said.err
    assert not out.exists()


@pytest.mark.parametrize(
    "arguments",
    [
        ["solve"],
        ["solve", "x.strike"],
        ["check"],
        ["solve", "x.strike", "--out", "d", "--element-length", "0"],
        ["solve", "x.strike", "--out", "d", "--element-length", "nan"],
        ["a.strike", "b.strike"],
    ],
)
def test_arguments_that_make_no_sense_give_2(arguments, capsys):
    assert main(arguments) == 2
    assert "error" in capsys.readouterr().err


def test_a_case_that_does_not_exist_gives_2(file, tmp_path, capsys):
    assert main(["solve", str(file), "--out", str(tmp_path / "o"), "--case", "Nope"]) == 2
    assert "no case named 'Nope' (there are: 'Drop 1.2 m', 'drop 1.2 M')" in capsys.readouterr().err
    assert not (tmp_path / "o").exists()


@pytest.mark.parametrize(
    "fault", [SolveError("The ram is too heavy."), MemoryError(), ZeroDivisionError("x")]
)
def test_a_case_that_fails_leaves_the_others_written(file, tmp_path, capsys, monkeypatch, fault):
    def failing(case, **how):
        if case.name == "Drop 1.2 m":
            raise fault
        return solve(case, **how)

    monkeypatch.setattr("solver.solve", failing)
    assert main(["solve", str(file), "--out", str(tmp_path / "o"), "--quiet"]) == 1
    assert "Drop 1.2 m" in capsys.readouterr().err
    assert [p.name for p in (tmp_path / "o").iterdir()] == ["drop-1-2-m-2"]


def test_a_folder_that_cannot_be_made_gives_2(file, tmp_path, capsys):
    (tmp_path / "taken").write_text("")
    assert main(["solve", str(file), "--out", str(tmp_path / "taken" / "o")]) == 2
    assert "cannot be made" in capsys.readouterr().err


def test_results_that_cannot_be_written_give_1(file, tmp_path, capsys):
    (tmp_path / "o").mkdir()
    (tmp_path / "o" / "drop-1-2-m").write_text("a file stands where the folder should")
    assert main(["solve", str(file), "--out", str(tmp_path / "o"), "--quiet"]) == 1
    assert "cannot be written" in capsys.readouterr().err
    assert (tmp_path / "o" / "drop-1-2-m-2" / "summary.json").exists()


class Gone:
    """A standard output whose reader has gone, or whose disk is full."""

    def __init__(self, file, fault):
        self.fileno, self.fault = file.fileno, fault

    def write(self, text):
        raise OSError(self.fault, "gone")

    def flush(self):
        pass


@pytest.mark.parametrize("fault", [ENOSPC, EPIPE])
def test_results_are_written_though_nobody_listens(file, tmp_path, monkeypatch, fault):
    with (tmp_path / "words").open("w") as words:
        monkeypatch.setattr(sys, "stdout", Gone(words, fault))
        monkeypatch.setattr(sys, "stderr", None)  # as where a service has closed it
        status = main(["solve", str(file), "--out", str(tmp_path / "out")])
    assert status == 0
    assert len(list((tmp_path / "out").glob("*/summary.json"))) == 2


def test_a_full_disk_behind_standard_output_is_told(file, tmp_path, monkeypatch, capsys):
    with (tmp_path / "words").open("w") as words:
        monkeypatch.setattr(sys, "stdout", Gone(words, ENOSPC))
        assert main(["check", str(file)]) == 1
    assert "disk" in capsys.readouterr().err


def test_check_looks_at_every_file(file, tmp_path, capsys):
    assert main(["check", str(file)]) == 0
    assert "valid, 2 cases" in capsys.readouterr().out
    assert main(["check", str(tmp_path / "none.strike"), str(file)]) == 2
    assert "valid, 2 cases" in capsys.readouterr().out


def test_solve_and_check_need_no_qt(file, tmp_path):
    """In a process of its own, in which importing Qt is an error."""
    code = (
        "import sys\n"
        "for name in ('PySide6', 'shiboken6'): sys.modules[name] = None\n"
        "from app.command_line import main\n"
        "assert main(['check', sys.argv[1]]) == 0\n"
        "assert main(['solve', sys.argv[1], '--out', sys.argv[2], '--quiet']) == 0\n"
    )
    subprocess.run([sys.executable, "-c", code, str(file), str(tmp_path / "o")], check=True, timeout=120)


def test_folders_of_cases_never_collide():
    names = [
        "A",
        "a",
        "a-2",
        "a 2",
        "ä",
        "???",
        "",
        "con",
        "CON ",
        "x" * 200,
        "x" * 200 + "y",
        "../..",
        "日本",
    ]
    folders = folder_names(names)
    assert len({folder.casefold() for folder in folders}) == len(names)
    assert all(folder and folder.strip(".") and "/" not in folder and len(folder) < 70 for folder in folders)
    assert "con" not in folders
    assert folder_names(["a", "a!", "a-2"]) == ["a", "a-3", "a-2"]


def test_a_number_that_does_not_exist_becomes_null(file):
    from dataclasses import replace

    result = replace(solve(load_project(file).cases[0]), head_rebound=float("nan"))
    assert json.loads(summary_json(result, "x"))["head_rebound_m"] is None


def test_a_case_without_gauges_still_has_its_file(file):
    tree = bar()
    for case in tree["cases"]:
        case["gauges"] = []
    result = solve(project_from_tree(tree).cases[0])
    assert gauge_csv(result, "x").splitlines()[-1] == "time_s"
