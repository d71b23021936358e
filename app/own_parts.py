"""Parts that a user keeps for herself: a file beside the settings, listed with the parts library."""

from __future__ import annotations

import json
from pathlib import Path
from typing import Any, get_args

from app.parts_library import Part, PartKind
from app.tree import copied, value_at

FILE = "own_parts.json"
SOURCE = "own part"
#: Keys of a part that belong to it, for kinds of which not all do.
KEYS: dict[PartKind, tuple[str, ...]] = {
    "ram": ("ram_mass",),
    "cushion": ("young_modulus", "restitution"),
    "layer": ("quake", "damping", "damping_law"),
    "toe": ("quake", "damping", "damping_law"),
}


def part_from(tree: dict[str, Any], kind: PartKind, pointer: str, name: str) -> Part | None:
    """The part at a place of a project as an own one; `None` where it has not all that makes one.

    For a material `pointer` may also be a place that names it.
    """
    found = value_at(tree, pointer)
    if kind == "material" and isinstance(found, str):
        found = next((m for m in tree["materials"] if m["name"] == found), None)
    if not isinstance(found, dict) or "fill" in found:
        return None  # a fill names a material that another project may not have
    keys = KEYS.get(kind, tuple(key for key in found if key != "name"))
    values = {key: copied(found[key]) for key in keys if found.get(key) is not None}
    return Part(kind, name, "", SOURCE, values, own=True) if set(values) >= set(KEYS.get(kind, ())) else None


def own_parts(folder: Path) -> list[Part]:
    """All parts kept in a settings folder; an entry that makes no sense is left out, as is a file that does not."""
    try:
        entries = json.loads((folder / FILE).read_text(encoding="utf-8"))
    except (OSError, ValueError):
        return []
    found = []
    for entry in entries if isinstance(entries, list) else []:
        part = _part(entry)
        if part is not None:
            found.append(part)
    return found


def keep_part(folder: Path, part: Part) -> None:
    """Keep a part, in place of one of the same kind and name. Raises `OSError`."""
    _write(folder, [*(p for p in own_parts(folder) if not _same(p, part)), part])


def forget_part(folder: Path, part: Part) -> None:
    """Drop an own part; projects that use it keep their copy. Raises `OSError`."""
    _write(folder, [p for p in own_parts(folder) if not _same(p, part)])


def _same(one: Part, other: Part) -> bool:
    return (one.kind, one.name) == (other.kind, other.name)


def _part(entry: Any) -> Part | None:
    if not isinstance(entry, dict):
        return None
    kind: Any = entry.get("kind")
    name, values = entry.get("name"), entry.get("values")
    if kind not in get_args(PartKind) or not isinstance(name, str) or not isinstance(values, dict):
        return None
    return Part(kind, name, "", SOURCE, values, own=True) if name and values else None


def _write(folder: Path, parts: list[Part]) -> None:
    folder.mkdir(parents=True, exist_ok=True)
    entries = [{"kind": p.kind, "name": p.name, "values": dict(p.values)} for p in parts]
    new = folder / f"{FILE}.new"
    new.write_text(json.dumps(entries, indent=2, ensure_ascii=False) + "\n", encoding="utf-8")
    new.replace(folder / FILE)
