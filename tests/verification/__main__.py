"""`python3 -m tests verification [--out DIR] [--html]`: run every published check and write them on one page."""

from __future__ import annotations

import argparse
import os
import sys
import time
from pathlib import Path

CHECKOUT = Path(__file__).resolve().parents[2]


def main(arguments: list[str]) -> int:
    """Write `verification.md` (and `verification.html`) into the folder; returns 1 where a check fails."""
    parser = argparse.ArgumentParser(
        prog="python3 -m tests verification",
        description="Runs every check of the solver against published closed forms and writes them on one page.",
    )
    parser.add_argument("--out", type=Path, default=CHECKOUT / "build" / "verification", metavar="DIR")
    parser.add_argument(
        "--html", action="store_true", help="write the page with figures beside it, for people"
    )
    options = parser.parse_args(arguments)
    # compiled kernels stay in the checkout, as for the other tests; set before the solver is first imported
    os.environ.setdefault("STRIKETRACE_CACHE", str(CHECKOUT / ".pytest_cache" / "kernels"))

    from tests.published.registry import all_checks
    from tests.verification import html_page, markdown_page
    from tests.verification.page import Page, shown

    began = time.perf_counter()
    results = []
    for check in all_checks():
        results.append(shown(check))
        if not results[-1].holds:
            print(f"✕ {check.name}: {results[-1].sentence}", file=sys.stderr)
    page = Page(tuple(results), time.perf_counter() - began)
    try:
        options.out.mkdir(parents=True, exist_ok=True)
        written = [_write(options.out / "verification.md", markdown_page.text(page))]
        if options.html:
            written.append(_write(options.out / "verification.html", html_page.text(page)))
    except OSError as error:
        print(f"The page cannot be written to {options.out}: {error.strerror or error}.", file=sys.stderr)
        return 1
    print(page.counts)
    for path in written:
        print(path)
    return 0 if page.holds else 1


def _write(path: Path, text: str) -> Path:
    path.write_text(text, encoding="utf-8", newline="\n")
    return path


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
