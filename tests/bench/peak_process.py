"""A process of its own that solves one case of so many steps and tells its peak memory in bytes."""

import resource
import sys
from pathlib import Path

from solver import solve
from solver.numerics.chain import build_chain
from tests.bench import cases

ELEMENTS = 50


def main(steps: int) -> None:
    gauges = [{"name": name, "position": place} for name, place in (("a", 2.0), ("b", 5.0), ("c", 8.0))]
    dt = build_chain(cases.rod(elements=ELEMENTS)).dt
    case = cases.rod(elements=ELEMENTS, duration=steps * dt, gauges=gauges)
    result = solve(case)
    assert len(result.gauges["b"].force) >= steps
    print(_peak())


def _peak() -> int:
    """Bytes. On Linux not from `getrusage`, whose peak a child inherits from the process that started it."""
    status = Path("/proc/self/status")
    if status.exists():
        line = next(one for one in status.read_text().splitlines() if one.startswith("VmHWM"))
        return int(line.split()[1]) * 1024
    return resource.getrusage(resource.RUSAGE_SELF).ru_maxrss


if __name__ == "__main__":
    main(int(sys.argv[1]))
