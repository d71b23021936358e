"""Files that are no project as texts: cut off, in another encoding, with values that JSON or a project cannot hold."""

from __future__ import annotations

import json

from tests.project.valid import valid_tree

GOOD = json.dumps(valid_tree(), indent=1)
MODULUS = "/materials/0/young_modulus"
INVALID = "is not valid JSON at line"
FINITE = "must be a finite number"


def _with(old: str, new: str) -> bytes:
    assert GOOD.count(old) == 1, f"{old} must stand once"
    return GOOD.replace(old, new).encode()


def _twice(line: str) -> bytes:
    return _with(line, f"{line}, {line}")


def _modulus(text: str) -> bytes:
    return _with('"young_modulus": 210000000000.0', f'"young_modulus": {text}')


def _more(text: str) -> bytes:
    """With one more entry at the top."""
    return _with('"notes"', f'{text}, "notes"')


#: name, bytes of the file, place in the answer ("" = the file as a whole), words of the answer
BROKEN_TEXTS: list[tuple[str, bytes, str, str]] = [
    ("empty", b"", "", f"{INVALID} 1, column 1"),
    ("not JSON", b"title = 'Pile'\n", "", f"{INVALID} 1, column 1"),
    ("cut off", GOOD[:700].encode(), "", INVALID),
    ("one brace too many", f"{GOOD}}}".encode(), "", INVALID),
    ("two commas", _with('"poisson_ratio": 0.3,', '"poisson_ratio": 0.3,,'), "", INVALID),
    ("single quotes", GOOD.replace('"', "'").encode(), "", f"{INVALID} 2, column 2"),
    ("a comment", b"// a pile\n" + GOOD.encode(), "", f"{INVALID} 1"),
    (
        "a tab in a title",
        _with("A project for tests", "A project\tfor tests"),
        "",
        "invalid control character",
    ),
    ("UTF-16", GOOD.encode("utf-16"), "", "is not UTF-8 text (byte 0"),
    ("Latin-1", GOOD.replace("Invented", "Erf\u00fcnde").encode("latin-1"), "", "is not UTF-8 text (byte"),
    ("a picture", b"\x89PNG\r\n\x1a\n\x00\x00", "", "is not UTF-8 text (byte 0"),
    ("a list", b"[]", "", "a project is a JSON object"),
    ("null", b"null", "", "a project is a JSON object"),
    ("another program's JSON", b'{"type": "FeatureCollection"}', "/format", "the key is missing"),
    ("NaN", _modulus("NaN"), MODULUS, f"{FINITE}, not NaN"),
    ("-Infinity", _modulus("-Infinity"), MODULUS, f"{FINITE}, not -Infinity"),
    ("1e999", _modulus("1e999"), MODULUS, FINITE),
    ("5000 digits", _modulus("1" + "0" * 5000), MODULUS, FINITE),
    ("NaN where anything may stand", _more('"records": {"a": [1, NaN]}'), "/records/a/1", FINITE),
    ("a key twice at the top", _more('"notes": ""'), "/notes", "the key is given twice"),
    (
        "a key twice far down",
        _with('"cap_mass"', '"ram_mass": 1, "cap_mass"'),
        "/cases/0/load/ram_mass",
        "twice",
    ),
    ("nested without end", b"[" * 100_000, "", "is nested too deeply"),
    (
        "nested too deep",
        _more(f'"studies": {{"a": {"[" * 80}{"]" * 80}}}'),
        "/studies/a" + "/0" * 25,
        "deeper",
    ),
]
