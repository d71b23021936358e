"""A process of its own that marches the C twin of the default pile each time a line comes in."""

import sys

from tests.bench import cases
from tests.bench.rig import Rig
from tests.bench.twin import Twin

MARCHES = 20


def main() -> None:
    twin = Twin(Rig(cases.pile(), 16_000), "pile")
    twin.run()
    print("ready", flush=True)
    for _ in sys.stdin:
        for _ in range(MARCHES):
            twin.run()
        print("done", flush=True)


if __name__ == "__main__":
    main()
