"""Every relation solved for each of its quantities, against plain computer algebra.

For every relation, states are drawn inside its limits; each quantity of the relation is hidden
in turn, solved for, and compared with the value that was hidden. The baseline gives the same
equations with the same numbers to ``sympy.solve`` in a child process with a time limit.

    python tests/benchmarks/any_variable.py [--states 25] [--relations WORD] [--no-baseline]

The last line is one JSON object.
"""

from __future__ import annotations

import argparse
import json
import multiprocessing
import sys
import time
from collections.abc import Mapping
from dataclasses import dataclass
from multiprocessing.connection import Connection
from pathlib import Path
from typing import Any

sys.path.insert(0, str(Path(__file__).resolve().parents[2]))

from flint import arb

from calcsheets.errors import CalcsheetsError, SeveralRoots
from calcsheets.expressions import CONSTANTS, Symbol
from calcsheets.relations import Relation, load_library
from calcsheets.solving import Ball, Question, compare, midpoint, size_of, solve, working_precision
from tests.relations.states import random_states, regime_limits

STATES = 25
SEED = 7
BASELINE_LIMIT = 10.0
TOLERANCE = 1e-12


@dataclass(frozen=True)
class Outcome:
    """What one pair of relation and quantity came to.

    Attributes:
        closed: whether every state was solved in closed form.
        asked: in how many states the program asked which of several roots is meant.
        failed: what went wrong, empty for nothing.
        residual: largest relative residual of the published form.
        error: largest relative difference from the hidden value.
    """

    closed: bool
    asked: int
    failed: str
    residual: float
    error: float


def main() -> int:
    """Run the benchmark; exit code 1 if a pair failed."""
    arguments = _arguments()
    relations = [
        relation
        for relation in load_library().relations
        if arguments.relations in relation.name or arguments.relations == relation.chapter
    ]
    count = arguments.states
    states = {relation.name: random_states(relation, count, SEED) for relation in relations}
    pairs = [(relation, symbol) for relation in relations for symbol in relation.symbols]
    outcomes: list[Outcome] = []
    start = time.perf_counter()
    for relation, symbol in pairs:
        outcome = solved_pair(relation, symbol, states[relation.name], count)
        outcomes.append(outcome)
        if outcome.failed:
            print(f"FAILED {relation.name} for {symbol}: {outcome.failed}")
    seconds = time.perf_counter() - start
    baseline = (0, 0.0) if arguments.no_baseline else run_baseline(pairs, states)
    print(
        json.dumps(
            {
                "relations": len(relations),
                "pairs": len(pairs),
                "closed_form": sum(outcome.closed for outcome in outcomes),
                "root": sum(not outcome.closed and not outcome.failed for outcome in outcomes),
                "asked": sum(bool(outcome.asked) for outcome in outcomes),
                "failed": sum(bool(outcome.failed) for outcome in outcomes),
                "worst_residual": max((o.residual for o in outcomes), default=0.0),
                "worst_error": max((o.error for o in outcomes), default=0.0),
                "seconds": round(seconds, 3),
                "baseline_solved": baseline[0],
                "baseline_seconds": round(baseline[1], 3),
            }
        )
    )
    return int(any(outcome.failed for outcome in outcomes))


def _arguments() -> argparse.Namespace:
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--states", type=int, default=STATES, help="states of each relation")
    parser.add_argument("--relations", default="", help="only those with this word, or chapter")
    parser.add_argument("--no-baseline", action="store_true", help="leave the baseline out")
    return parser.parse_args()


def solved_pair(
    relation: Relation, unknown: Symbol, states: list[dict[Symbol, Ball]], wanted: int
) -> Outcome:
    """Hide one quantity in every state of a relation and solve for it."""
    closed, asked, residual, error = True, 0, 0.0, 0.0
    if len(states) < wanted:
        return Outcome(False, 0, f"only {len(states)} states inside the limits", 0.0, 0.0)
    with working_precision():
        for state in states:
            hidden = state[unknown]
            try:
                solution = solve(_question(relation, unknown, state))
            except SeveralRoots as question:
                if not _is_among(hidden, question.roots):
                    return Outcome(closed, asked, str(question), residual, error)
                asked += 1
                closed = False
                continue
            except CalcsheetsError as problem:
                failure = f"{type(problem).__name__}: {problem}"
                return Outcome(closed, asked, failure, residual, error)
            closed = closed and solution.method != "root"
            scale = size_of(relation, {**state, unknown: solution.value})
            residual = max(residual, float((abs(solution.residual) / scale).upper()))
            apart = _apart(solution.value, hidden)
            error = max(error, apart)
            if apart > TOLERANCE:
                failure = f"{midpoint(solution.value)!r} instead of {midpoint(hidden)!r}"
                return Outcome(closed, asked, failure, residual, error)
    return Outcome(closed, asked, "", residual, error)


def _is_among(hidden: Ball, roots: tuple[str, ...]) -> bool:
    """Whether the hidden value is one of the roots that a question names.

    The question is then justified: what is given leaves all of them open.
    """
    return len(roots) > 1 and any(
        abs(float(root) - midpoint(hidden)) <= 1e-6 * abs(midpoint(hidden)) for root in roots
    )


def _apart(found: Ball, hidden: Ball) -> float:
    """Relative distance of the middles, of the absolute where the hidden value is zero."""
    scale = abs(arb(hidden.mid()))
    difference = abs(arb(found.mid()) - arb(hidden.mid()))
    return float(difference / scale) if scale > 0 else float(difference)


def _question(relation: Relation, unknown: Symbol, state: Mapping[Symbol, Ball]) -> Question:
    """What a brief would ask: the branch of the state is stated where roots are parted."""
    branch = next(
        (b.name for b in relation.branches if compare(b.condition, state) is not False), ""
    )
    known = {symbol: ball for symbol, ball in state.items() if symbol != unknown}
    tests = regime_limits(relation)
    return Question(relation, unknown, known, branch, str(unknown), "the station", tests)


def run_baseline(
    pairs: list[tuple[Relation, Symbol]], states: Mapping[str, list[dict[Symbol, Ball]]]
) -> tuple[int, float]:
    """Give one state of each pair to plain ``sympy.solve``; count what it finds, and its time."""
    solved, seconds = 0, 0.0
    worker = _Worker()
    for relation, unknown in pairs:
        if not states[relation.name]:
            continue
        numbers = {str(s): midpoint(ball) for s, ball in states[relation.name][0].items()}
        numbers |= {c.name: float(c.value) for c in CONSTANTS.values() if c.value is not None}
        start = time.perf_counter()
        roots = worker.ask(relation, str(unknown), numbers)
        seconds += time.perf_counter() - start
        hidden = numbers[str(unknown)]
        solved += any(abs(root - hidden) <= 1e-6 * abs(hidden) for root in roots)
    worker.stop()
    return solved, seconds


class _Worker:
    """A child process that solves one equation after the other; replaced if it takes too long."""

    def __init__(self) -> None:
        self._process: Any = None
        self._line: Connection | None = None

    def ask(self, relation: Relation, unknown: str, numbers: Mapping[str, float]) -> list[float]:
        """Return the real roots that were found in time."""
        if self._line is None:
            self._start()
        line = self._line
        if line is None:
            return []
        line.send((relation.equation, unknown, dict(numbers)))
        if not line.poll(BASELINE_LIMIT):
            self.stop()
            return []
        answer: list[float] = line.recv()
        return answer

    def stop(self) -> None:
        """End the child process."""
        if self._process is not None:
            self._process.kill()
            self._process.join()
        self._process, self._line = None, None

    def _start(self) -> None:
        context = multiprocessing.get_context("spawn")
        self._line, other = context.Pipe()
        self._process = context.Process(target=_serve, args=(other,), daemon=True)
        self._process.start()
        self._line.send(None)
        self._line.recv()  # the start of a process is no part of the baseline's time


def _serve(line: Connection) -> None:
    import sympy

    while True:
        task = line.recv()
        if task is None:
            line.send([])
            continue
        equation, unknown, numbers = task
        symbol = next(s for s in equation.free_symbols if s.name == unknown)
        others = {s: numbers[s.name] for s in equation.free_symbols if s.name != unknown}
        try:
            roots = sympy.solve(equation.subs(others), symbol)
            line.send([float(root) for root in roots if abs(sympy.im(root)) < 1e-12])
        except Exception:
            line.send([])


if __name__ == "__main__":
    sys.exit(main())
