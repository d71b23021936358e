"""The answer in a line or two: which cases stay within their limits, and how much of the input nobody has confirmed."""

from __future__ import annotations

import re
from collections.abc import Sequence

from app.report.outcome import Solved
from app.tree import value_at
from app.words import SIGNS, percent
from solver import Project
from solver.answer.findings import Findings, State, StressFinding

#: The worse goes first: a case counts as what its worse stress is.
WORST_FIRST: tuple[State, ...] = ("over", "near", "no limit", "within")
#: Cases told by their names, and letters of a name, at most.
MOST_NAMES, NAME = 4, 60


def verdict_lines(project: Project, cases: Sequence[Solved]) -> tuple[str, ...]:
    """Sentences with their signs, the worst first."""
    found: dict[State, list[str]] = {}
    refused = [short_name(one.case.name) for one in cases if one.findings is None]
    for one in cases:
        if one.findings is not None:
            state, told = _state_of(one.findings)
            found.setdefault(state, []).append(f"{short_name(one.case.name)}{told}")
    lines = []
    if refused:
        lines.append(f"! Not computed: {_listed(refused)}.")
    for state in WORST_FIRST:
        if state in found:
            lines.append(f"{SIGNS[state]} {_sentence(state, found[state], len(cases))}")
    return (*lines, *typical_lines(project))


def typical_lines(project: Project) -> tuple[str, ...]:
    """How many values are typical ones that nobody has confirmed; none where there are none."""
    values, places = typical_values(project)
    if not values:
        return ()
    word = "values are typical ones" if values > 1 else "value is a typical one"
    where = f" (in {places} places of the input)" if places > values else ""
    return (f"! {values} {word}, not confirmed for this site{where}.",)


def typical_values(project: Project) -> tuple[int, int]:
    """Unconfirmed values, each counted once however many cases share it, and the places where they stand."""
    tree = project.model_dump(mode="json")
    marks = [(p, m.source) for p, m in (project.provenance or {}).items() if m.state == "typical"]
    different = {(re.sub(r"^/cases/\d+/", "", p), str(value_at(tree, p)), source) for p, source in marks}
    return len(different), len(marks)


def _state_of(findings: Findings) -> tuple[State, str]:
    """The worse state of both stresses, and what to say of it behind the name of the case."""
    stresses = (findings.compression, findings.tension)
    state = min((s.state for s in stresses), key=WORST_FIRST.index)
    parts = [_share(s) for s in stresses if s.state == state]
    if state == "no limit":
        return state, "" if len(parts) == len(stresses) else f" ({parts[0]})"
    if state == "within":
        largest = max((s for s in stresses if s.worst is not None), key=lambda s: s.worst.share or 0.0)  # type: ignore[union-attr]
        return state, f" ({_share(largest)})"
    return state, f" ({', '.join(parts)})"


def _share(finding: StressFinding) -> str:
    worst = finding.worst
    if worst is None or worst.share is None:
        return finding.sign
    return f"{finding.sign} {percent(worst.share)} of its limit"


def _sentence(state: State, cases: list[str], count: int) -> str:
    if state == "within":
        every = len(cases) == count > 1
        lead = f"All {count} cases stay within the limits given" if every else "Within the limits given"
        return f"{lead}: {_listed(cases)}."
    lead = {"over": "Over a limit", "near": "Near a limit", "no limit": "Not judged, for want of a limit"}[
        state
    ]
    return f"{lead}: {_listed(cases)}."


def _listed(names: list[str]) -> str:
    rest = len(names) - MOST_NAMES
    shown = names if rest <= 0 else [*names[:MOST_NAMES], f"and {rest} more"]
    return "; ".join(shown)


def short_name(name: str) -> str:
    """In one line, and cut where it is very long; the heading of the case tells all of it."""
    name = " ".join(name.split())
    return name if len(name) <= NAME else name[: NAME - 1] + "…"
