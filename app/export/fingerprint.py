"""A hash of the input, so that whoever holds a record or a report can tell which project it came from."""

from __future__ import annotations

import hashlib

from solver import Project, project_to_text


def input_hash(project: Project) -> str:
    """SHA-256 of the project's text and of the history files that its loads read, in hexadecimal."""
    digest = hashlib.sha256(project_to_text(project).encode("utf-8", "backslashreplace"))
    for case in project.cases:
        if case.load.kind == "history" and case.load.file is not None:
            samples = case.load.samples
            digest.update(samples.times.astype("<f8").tobytes() + samples.values.astype("<f8").tobytes())
    return digest.hexdigest()
