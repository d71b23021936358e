"""Files written whole: what replaces a file is as readable as any new one, and a failure leaves nothing behind."""

from __future__ import annotations

import os

import pytest

from app.disk import disk_state, write_whole


def test_a_change_is_one_of_the_content_whatever_its_length_and_time(tmp_path):
    """21 in place of 12, as many bytes and dated back, is a change; the same bytes copied anew are none."""
    path = tmp_path / "pile.strike"
    path.write_text("12")
    before, then = disk_state(path), path.stat().st_mtime_ns
    os.utime(path, ns=(then + 10**9, then + 10**9))
    assert disk_state(path) == before
    path.write_text("21")
    os.utime(path, ns=(then, then))
    assert disk_state(path) != before
    path.unlink()
    assert disk_state(path) != before


def test_a_file_that_cannot_be_put_in_its_place_leaves_the_old_one_and_no_other(tmp_path, monkeypatch):
    path = tmp_path / "records.csv"
    path.write_text("old")

    def refuse(*_names):
        raise PermissionError(13, "Permission denied")

    monkeypatch.setattr(os, "replace", refuse)
    with pytest.raises(PermissionError):
        write_whole(path, "new")
    assert path.read_text() == "old"
    assert [p.name for p in tmp_path.iterdir()] == ["records.csv"]


def test_what_is_written_is_as_readable_as_any_new_file(tmp_path):
    mask = os.umask(0o022)
    try:
        write_whole(tmp_path / "summary.json", "{}")
        (tmp_path / "plain.json").write_text("{}", encoding="utf-8")
    finally:
        os.umask(mask)
    assert (tmp_path / "summary.json").stat().st_mode == (tmp_path / "plain.json").stat().st_mode
