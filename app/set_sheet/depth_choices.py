"""What a study of depths takes: penetrations, a factor on each layer while driving, the pace of the blows."""

from __future__ import annotations

from typing import Any

from PySide6.QtGui import QShowEvent
from PySide6.QtWidgets import QLabel, QVBoxLayout, QWidget

from app.document import Document
from app.look.spacing import GAP
from app.set_sheet.fields import NumbersField
from app.units import Units, rounded, units_of
from solver import Case
from solver.studies import StudyError
from solver.studies.settings import DepthSettings, depth_settings_of

FACTOR = (
    "Resistance while driving as a factor on that of the case: below 1 where the ground sets up afterwards."
)


class DepthChoices(QWidget):
    """Shows and edits `/studies/depth`."""

    def __init__(self, document: Document, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self._half: tuple[tuple[float, ...], tuple[float, ...]] | None = None
        self.penetrations = NumbersField("Depths", "Penetrations; empty = twelve even steps.", most=200)
        self.pace = NumbersField("Blows a minute", "For the driving time; empty = 40.")
        self.penetrations.entered.connect(lambda given: self._set("penetrations", list(given) or None))
        self.pace.entered.connect(lambda given: self._set("blows_per_minute", given[0] if given else None))
        lead = QLabel("Factor on the resistance while driving:")
        lead.setProperty("role", "small")
        self.factors: dict[str, NumbersField] = {}
        self._column = QVBoxLayout(self)
        self._column.setContentsMargins(0, 0, 0, 0)
        self._column.setSpacing(GAP)
        self.toe_depths = NumbersField("Toe changes at", "Depths; empty = the toe as in the case.", most=20)
        self.toe_values = NumbersField("to", "Toe resistances at these depths, linear between them.", most=20)
        self.toe_depths.entered.connect(lambda given: self._set_toe(given, None))
        self.toe_values.entered.connect(lambda given: self._set_toe(None, given))
        for widget in (self.penetrations, self.pace, self.toe_depths, self.toe_values, lead):
            self._column.addWidget(widget)
        document.changed.connect(self.follow)
        self.follow()

    def showEvent(self, event: QShowEvent) -> None:
        super().showEvent(event)
        self.follow()

    def follow(self) -> None:
        """Show what the project says, with a row for each layer of the case at hand."""
        if not self.isVisible():
            return
        case, units, settings = self._document.case, units_of(self._document.project), self._settings()
        names = layer_names(case)
        if names != list(self.factors):
            self._make_rows(names)
        pale = settings.model_copy(update={"penetrations": None}).depths(case)
        span = " to ".join(rounded(float(units.number(one, "length"))) for one in (pale[0], pale[-1]))
        self.penetrations.show_values(settings.penetrations, (), "length", units, span)
        pace = settings.blows_per_minute
        self.pace.show_values(
            None if pace == DepthSettings().blows_per_minute else (pace,), (40.0,), "none", units
        )
        toe = case.ground is not None and case.ground.toe is not None and case.far_end.kind == "ground"
        depths, values = _columns(settings.toe_at) if settings.toe_at else (None, None)
        own = [case.ground.toe.resistance] if toe and case.ground and case.ground.toe else []
        if not self._half:
            self.toe_depths.show_values(depths, (), "length", units)
            self.toe_values.show_values(values, own, "force", units)
        self.toe_depths.setVisible(toe)
        self.toe_values.setVisible(toe)
        for name, row in self.factors.items():
            factor = settings.factors.get(name)
            row.show_values(None if factor is None else (factor,), (1.0,), "none", Units())

    def _make_rows(self, names: list[str]) -> None:
        for row in self.factors.values():
            self._column.removeWidget(row)
            row.deleteLater()
        self.factors = {}
        for name in names:
            row = NumbersField(name.capitalize() if name in ("toe", "shaft") else name, FACTOR)
            row.entered.connect(lambda given, name=name: self._set_factor(name, given[0] if given else None))
            self.factors[name] = row
            self._column.addWidget(row)

    def _settings(self) -> DepthSettings:
        try:
            return depth_settings_of(self._document.project)
        except StudyError:
            return DepthSettings()

    def _set_factor(self, name: str, value: float | None) -> None:
        if value is not None and value < 0:
            self.factors[name].refuse("A factor must not be below 0.")
            return
        factors = {**self._settings().factors, name: value}
        self._set("factors", {k: v for k, v in factors.items() if v is not None} or None)

    def _set_toe(self, depths: tuple[float, ...] | None, values: tuple[float, ...] | None) -> None:
        """One of the two rows is new; they go into the project together, once they have as many numbers."""
        kept = self._half or _columns(self._settings().toe_at)
        depths, values = kept[0] if depths is None else depths, kept[1] if values is None else values
        self._half = None
        if depths and values and len(depths) == len(values):
            self._set("toe_at", [list(pair) for pair in zip(depths, values, strict=True)])
        elif not depths and not values:
            self._set("toe_at", None)
        else:
            self._half = (depths, values)
            fewer = self.toe_values if len(values) < len(depths) else self.toe_depths
            fewer.refuse(f"{len(depths)} depths need as many resistances; {len(values)} are given.")

    def _set(self, key: str, value: Any) -> None:
        def change(tree: dict[str, Any]) -> None:
            studies = tree.get("studies") or {}
            depth = {**studies.get("depth", {}), key: value}
            kept = {k: v for k, v in depth.items() if v is not None}
            others = {k: v for k, v in studies.items() if k != "depth"}
            tree["studies"] = ({**others, "depth": kept} if kept else others) or None

        self._document.edit_tree("Change the study of depths", change)


def _columns(pairs: tuple[tuple[float, float], ...]) -> tuple[tuple[float, ...], tuple[float, ...]]:
    return tuple(depth for depth, _value in pairs), tuple(value for _depth, value in pairs)


def layer_names(case: Case) -> list[str]:
    """What a factor can be given for: each layer, the shaft where it is one total, and the toe."""
    ground = case.ground
    if ground is None:
        return []
    names = list(dict.fromkeys(layer.name for layer in ground.layers)) + (
        ["shaft"] if ground.shaft_total else []
    )
    return names + (["toe"] if ground.toe is not None and case.far_end.kind == "ground" else [])
