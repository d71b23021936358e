"""How the pictures stand to the input, in a word and a sign: up to date, solving, not valid, refused, stopped."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from app.document import Document
from app.solving import Solution

Kind = Literal["fresh", "solving", "invalid", "refused", "stopped", "stale"]


@dataclass(frozen=True)
class Standing:
    """`sign` and `word` for the bar; `tells`, a sentence or more; `fraction` of a run under way."""

    kind: Kind
    sign: str
    word: str
    tells: str = ""
    fraction: float | None = None


def standing_of(document: Document, solution: Solution) -> Standing:
    """The standing now. An input that is not valid comes first: what is solved meanwhile is the last valid one."""
    if document.rejected:
        sentences = [entry.sentence for entry in document.rejected.values()]
        return Standing("invalid", "✕", "Input not valid", "\n".join(sentences))
    if solution.state == "solving":
        return Standing("solving", "…", _solving(solution), "", solution.fraction)
    if solution.state == "refused":
        return Standing("refused", "✕", "Cannot be solved", solution.message)
    if solution.state == "stopped":
        return Standing("stopped", "!", "Stopped", solution.message)
    if solution.state == "stale":
        return Standing("stale", "!", "Out of date", "The pictures do not show the input as it is now.")
    return Standing("fresh", "✓", "Up to date", "The pictures show the input as it is now.")


def _solving(solution: Solution) -> str:
    if solution.fraction <= 0:
        return "Solving"
    left = solution.seconds_left
    share = f"Solving, {solution.fraction:.0%}"
    return share if left is None or left < 1 else f"{share}, {time_left(left)}"


def time_left(seconds: float) -> str:
    """Time left in whole units: nobody needs the seconds of an hour."""
    if seconds < 90:
        return f"{seconds:.0f} s left"
    if seconds < 5400:
        return f"{seconds / 60:.0f} min left"
    return f"{seconds / 3600:.1f} h left"
