"""How a command ends: the statuses that the README names, and the sentence that goes with one that is not 0."""

from __future__ import annotations

import sys

DONE, FAILED, UNUSABLE, NO_WINDOW = 0, 1, 2, 3


def complain(sentence: str, status: int) -> int:
    """Say what is wrong on standard error; answers the status to end with."""
    print(sentence, file=sys.stderr)
    return status
