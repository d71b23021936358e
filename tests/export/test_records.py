"""Gauge records: what is read back is what the solver said, and nothing in them is run or clashes."""

from __future__ import annotations

import io
from datetime import datetime

import h5py
import numpy as np
import openpyxl
import pandas as pd
import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.command_line import main
from app.export.plain_text import all_different, harmless, harmless_comment
from app.export.record_choices import COLUMNS, RecordChoices, choices_from_tree
from app.export.record_csv import record_csv
from app.export.record_files import origin_of, write_records
from app.export.record_hdf5 import record_hdf5
from app.export.record_table import record_table
from app.export.record_xlsx import record_xlsx
from app.export.sampling import resampled, sample_times
from solver import project_from_tree, project_to_text, solve
from tests.export.conftest import UNLUCKY, bar_tree

DATE = datetime(2026, 12, 1, 8, 30)


def table_of(bar, **choices):
    project, result = bar
    return record_table(result, origin_of(project, DATE), RecordChoices(**choices)), RecordChoices(**choices)


def read_csv(data, **how):
    return pd.read_csv(io.BytesIO(data), comment="#", encoding="utf-8", **how)


def test_csv_gives_the_solvers_numbers_back(bar):
    found = read_csv(record_csv(*table_of(bar)))
    near = bar[1].gauges["Near"]
    assert len(found.columns) == 1 + 2 * len(COLUMNS)
    assert np.array_equal(found["time_s"], near.time)
    assert np.array_equal(found["Near.force_N"], near.force)
    assert np.array_equal(found["Near.acceleration_m_s2"], near.acceleration)
    assert np.array_equal(found["Near.transferred_energy_J"], near.transferred_energy)


def test_sign_units_and_digits_are_as_chosen_and_said(bar):
    data = record_csv(*table_of(bar, compression_positive=True, units="us", digits=5))
    found, near = read_csv(data), bar[1].gauges["Near"]
    # 1 kip = 4448.2216152605 N exactly (lbf of the international pound); five digits leave half a unit of the fifth
    assert found["Near.force_kip"].to_numpy() == pytest.approx(
        -near.force / 4448.2216152605, rel=6e-5, abs=1e-9
    )
    assert found["Near.velocity_ft_s"].to_numpy() == pytest.approx(
        near.velocity / 0.3048, rel=6e-5, abs=1e-12
    )
    assert "# sign: compression positive" in data.decode()
    assert "kip" in next(line for line in data.decode().splitlines() if line.startswith("# units"))


def test_few_digits_leave_the_samples_apart(bar):
    """Two digits of each quantity; time keeps as many as a thousandth of a step needs."""
    found = read_csv(record_csv(*table_of(bar, digits=2)))
    near = bar[1].gauges["Near"]
    assert found["time_s"].to_numpy() == pytest.approx(near.time, abs=1e-3 * near.time_step)
    assert found["Near.force_N"].to_numpy() == pytest.approx(near.force, rel=0.06)


def test_waves_keep_their_meaning_in_either_sign(bar):
    """A wave is a force: with its sign turned, down = (F + Z v)/2 and up = (F - Z v)/2, and their sum is F."""
    found = read_csv(record_csv(*table_of(bar, compression_positive=True)))
    force, velocity = found["Near.force_N"], found["Near.velocity_m_s"]
    z = bar[1].gauges["Near"].impedance
    scale = force.abs().max()
    assert found["Near.down_wave_N"].to_numpy() == pytest.approx(
        (force + z * velocity) / 2, abs=1e-12 * scale
    )
    assert found["Near.up_wave_N"].to_numpy() == pytest.approx((force - z * velocity) / 2, abs=1e-12 * scale)


def test_decimal_comma_and_byte_order_mark(bar):
    data = record_csv(*table_of(bar, decimal_comma=True, byte_order_mark=True))
    assert data.startswith(b"\xef\xbb\xbf")
    found = read_csv(data[3:], sep=";", decimal=",")
    assert found["Far.stress_Pa"].to_numpy() == pytest.approx(bar[1].gauges["Far"].stress, rel=1e-15)


def test_workbook_holds_numbers_and_particulars(bar):
    book = openpyxl.load_workbook(io.BytesIO(record_xlsx(*table_of(bar))), read_only=True)
    rows = list(book["Records"].iter_rows(values_only=True))
    at = rows[0].index("Far.strain")
    # the format stores 16 digits, one fewer than a double may need
    assert [row[at] for row in rows[1:]] == pytest.approx(bar[1].gauges["Far"].strain, rel=1e-15)
    told = dict(book["Particulars"].iter_rows(values_only=True))
    assert told["case"] == "Pulse"
    assert told["input"] == f"SHA-256 {origin_of(bar[0]).hash}"


def test_hdf5_gives_the_same_doubles(bar):
    with h5py.File(io.BytesIO(record_hdf5(*table_of(bar)))) as file:
        made = file["gauges/Near/velocity"]
        assert np.array_equal(made[:], bar[1].gauges["Near"].velocity)
        assert made.attrs["unit"] == "m/s"
        assert b"case: Pulse" in list(file["particulars"][:])


def test_records_are_the_same_bytes_each_time(bar):
    for write in (record_csv, record_xlsx, record_hdf5):
        assert write(*table_of(bar)) == write(*table_of(bar))


def test_window_and_time_zero(bar):
    found = read_csv(record_csv(*table_of(bar, start=1e-3, end=2e-3, zero=1e-3)))
    assert 0 <= found["time_s"].iloc[0] < bar[1].time_step
    assert found["time_s"].iloc[-1] == pytest.approx(1e-3, abs=bar[1].time_step)


def test_a_window_with_nothing_in_it_is_refused_in_a_sentence(bar):
    with pytest.raises(ValueError, match="holds no sample of case 'Pulse'"):
        table_of(bar, start=1.0)


def test_sampling_keeps_what_is_slow_and_drops_what_would_fold_back():
    """A sine well below half the rate stays; one above it, which would fold back to 3 kHz, is 80 dB down."""
    step, rate, time = 1e-5, 10e3, np.arange(20_000) * 1e-5
    times = sample_times(len(time), step, rate)
    middle = slice(200, -200)
    slow = resampled(np.sin(2 * np.pi * 1e3 * time), step, times, rate)
    assert slow[middle] == pytest.approx(np.sin(2 * np.pi * 1e3 * times)[middle], abs=2e-3)
    fast = resampled(np.sin(2 * np.pi * 7e3 * time), step, times, rate)
    assert np.abs(fast[middle]).max() < 1.01e-4


def test_a_rate_above_half_of_the_steps_is_refused(bar):
    with pytest.raises(ValueError, match="half of the solver's own"):
        table_of(bar, rate=1e9)


@given(st.text(max_size=60))
def test_no_cell_and_no_part_of_a_comment_begins_a_formula(text):
    assert not harmless(text).lstrip().startswith(("=", "+", "-", "@"))
    line = harmless_comment(f"title: {text}")
    assert "\n" not in line
    assert not any(
        part.lstrip().startswith(("=", "+", "-", "@")) for part in line.replace(";", ",").split(",")
    )


@given(st.lists(st.text("aA (2)", max_size=6), max_size=8))
def test_headings_are_all_different(names):
    assert len({name.casefold() for name in all_different(names)}) == len(names)


def test_unlucky_names_give_readable_columns(tmp_path):
    project = project_from_tree(bar_tree(UNLUCKY, gauges=("=SUM(A1)", "a,b;c/d", "Kopf\n1", "Kopf 1", ".")))
    result = solve(project.cases[0])
    choices = RecordChoices(columns=("force",), formats=("csv", "xlsx", "hdf5"))
    csv_file, _, h5_file = write_records(project, [result], choices, tmp_path, DATE)
    found = read_csv(csv_file.read_bytes())
    wanted = ["'=SUM(A1)", "a,b;c/d", "Kopf 1", "Kopf 1 (2)", "."]
    assert list(found.columns) == ["time_s", *(f"{name}.force_N" for name in wanted)]
    with h5py.File(h5_file) as file:
        assert {made["force"].attrs["gauge"] for made in file["gauges"].values()} == set(wanted)


def test_settings_that_make_no_sense_are_dropped():
    kept = RecordChoices(rate=5e3, columns=("force", "strain"), formats=("xlsx",), gauges=("Near",))
    assert choices_from_tree(kept.to_tree()) == kept
    assert (
        choices_from_tree({"rate": "fast", "columns": ["force", "colour"], "digits": True}) == RecordChoices()
    )
    assert choices_from_tree([1]) == RecordChoices()


def test_command_writes_the_cases_asked_for(tmp_path, capsys):
    path = tmp_path / "bar.strike"
    path.write_text(project_to_text(project_from_tree(bar_tree(cases=2))), encoding="utf-8")
    out = tmp_path / "out"
    asked = ["records", str(path), "--out", str(out), "--case", "Pulse 2", "--date", "2026-12-01"]
    assert main([*asked, "--rate", "20000", "--columns", "force"]) == 0
    assert [p.name for p in out.iterdir()] == ["pulse-2-records.csv"]
    assert "anti-alias filter" in (out / "pulse-2-records.csv").read_text(encoding="utf-8")
    assert main(["records", str(path), "--out", str(out), "--gauge", "Nowhere"]) == 2
    assert main(["records", str(path), "--out", str(out), "--columns", "colour"]) == 2
    assert main(["records", str(path), "--out", str(out), "--rate", "1e12", "--quiet"]) == 1
    assert "Traceback" not in capsys.readouterr().err


def test_a_file_that_cannot_be_written_leaves_the_old_one(tmp_path, bar, monkeypatch):
    """The new file is written beside the old one and takes its place only when it is whole."""
    project, result = bar
    (old,) = write_records(project, [result], RecordChoices(), tmp_path, DATE)
    before = old.read_bytes()
    monkeypatch.setattr("os.fsync", lambda _: (_ for _ in ()).throw(OSError(28, "No space left on device")))
    with pytest.raises(OSError, match="the disk is full"):
        write_records(project, [result], RecordChoices(digits=3), tmp_path, DATE)
    assert old.read_bytes() == before
    assert [p.name for p in tmp_path.iterdir()] == [old.name]
