"""Projects to and from `.strike` files. Every error has its place in the file and a sentence."""

from __future__ import annotations

import difflib
import json
from collections.abc import Callable, Sequence
from pathlib import Path
from typing import Any

from pydantic import ValidationError
from pydantic_core import ErrorDetails

from solver.model.checks import problems_of
from solver.model.json_text import tree_of_text
from solver.model.problem import Problem, shown, step
from solver.model.project import FORMAT, VERSION, Project
from solver.model.quantity import Described

#: From each older version to the next: a function that changes the tree. Version 1 is the first.
MIGRATIONS: dict[int, Callable[[dict[str, Any]], dict[str, Any]]] = {
    1: lambda tree: tree,  # version 2 only adds a key: an expression beside the limits of a material
}


class ProjectError(ValueError):
    """A project that cannot be used; `problems` lists what is wrong, each with its place."""

    def __init__(self, problems: Sequence[Problem], name: str = "") -> None:
        self.problems = tuple(problems)
        self.name = name
        lead = f"{name}: " if name else ""
        super().__init__("\n".join(f"{lead}{problem}" for problem in self.problems))


def load_project(path: str | Path) -> Project:
    """Read a project file; its cases come with their materials and histories resolved.

    Raises `ProjectError` for a file that is missing, unreadable or not valid.
    """
    path = Path(path)
    try:
        text = path.read_bytes().decode("utf-8-sig")
    except OSError as error:
        raise ProjectError([Problem("", f"cannot be read: {error.strerror or error}")], str(path)) from None
    except UnicodeDecodeError as error:
        sentence = f"is not UTF-8 text (byte {error.start} fits no letter): save it in UTF-8"
        raise ProjectError([Problem("", sentence)], str(path)) from None
    try:
        return parse_project(text, path.parent)
    except ProjectError as error:
        raise ProjectError(error.problems, str(path)) from None


def parse_project(text: str, folder: Path | None = None) -> Project:
    """A project from JSON text. `folder` is where relative history files are looked for.

    Raises `ProjectError`.
    """
    tree, problems = tree_of_text(text)
    if problems:
        raise ProjectError(problems)
    return project_from_tree(tree, folder)


def project_from_tree(tree: Any, folder: Path | None = None) -> Project:
    """A project from plain dicts, lists and numbers, checked as a whole. Raises `ProjectError`."""
    tree = _current_version(tree)
    try:
        project = Project.model_validate(tree, context={"folder": folder})
    except ValidationError as error:
        raise ProjectError(_problems(error.errors(include_url=False), tree)) from None
    problems = problems_of(project)
    if problems:
        raise ProjectError(problems)
    cases = tuple(case.with_materials(project.materials) for case in project.cases)
    return project.model_copy(update={"cases": cases, "version": project.oldest_version()})


def project_to_text(project: Project) -> str:
    """The file's text: the same project always gives the same text, and reading it gives the same project.

    Half a character (a lone surrogate) stays what it is in JSON, an escape, as no file could hold it otherwise.
    """
    text = json.dumps(project.model_dump(mode="json"), indent=2, ensure_ascii=False) + "\n"
    return text.encode("utf-8", "backslashreplace").decode("utf-8")


def _current_version(tree: Any) -> dict[str, Any]:
    if not isinstance(tree, dict):
        raise ProjectError(
            [Problem("", "a project is a JSON object, with 'format', 'version', 'title' and 'cases'")]
        )
    if "format" not in tree:
        raise ProjectError([Problem("/format", f"the key is missing: it must be '{FORMAT}'")])
    if tree["format"] != FORMAT:
        sentence = f"must be '{FORMAT}', not {shown(tree['format'])}: this is no Striketrace project"
        raise ProjectError([Problem("/format", sentence)])
    if "version" not in tree:
        raise ProjectError([Problem("/version", f"the key is missing: it must be a number up to {VERSION}")])
    version = tree["version"]
    if not isinstance(version, int) or isinstance(version, bool) or version < 1:
        sentence = (
            f"must be a whole number from 1 on (this program knows up to {VERSION}), not {shown(version)}"
        )
        raise ProjectError([Problem("/version", sentence)])
    if version > VERSION:
        sentence = (
            f"version {version} was made by a newer version of Striketrace; this one reads up to {VERSION}"
        )
        raise ProjectError([Problem("/version", sentence)])
    while version < VERSION:
        tree = MIGRATIONS[version](tree)
        version += 1
    return tree


def _problems(details: Sequence[ErrorDetails], tree: Any) -> list[Problem]:
    """One problem per fault: of a union's complaints only those that fit what was given."""
    found: list[Problem] = []
    for detail in details:
        given_object = isinstance(detail["input"], dict)
        if detail["type"] == "too_short" and detail["input"]:
            continue  # pydantic counts only the valid entries; the invalid ones speak for themselves
        pointer, parent = _pointer(detail["loc"], tree)
        problem = Problem(pointer, _sentence(detail, parent))
        misfit = (
            detail["type"] in WANTS_OBJECT and not given_object and any(p.pointer == pointer for p in found)
        )
        if given_object and detail["type"] in WANTS_NUMBER:
            misfit = True
        if not misfit and problem not in found:
            found.append(problem)
    return found or [Problem(*_first(details[0], tree))]


def faults_of(kind: type[Described], tree: Any, at: str) -> list[Problem]:
    """What keeps a tree, which stands at the pointer `at`, from describing a `kind`: each fault with its place."""
    try:
        kind.model_validate(tree)
    except ValidationError as error:
        found = _problems(error.errors(include_url=False), tree)
        return [Problem(at + problem.pointer, problem.sentence) for problem in found]
    return []


def _first(detail: ErrorDetails, tree: Any) -> tuple[str, str]:
    pointer, parent = _pointer(detail["loc"], tree)
    return pointer, _sentence(detail, parent)


WANTS_OBJECT = ("dict_type", "model_type", "model_attributes_type")
WANTS_NUMBER = ("float_type", "int_type")


def _pointer(loc: tuple[int | str, ...], tree: Any) -> tuple[str, Any]:
    """JSON pointer of an error, without the names that pydantic adds for the members of a union."""
    parts: list[str] = []
    node = parent = tree
    for item in loc:
        in_list = isinstance(node, list | tuple) and isinstance(item, int) and item < len(node)
        if in_list or (isinstance(node, dict) and item in node):
            parent, node = node, node[item]
        elif isinstance(node, dict) and item in (node.get("kind"), node.get("shape")):
            continue
        elif isinstance(node, dict) and item == loc[-1] and not _is_type_name(item):
            parent, node = node, None
        else:
            continue
        parts.append(step(item))
    return "".join(parts), parent


def _is_type_name(item: int | str) -> bool:
    """Whether pydantic put this in for a member of a plain union ('float', 'Limit', 'constrained-int')."""
    return (
        not isinstance(item, str) or item[:1].isupper() or item in UNION_MEMBERS or "[" in item or "-" in item
    )


UNION_MEMBERS = {"float", "int", "str", "dict", "list", "tuple"}

SENTENCES: dict[str, str] = {
    "missing": "the key is missing",
    "float_type": "must be a number",
    "int_type": "must be a whole number",
    "string_type": "must be text",
    "bool_type": "must be true or false",
    "finite_number": "must be a finite number",
    "tuple_type": "must be a list",
    "list_type": "must be a list",
    "dict_type": "must be an object",
    "model_type": "must be an object",
    "model_attributes_type": "must be an object",
}


def _sentence(detail: ErrorDetails, parent: Any) -> str:
    kind, context = detail["type"], detail.get("ctx", {})
    given = detail["input"]
    if kind == "extra_forbidden":
        return "is not a key that is known here" + _near(str(detail["loc"][-1]), parent)
    if kind == "greater_than":
        return f"must be more than {context['gt']:g}, not {shown(given)}"
    if kind == "greater_than_equal":
        return f"must be at least {context['ge']:g}, not {shown(given)}"
    if kind == "less_than_equal":
        return f"must be at most {context['le']:g}, not {shown(given)}"
    if kind in ("literal_error", "enum"):
        return f"must be {context['expected']}, not {shown(given)}"
    if kind == "union_tag_invalid":
        return f"'{context['tag']}' is not known here; possible are {context['expected_tags']}"
    if kind == "union_tag_not_found":
        return f"needs the key {context['discriminator']}"
    if kind == "string_too_short":
        return "must not be empty"
    if kind == "string_too_long":
        return f"must not be longer than {context['max_length']} characters"
    if kind in ("too_short", "too_long"):
        most = context.get("max_length", context.get("min_length"))
        entries = f"{most} entries" if most != 1 else "one entry"
        return f"needs {'at least' if kind == 'too_short' else 'at most'} {entries}"
    if kind == "value_error":
        return str(context["error"])
    if kind in SENTENCES:
        without = kind == "missing" or isinstance(given, dict | list)
        return SENTENCES[kind] + ("" if without else f", not {shown(given)}")
    return detail["msg"]


def _near(key: str, parent: Any) -> str:
    """A word on the key that was probably meant: one of the description that the keys beside it belong to."""
    given = set(parent or ())
    others = (set(model.model_fields) for model in _models() if key not in model.model_fields)
    fields = max(others, key=lambda names: len(names & given))
    close = difflib.get_close_matches(key, sorted(fields), n=1, cutoff=0.75)
    if not close:
        return ""
    return f" ('{close[0]}' stands beside it)" if close[0] in given else f" (did you mean '{close[0]}'?)"


def _models() -> list[Any]:
    pending, found = [Described], []
    while pending:
        model = pending.pop()
        found.append(model)
        pending.extend(model.__subclasses__())
    return found
