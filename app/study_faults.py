"""What is wrong with the choices that a project keeps under `/studies`. Imports no Qt."""

from __future__ import annotations

import difflib
from collections.abc import Iterator, Mapping
from typing import Any

from app.report.choices import KEY, ReportChoices, report_choices
from solver import Problem, Project
from solver.studies.settings import faults_in_studies

#: Studies that this program knows; others belong to a newer one and are left alone.
KNOWN = ("set_sheet", "depth", KEY)


def study_faults(project: Project) -> list[Problem]:
    """Each fault with its place in the file; a key that was probably mistyped is one too."""
    studies = project.studies or {}
    found = []
    for key in studies:
        meant = [] if key in KNOWN else difflib.get_close_matches(key, KNOWN, n=1, cutoff=0.75)
        if meant:
            found.append(
                Problem(f"/studies/{key}", f"is no study that is known here: did you mean '{meant[0]}'?")
            )
    return [*found, *faults_in_studies(project), *_in_report(studies)]


def _in_report(studies: Mapping[str, Any]) -> Iterator[Problem]:
    tree, place = studies.get(KEY), f"/studies/{KEY}"
    if tree is None:
        return
    if not isinstance(tree, Mapping):
        yield Problem(place, "must be an object")
        return
    understood = report_choices(studies).to_tree()
    usual = vars(ReportChoices())
    for key, value in tree.items():
        if key not in usual:
            meant = difflib.get_close_matches(key, list(usual), n=1, cutoff=0.75)
            yield Problem(
                f"{place}/{key}",
                "is not a key that is known here" + (f" (did you mean '{meant[0]}'?)" if meant else ""),
            )
        else:
            kept = understood.get(key, usual[key])
            kept = (
                list(kept) if isinstance(kept, tuple) else dict(kept) if isinstance(kept, Mapping) else kept
            )
            if kept != value:
                yield Problem(f"{place}/{key}", f"is not understood: read as {kept!r}")
