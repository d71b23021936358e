""" "What is this?": the definition of what a widget shows, with its source, beside it. Nothing modal."""

from __future__ import annotations

from html import escape

from PySide6.QtCore import QPoint
from PySide6.QtWidgets import QAbstractButton, QLabel, QWhatsThis, QWidget

from app.terms import about, rich_text


def explanation_of(widget: QWidget | None) -> str:
    """Rich text on the nearest part around a widget that there is something to tell about; "" where there is none.

    What is told: the words of its tooltip, which for a field are definition and source, and the terms in its name.
    """
    while widget is not None and not widget.isWindow():
        shown = widget.text() if isinstance(widget, QLabel | QAbstractButton) else ""
        name = widget.accessibleName()
        told = widget.toolTip().strip()
        terms = about(f"{name} {shown}")
        if terms or (told and told not in (name, shown)):
            head = f"<p><b>{escape(name or shown)}</b>" if told else ""
            lines = "".join(f"<br>{escape(line)}" for line in told.splitlines() if line != name)
            return (f"{head}{lines}</p>" if head else "") + rich_text(terms)
        widget = widget.parentWidget()
    return ""


def explain(widget: QWidget | None) -> bool:
    """Show what a widget is about, beside it, until the next click or key. False where there is nothing to tell."""
    text = explanation_of(widget)
    if not text or widget is None:
        return False
    QWhatsThis.showText(
        widget.mapToGlobal(QPoint(widget.width() // 2, min(widget.height(), 40))), text, widget
    )
    return True
