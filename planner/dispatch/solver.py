"""HiGHS, run with care: what it says is read from itself, and nothing it leaves out is assumed."""

from dataclasses import dataclass

import highspy
import numpy as np

from planner.arrays import FloatArray
from planner.dispatch.hush import hush_banner
from planner.errors import SolveError

#: HiGHS counts bounds beyond this as infinite.
INFINITY = highspy.kHighsInf

#: A linear programme has no schedule to give before it ends, so its limit only catches a hang.
LINEAR_LIMIT_S = 900.0


class InfeasibleError(SolveError):
    """No values of the columns keep all rows."""


@dataclass(frozen=True)
class Answer:
    """What HiGHS found.

    Parameters
    ----------
    column_values : array, shape (columns,)
        Best solution; empty where time ended before there was one.
    objective : float [currency]
        Its cost, offset included; infinite where there is none.
    bound : float [currency]
        Proven lower bound on the cost.
    row_duals : array, shape (rows,)
        Marginal cost of each row's right-hand side; all zero where integers were decided.
    """

    column_values: FloatArray
    objective: float
    bound: float
    row_duals: FloatArray

    @property
    def found(self) -> bool:
        """Whether there is a solution."""
        return self.column_values.size > 0


#: What there is before anything was found.
NO_ANSWER = Answer(np.zeros(0), INFINITY, -INFINITY, np.zeros(0))


def run_whole(
    model: highspy.HighsLp, *, gap_frac: float, time_limit_s: float, first: Answer
) -> Answer:
    """Solve with whole numbers.

    Parameters
    ----------
    model : HighsLp
        In HiGHS's own form.
    gap_frac : float [-]
        Relative gap at which a solution is good enough.
    time_limit_s : float [s]
        After this the best solution so far is taken.
    first : Answer
        A solution to begin with, if one is known.

    Returns
    -------
    Answer
        Best solution, if there was time for one, and HiGHS's own dual bound.

    Raises
    ------
    InfeasibleError
        If there is no solution.
    SolveError
        If HiGHS fails.
    """
    solver = _quiet_solver(gap_frac, time_limit_s)
    _run(solver, model, first)
    return _whole_answer(solver)


def run_linear(model: highspy.HighsLp) -> Answer:
    """Solve a linear programme.

    Parameters
    ----------
    model : HighsLp
        In HiGHS's own form.

    Returns
    -------
    Answer
        The optimum, with duals.

    Raises
    ------
    InfeasibleError
        If there is no solution.
    SolveError
        If HiGHS fails.
    """
    solver = _quiet_solver(0.0, LINEAR_LIMIT_S)
    _run(solver, model, NO_ANSWER)
    return _linear_answer(solver)


def _quiet_solver(gap_frac: float, time_limit_s: float) -> highspy.Highs:
    """HiGHS with the settings under which the same input gives the same answer."""
    hush_banner()
    solver = highspy.Highs()
    for name, value in (
        ("output_flag", False),
        ("threads", 1),
        ("random_seed", 0),
        ("mip_rel_gap", gap_frac),
        ("time_limit", time_limit_s),
    ):
        solver.setOptionValue(name, value)
    return solver


def _run(solver: highspy.Highs, model: highspy.HighsLp, first: Answer) -> None:
    """Load and run, or say that HiGHS failed."""
    if solver.passModel(model) == highspy.HighsStatus.kError:
        raise SolveError("HiGHS refused the model")
    if first.found:
        begun = highspy.HighsSolution()
        begun.col_value = first.column_values
        solver.setSolution(begun)
    if solver.run() == highspy.HighsStatus.kError:
        # Where something else in this process used another number of threads, HiGHS does not start
        # until its scheduler is made anew.
        highspy.Highs.resetGlobalScheduler(True)
        if solver.run() == highspy.HighsStatus.kError:
            raise SolveError("HiGHS failed while solving")


def _linear_answer(solver: highspy.Highs) -> Answer:
    """The optimum of a linear programme; anything less is an error."""
    _refuse_status(solver, {highspy.HighsModelStatus.kOptimal})
    solution = solver.getSolution()
    objective = float(solver.getInfo().objective_function_value)
    return Answer(
        column_values=np.asarray(solution.col_value),
        objective=objective,
        bound=objective,
        row_duals=np.asarray(solution.row_dual),
    )


def _whole_answer(solver: highspy.Highs) -> Answer:
    """Best solution and HiGHS's own bound, whatever it calls its end."""
    _refuse_status(
        solver,
        {
            highspy.HighsModelStatus.kOptimal,
            highspy.HighsModelStatus.kTimeLimit,
            highspy.HighsModelStatus.kSolutionLimit,
        },
    )
    info = solver.getInfo()
    feasible = info.primal_solution_status == highspy.kSolutionStatusFeasible
    values = np.asarray(solver.getSolution().col_value) if feasible else np.zeros(0)
    return Answer(
        column_values=values,
        objective=float(info.objective_function_value) if feasible else INFINITY,
        bound=float(info.mip_dual_bound),
        row_duals=np.zeros(0),
    )


def _refuse_status(solver: highspy.Highs, usable: set[highspy.HighsModelStatus]) -> None:
    """Raise unless HiGHS ended in a way that can be used."""
    status = solver.getModelStatus()
    if status in usable:
        return
    said = solver.modelStatusToString(status)
    impossible = {
        highspy.HighsModelStatus.kInfeasible,
        highspy.HighsModelStatus.kUnboundedOrInfeasible,
    }
    if status in impossible:
        raise InfeasibleError(f"HiGHS ended with «{said}»")
    raise SolveError(f"HiGHS ended with «{said}»")
