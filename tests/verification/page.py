"""What the page says, before it is Markdown or HTML."""

from __future__ import annotations

import platform
from dataclasses import dataclass
from functools import cached_property

import numba
import numpy as np

from app import __version__
from tests.published.registry import TOPICS, Check, Compared, Outcome

TITLE = "The solver against published closed forms"

INTRODUCTION = (
    "Every entry below is run when this page is written: a case is built through the same door as a "
    "project file, solved by the program, and compared with a closed form that is computed beside "
    "it, or with a printed table. The same functions are tests of the program, so that this page "
    "cannot say anything else than they do.",
    "Where a history is compared, the row shows the point at which it is worst. A difference is a "
    "share of what the entry names. At Courant number 1 the scheme solves the wave equation exactly: "
    "forces are means over the two elements beside a gauge, velocities means over the two steps "
    "around a time, and closed forms are averaged alike before they are compared. “From memory” "
    "marks a source that was not at hand when the check was written; “recomputed” marks numbers that "
    "were worked out anew rather than copied.",
)

NOT_COVERED = (
    "Measurements. Everything here is a closed form or a table computed from one; no field or "
    "laboratory record is compared.",
    "Rods whose travel times have no common divisor, and random members, laws and loads: those are "
    "in tests/solver, against independent solutions and by properties. Most checks here choose "
    "meshes on which an exact answer can be asked for.",
    "Cushions with damping of their own (a dashpot beside the spring): the program has none.",
    "A spring and a dashpot one behind the other at an end: a project cannot describe them. Side by "
    "side they are covered.",
    "Power-law hardening, strain-rate effects, and rods that mushroom on impact (Taylor's test): "
    "plastic strains are small strains here. A perfectly plastic zone is as long as the element that "
    "it falls into.",
    "Shocks in large-strain rods: the law takes no energy, so the front rings; only the means behind "
    "it are held, to 2 %.",
    "Round bars beyond 2 pi radius / wavelength = 0.6, and their higher modes: lateral inertia is "
    "Love's, not the exact theory.",
    "Half-space models that depend on frequency (Novak) or carry an added mass (Deeks and Randolph): "
    "the program has neither.",
    "Residual stress in flexible piles: the only closed form is that of a rigid pile; tendencies are not proof.",
    "Worked examples of Smith's paper and of manuals: their printed numbers were not at hand.",
    "Efficiencies, quakes, damping factors and cushion moduli as such: the program computes with what it is given.",
    "Bending, torsion, buckling, soil that changes during driving: outside a one-dimensional rod.",
)


@dataclass(frozen=True)
class Shown:
    """A check with what it gave, or the sentence with which its run was refused."""

    check: Check
    outcome: Outcome | None
    refusal: str

    @property
    def holds(self) -> bool:
        """Whether it is within its tolerance."""
        return self.outcome is not None and self.outcome.holds

    @property
    def sentence(self) -> str:
        """Its worst difference in words."""
        if self.outcome is None:
            return self.refusal
        if not self.outcome.compared:
            return "nothing was compared"
        worst = self.outcome.worst
        return (
            f"{worst.what}: off by {number(worst.difference)}, allowed {number(self.outcome.allowed(worst))}"
        )


def shown(check: Check) -> Shown:
    """Run a check; one whose run is refused or breaks has failed, and the page says how."""
    try:
        return Shown(check, check.run(), "")
    except Exception as error:  # whatever it was belongs on the page, the other checks go on
        return Shown(check, None, f"{type(error).__name__}: {error}")


@dataclass(frozen=True)
class Page:
    """All checks with their outcomes, and the seconds that they took."""

    results: tuple[Shown, ...]
    seconds: float

    @property
    def holds(self) -> bool:
        """Whether every check does."""
        return all(r.holds for r in self.results)

    @cached_property
    def by_topic(self) -> dict[str, list[Shown]]:
        """Headings with their checks, in the page's order."""
        groups: dict[str, list[Shown]] = {}
        for result in self.results:
            groups.setdefault(TOPICS[result.check.topic], []).append(result)
        return groups

    @property
    def counts(self) -> str:
        """How many checks hold, in one sentence."""
        held = sum(r.holds for r in self.results)
        values = [c for r in self.results if r.outcome for c in r.outcome.compared]
        points = sum(c.points for c in values)
        return (
            f"{held} of {len(self.results)} checks hold: {len(values)} comparisons of {points} numbers, "
            f"in {self.seconds:.0f} s."
        )

    @property
    def made_with(self) -> str:
        """Program and libraries that gave these numbers."""
        return (
            f"Striketrace {__version__}, Python {platform.python_version()}, numpy {np.__version__}, "
            f"numba {numba.__version__}, {platform.system()} {platform.machine()}."
        )


def number(x: float) -> str:
    """A number as the tables print it: eight digits, and no more zeros than it needs."""
    if x == 0:
        return "0"
    if not np.isfinite(x):
        return "none"
    return f"{x:.8g}" if 1e-4 <= abs(x) < 1e8 else f"{x:.7e}".replace("e-0", "e-").replace("e+0", "e")


def short(x: float) -> str:
    """A difference or a tolerance: two digits."""
    return "0" if x == 0 else f"{x:.2g}".replace("e-0", "e-")


def row(compared: Compared, outcome: Outcome) -> tuple[str, str, str, str, str]:
    """What, expected, solver, difference, allowed."""
    sign = "" if compared.difference <= outcome.allowed(compared) else " ✕"
    unit = f" {compared.unit}" if compared.unit else ""
    # beside what it is measured by, rounding is nothing to read
    expected, found = (
        0.0 if abs(x) < 1e-12 * compared.scale else x for x in (compared.expected, compared.found)
    )
    what = compared.what + (f" ({compared.points} points)" if compared.points > 1 else "")
    return (
        what,
        number(expected) + unit,
        number(found) + unit,
        short(compared.difference) + sign,
        short(outcome.allowed(compared)),
    )
