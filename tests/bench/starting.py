"""From the start of the process to the first picture of a solved case, with kernels in the cache and without."""

from __future__ import annotations

import os
import subprocess
import sys
import tempfile
import time
from collections.abc import Iterator

import numpy as np

from tests.bench.measure import Row, calibration, spread_of
from tests.bench.wholes import CHECKOUT


def start(short: bool) -> Iterator[Row]:
    """Settings and kernel cache of its own, so that the user's are neither used nor touched."""
    with tempfile.TemporaryDirectory() as folder:
        beats = [calibration()]
        empty = [_started(folder, f"cache {i}") for i in range(2)]
        beats.append(calibration())
        warm = []
        for _ in range(5):
            warm.append(_started(folder, "cache 0"))
            beats.append(calibration())
    for name, runs, reach in (("start", warm, 2.0), ("start empty cache", empty, 12.0)):
        times = [seconds for seconds, _ in runs]
        row = Row(
            name,
            "s from the start of the process to the first painted picture of a solved case"
            + (", kernels cached" if runs is warm else ", no kernel cached"),
            float(np.median(times)),
            reach,
            at_most=True,
            unit="s",
            spread=spread_of(times),
            repetitions=len(times),
            noise=spread_of(beats),
        )
        row.more = {"processor_seconds": float(np.median([spent for _, spent in runs]))}
        yield row


def _started(folder: str, cache: str) -> tuple[float, float]:
    """Seconds until the picture, and processor seconds of the whole process."""
    environment = {
        **os.environ,
        "QT_QPA_PLATFORM": "offscreen",
        "STRIKETRACE_SETTINGS": os.path.join(folder, "settings"),
        "STRIKETRACE_CACHE": os.path.join(folder, cache),
    }
    before, began = os.times(), time.time()
    told = subprocess.run(
        [sys.executable, "-m", "tests.bench.started_process"],
        cwd=CHECKOUT,
        env=environment,
        text=True,
        stdout=subprocess.PIPE,
        check=True,
    ).stdout
    after = os.times()
    spent = after.children_user + after.children_system - before.children_user - before.children_system
    return float(told.split()[-1]) - began, spent
