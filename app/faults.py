"""What is wrong with an entry, as a person reads it: in the units shown, and with the place in words."""

from __future__ import annotations

import re
from collections.abc import Sequence
from typing import Any

from app.tree import parts_of
from app.units import Units
from solver import Problem

#: Lengths in the sentences of the model are in metres.
METRES = re.compile(r"(?<![\w.])(-?\d+(?:\.\d+)?(?:e[-+]?\d+)?) m(?![\w/])")
#: What was given, as the model read it, in SI: the person sees what she typed beside the sentence.
GIVEN = re.compile(r", not -?[\d.]+(?:e[-+]?\d+)?$")

#: A gauge that is called so already.
TWICE = re.compile(r"\b(gauge) '(gauge\b)", re.IGNORECASE)
#: What helps where an edit is refused for what is wrong elsewhere then.
ADVICE = (
    (re.compile(r"/gauges/\d+/position"), "Move or remove the gauge first."),
    (re.compile(r"/attachments/\d+/position"), "Move or remove the attachment first."),
    (re.compile(r"/(material|fill)$"), "Give that part another material first."),
    (re.compile(r"/ground/surface"), "Give the ground surface a smaller distance first."),
)


def sentence_for(pointer: str, problems: Sequence[Problem], tree: Any, units: Units) -> str:
    """One sentence on the fault at the place of an edit, or on the first elsewhere, with its place in words."""
    here = [p for p in problems if p.pointer == pointer or pointer.startswith(p.pointer + "/")]
    problem = (here or list(problems))[0]
    text = _in_units(TWICE.sub(r"'\2", GIVEN.sub("", problem.sentence)), units)
    if "both called" in text:  # which tells its place itself
        return f"{text[:1].upper()}{text[1:]}. Give one of them another name."
    advice = ""
    if not here and problem.pointer:
        text = f"{place_in_words(problem.pointer, tree)}: {text}"
        advice = next((f" {words}" for place, words in ADVICE if place.search(problem.pointer)), "")
    return text[:1].upper() + text[1:] + ("" if text.endswith((".", "?", ")")) else ".") + advice


def _in_units(text: str, units: Units) -> str:
    """Lengths with as many digits as tell different ones apart."""
    lengths = {float(found) for found in METRES.findall(text)}
    digits = next(n for n in range(3, 8) if n == 7 or _told_apart(lengths, units, n))
    return METRES.sub(lambda m: units.show(float(m.group(1)), "length", digits), text)


def _told_apart(lengths: set[float], units: Units, digits: int) -> bool:
    return len({units.show(length, "length", digits) for length in lengths}) == len(lengths)


def place_in_words(pointer: str, tree: Any) -> str:
    """ "/cases/0/gauges/1/position" as "gauges, Middle, position"; the case only where there are several."""
    words, node = [], tree
    for part in parts_of(pointer):
        if isinstance(node, list):
            node = node[int(part)] if part.isdecimal() and int(part) < len(node) else None
            words.append(
                str(node["name"]) if isinstance(node, dict) and node.get("name") else f"number {part}"
            )
        else:
            node = node.get(part) if isinstance(node, dict) else None
            words.append(part.replace("_", " "))
    if words[:1] == ["cases"]:
        words = words[1:] if len(tree["cases"]) > 1 else words[2:]
    return ", ".join(words) or "the project"
