"""A report as a file, whole or not at all."""

from __future__ import annotations

from datetime import datetime
from pathlib import Path

from app.disk import write_whole
from app.report.blocks import Report
from app.report.html import html_of
from app.report.pdf import pdf_of


def write_report(report: Report, path: Path, date: datetime) -> None:
    """Write PDF, or HTML where the name says so. Raises `OSError`."""
    content: str | bytes
    content = html_of(report) if path.suffix.casefold() in (".html", ".htm") else pdf_of(report, date)
    write_whole(path, content)
