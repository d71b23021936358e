"""`python3 -m tests bench [--table] [--only NAME ...] [--short]`: how fast the program is, all by ratios of one run.

One JSON object a line; `--table` prints a table for people instead. `--short` is the guard of continuous integration:
the rows that a two-minute run can measure, against the ratios kept in `reference.json`; it fails only where one has
fallen by more than a third.
"""

from __future__ import annotations

import argparse
import json
import time
from collections.abc import Callable, Iterator
from importlib import import_module
from pathlib import Path

from tests.bench.measure import Row

REFERENCE = Path(__file__).with_name("reference.json")
#: Share of its reference ratio that a row may lose.
MAY_FALL = 1 / 3
#: Rows by name, and the module that measures them. Modules are loaded when they are asked for: some need Qt.
ROWS = {
    "linear_vs_c": "kernels",
    "full_vs_c": "kernels",
    "vs_numpy": "kernels",
    "laws": "kernels",
    "growth": "kernels",
    "vs_ivp": "wholes",
    "threads": "wholes",
    "many": "wholes",
    "memory": "wholes",
    "edit_to_picture": "window",
    "stall": "window",
    "playback": "window",
    "dragging": "dragging",
    "start": "starting",
}
SHORT = ("linear_vs_c", "full_vs_c", "vs_numpy", "laws")


def main(arguments: list[str]) -> int:
    parser = argparse.ArgumentParser(prog="python3 -m tests bench", description=__doc__)
    parser.add_argument("--table", action="store_true", help="a table for people instead of JSON")
    parser.add_argument("--only", nargs="+", choices=ROWS, metavar="NAME", help=f"some of: {', '.join(ROWS)}")
    parser.add_argument("--short", action="store_true", help="the guard: two minutes, against reference.json")
    parser.add_argument("--keep", action="store_true", help="write what was measured to reference.json")
    given = parser.parse_args(arguments)
    names = given.only or (SHORT if given.short else list(ROWS))
    rows = []
    for row in _measured(names, given.short):
        rows.append(row)
        print(_line(row) if given.table else json.dumps(row.told(), ensure_ascii=False), flush=True)
    if given.keep:
        _keep(rows)
    return _guard(rows) if given.short else 0


def _measured(names: list[str] | tuple[str, ...], short: bool) -> Iterator[Row]:
    for name in names:
        measure: Callable[[bool], Iterator[Row]] = getattr(import_module(f"tests.bench.{ROWS[name]}"), name)
        began = time.perf_counter()
        for row in measure(short):
            row.more["seconds_taken"] = time.perf_counter() - began
            began = time.perf_counter()
            yield row


def _line(row: Row) -> str:
    told = row.told()
    ratio = "" if row.ratio is None else f"{row.ratio:10.4g}"
    spread = "" if row.spread is None else f"± {row.spread:.0%}"
    sign = "" if row.reach is None else ("≤" if row.at_most else "≥")
    reach = "" if row.reach is None else f"{sign} {row.reach:g}"
    extra = ", ".join(f"{k} {told[k]}" for k in row.more if k != "seconds_taken")
    return f"{row.name:24}{ratio:>10}  {spread:8}{reach:9}{row.verdict:12}  {extra}"


def _guard(rows: list[Row]) -> int:
    """1 where a ratio that can be judged has fallen by more than a third."""
    kept = json.loads(REFERENCE.read_text(encoding="utf-8")) if REFERENCE.is_file() else {}
    fallen = []
    for row in rows:
        if row.ratio is None or row.name not in kept or row.verdict.startswith("not judged"):
            continue
        share = kept[row.name] / row.ratio if row.at_most else row.ratio / kept[row.name]
        if share < 1 - MAY_FALL:
            fallen.append(f"{row.name}: {row.ratio:.3g}, and {kept[row.name]:.3g} was kept")
    judged = [row for row in rows if row.ratio is not None and not row.verdict.startswith("not judged")]
    if not judged:
        print("Nothing was judged: this machine is too noisy now.")
    for line in fallen:
        print(f"Slower by more than a third: {line}.")
    return 1 if fallen else 0


def _keep(rows: list[Row]) -> None:
    kept = json.loads(REFERENCE.read_text(encoding="utf-8")) if REFERENCE.is_file() else {}
    kept |= {row.name: float(f"{row.ratio:.3g}") for row in rows if row.ratio is not None}
    REFERENCE.write_text(json.dumps(kept, indent=1, sort_keys=True) + "\n", encoding="utf-8")


if __name__ == "__main__":
    import sys

    raise SystemExit(main(sys.argv[1:]))
