"""Gauge records as HDF5: `time`, a group a gauge with a dataset a quantity, units and particulars as attributes."""

from __future__ import annotations

import io

import h5py

from app.export.columns import one_line
from app.export.record_choices import RecordChoices
from app.export.record_table import RecordTable


def record_hdf5(table: RecordTable, _choices: RecordChoices) -> bytes:
    """The file, in double precision. A gauge's name with a stroke in it has another sign there, as groups need it."""
    stream = io.BytesIO()
    with h5py.File(stream, "w") as file:
        text = h5py.string_dtype("utf-8")
        lines = [f"{word}: {one_line(told)}" for word, told in table.particulars]
        file.create_dataset("particulars", data=[line.replace("\0", " ") for line in lines], dtype=text)
        time, *others = table.columns
        made = file.create_dataset("time", data=time.values, compression="gzip", shuffle=True)
        made.attrs["unit"] = time.unit
        for column in others:
            place = f"gauges/{_group(column.gauge)}/{column.quantity}"
            made = file.create_dataset(place, data=column.values, compression="gzip", shuffle=True)
            made.attrs["unit"] = column.unit or "1"
            made.attrs["gauge"] = column.gauge
    return stream.getvalue()


def _group(name: str) -> str:
    written = name.replace("/", "∕")
    return written if written.strip(".") else f"gauge {written}"
