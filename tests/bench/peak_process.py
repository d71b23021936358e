"""A process of its own that solves one case of so many steps and tells its peak memory in bytes."""

import resource
import sys

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
    peak = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss
    print(peak if sys.platform == "darwin" else peak * 1024)


if __name__ == "__main__":
    main(int(sys.argv[1]))
