"""Solve a case: discretise, bring to rest, march blow after blow, gather the answer."""

from __future__ import annotations

import time
from collections.abc import Callable

from solver.answer.result import Result
from solver.errors import SolveError
from solver.marching import March, Progress
from solver.model.project import Case, RepeatedBlows
from solver.numerics.assemble import rod_of
from solver.numerics.chain import Chain
from solver.numerics.equilibrium import State, step_ground_back
from solver.numerics.settle import settle
from solver.standing import at_rest, standing


def solve(
    case: Case,
    *,
    element_length: float | None = None,
    progress: Callable[[Progress], None] | None = None,
    cancel: Callable[[], bool] | None = None,
) -> Result:
    """Solve one case of a project.

    `element_length` (m) overrides that of the case. `progress` is called between chunks; when `cancel` answers True,
    what is solved so far is returned with `finished` False. Raises `SolveError` with a sentence where the case cannot
    be solved.
    """
    return solve_chain(*standing(case, element_length), progress, cancel)


def solve_chain(
    chain: Chain,
    state: State | None = None,
    progress: Callable[[Progress], None] | None = None,
    cancel: Callable[[], bool] | None = None,
) -> Result:
    """Solve a case that is discretised already, from a `state` before the first step (`None`: at rest), which changes.
    Other arguments and errors as for `solve`."""
    began = time.perf_counter()
    wanted = chain.case.run.blows
    most = wanted.most if isinstance(wanted, RepeatedBlows) else wanted
    tolerance = wanted.tolerance if isinstance(wanted, RepeatedBlows) else 0.0
    state = state or at_rest(chain)
    sets: list[float] = []
    for blow in range(most):
        march = March(chain, state, began, blow / most, 1 / most, sets)
        try:
            stopped = march.run(progress, cancel)
        except BaseException:
            # the error keeps this frame, and with it files as large as the run
            march.gauges.close()
            march.ram.close()
            raise
        at_end = state.motion.u.copy()
        settled = chain.case.ground is not None and not stopped and settle(chain, state)
        if most > 1 and not stopped and not settled:
            raise SolveError(
                "The member finds no rest between its blows: nothing holds it, or its ground gives way. "
                "Give it shaft resistance or turn gravity on, or set 'blows' to 1."
            )
        if chain.case.ground is not None:
            sets.append(float(state.motion.u[-1] - march.rest[-1]))
        repeats = len(sets) > 1 and abs(sets[-1] - sets[-2]) <= tolerance
        if stopped or repeats or blow == most - 1:
            return march.result(stopped, settled, at_end)
        if progress is not None:
            progress(march.progress())
        if cancel is not None and cancel():
            return march.result(True, settled, at_end)
        state = _next_blow(chain, state)
    raise AssertionError("a run has at least one blow")


def _next_blow(chain: Chain, old: State) -> State:
    """The member as it came to rest, its ram lifted to strike again: new cushions, the ground as it was left."""
    fresh = at_rest(chain)
    u = old.motion.u.copy()
    u[: chain.head] = u[chain.head] + fresh.motion.u[: chain.head] - fresh.motion.u[chain.head]
    state = State(rod_of(chain), old.shaft, fresh.bounds, fresh.motion)
    state.rod.state[:] = old.rod.state
    state.bounds.toe_state[:] = old.bounds.toe_state
    state.bounds.joint_bond[:3] = old.bounds.joint_bond[:3]
    below = [j for j, joint in enumerate(chain.joints) if joint.link >= chain.head]
    state.bounds.joint_force[below] = old.bounds.joint_force[below]
    state.motion.u[:] = u
    state.motion.rest[:] = u
    step_ground_back(chain, state)
    return state
