"""What a part with a name of its own is called inside a sentence."""

from __future__ import annotations


def with_kind(kind: str, name: str) -> str:
    """ "gauge Head", "layer Soft clay"; but "Gauge 2", which tells its kind by itself."""
    return name if name.casefold().startswith(kind.casefold()) else f"{kind} {name}"
