"""One thing that is wrong with a project: its place and a sentence."""

from __future__ import annotations

import json
from dataclasses import dataclass
from typing import Any


@dataclass(frozen=True)
class Problem:
    """One thing wrong: `pointer` is a JSON pointer into the project, `sentence` says what and what would be right."""

    pointer: str
    sentence: str

    def __str__(self) -> str:
        return f"{self.pointer}: {self.sentence}" if self.pointer else self.sentence


def shown(value: Any) -> str:
    """A value for a sentence, much as it stands in the file, cut where it is long."""
    text = f"'{value}'" if isinstance(value, str) else json.dumps(value, ensure_ascii=False, default=str)
    return text if len(text) <= 60 else f"{text[:57]}..."


def step(key: str | int) -> str:
    """One step of a JSON pointer (RFC 6901)."""
    return "/" + str(key).replace("~", "~0").replace("/", "~1")
