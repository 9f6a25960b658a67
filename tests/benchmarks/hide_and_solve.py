"""Random states of random paths: a sufficient part is given, everything else is asked.

The states, and the decision what suffices, come from plain formulas that share nothing with the
program. A question in place of an answer counts as justified only if another state is found,
by those formulas, that the given quantities fit as well.

    python tests/benchmarks/hide_and_solve.py [--problems 1000] [--seed 1] [--keep FOLDER]

The last line is one JSON object.
"""

from __future__ import annotations

import argparse
import collections
import json
import random
import statistics
import sys
import time
from dataclasses import dataclass
from pathlib import Path as File

sys.path.insert(0, str(File(__file__).resolve().parents[2]))

import numpy as np
from scipy.optimize import least_squares

import calcsheets
from calcsheets.errors import AmbiguousRegime, CalcsheetsError, SeveralRoots
from tests.benchmarks.random_paths import (
    Path,
    magnification,
    random_path,
    sufficient_subset,
    unit_of,
)

PROBLEMS = 1000
_EXACT = 1e-9
_ATTEMPTS = 400
_WIDTHS = (0.3, 0.7, 1.5, 2.5)
_DIGITS_OF_INPUT = 1e-13


@dataclass(frozen=True)
class Hidden:
    """One problem: a path, what is given, and the branch stated at each station."""

    path: Path
    given: tuple[str, ...]
    branches: dict[str, str]

    @property
    def asked(self) -> list[str]:
        """Keys of everything that is not given."""
        return sorted(set(self.path.state) - set(self.given))

    def brief(self) -> str:
        """Return the problem as a brief."""
        state, path = self.path.state, self.path
        lines = [_HEAD]
        inputs: dict[str, list[str]] = collections.defaultdict(list)
        for key in self.given:
            symbol, _, place = key.partition("@")
            value = f"{state[key]!r} {unit_of(key)}".strip()
            inputs[place].append(f'{symbol} = "{value}"')
        lines += ["[gas]", *inputs["gas"]]
        for name, kind in path.kinds.items():
            branch = self.branches.get(name)
            stated = [f'branch = "{branch}"'] if branch else []
            lines += [f"[stations.{name}]", f'kind = "{kind}"', *stated, *inputs[name]]
        for leg in path.legs:
            lines += ["[[path]]", f'name = "{leg.name}"', f'from = "{leg.start}"']
            lines += [f'to = "{leg.end}"', f'process = "{leg.process}"']
            lines += [f'through = "{leg.through}"'] if leg.through else []
            lines += inputs[leg.name]
        lines.append("[wanted]")
        for key in self.asked:
            unit = unit_of(key)
            lines.append(f'"{key}" = {{ unit = "{unit}" }}' if unit else f'"{key}" = {{}}')
        return "\n".join(lines) + "\n"


_HEAD = """
[calculation]
number = "H-1"
title = "Hidden state"
purpose = "benchmark"
revision = "A"
date = "2026-01-01"
originator = "N. N."
[site]
p_atm = "1 bar"
""".strip()


def main() -> int:
    """Run the benchmark; exit code 1 if an answer is wrong or missing."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--problems", type=int, default=PROBLEMS, help="how many")
    parser.add_argument("--seed", type=int, default=1, help="of the random problems")
    parser.add_argument("--keep", default="", help="folder for briefs that went wrong")
    arguments = parser.parse_args()
    chance = random.Random(arguments.seed)
    counts: collections.Counter[str] = collections.Counter()
    seconds: list[float] = []
    calcsheets.calculate(calcsheets.parse_brief(_hidden(chance).brief(), "warm.toml"))
    for number in range(arguments.problems):
        problem = _hidden(chance)
        brief = calcsheets.parse_brief(problem.brief(), "hidden.toml")
        start = time.perf_counter()
        verdict = judged(problem, brief)
        seconds.append(time.perf_counter() - start)
        counts[verdict.partition(":")[0]] += 1
        if verdict not in ("solved", "asked"):
            print(number, [leg.process for leg in problem.path.legs], problem.given, verdict[:300])
            if arguments.keep:
                (File(arguments.keep) / f"{number}.toml").write_text(problem.brief())
    wrong = arguments.problems - counts["solved"] - counts["asked"]
    result = {
        "problems": arguments.problems,
        "solved": counts["solved"],
        "asked": counts["asked"],
        "wrong": wrong,
        "seconds_median": round(statistics.median(seconds), 4),
        "seconds_p95": round(statistics.quantiles(seconds, n=20)[-1], 4),
    }
    print(dict(sorted(counts.items())))
    print(json.dumps(result))
    return int(wrong > 0)


def _hidden(chance: random.Random) -> Hidden:
    """A random problem that its given quantities determine well."""
    while True:
        path = random_path(chance)
        given = sufficient_subset(path, chance)
        if given is None:
            continue
        state = path.state
        stated = {
            name: "subsonic" if state[f"M@{name}"] < 1 else "supersonic"
            for name in path.kinds
            if f"M@{name}" in state and chance.random() < 0.7
        }
        return Hidden(path, tuple(given), stated)


def judged(problem: Hidden, brief: calcsheets.Brief) -> str:
    """Return ``solved``, ``asked``, or what is wrong."""
    try:
        record = calcsheets.calculate(brief)
    except (SeveralRoots, AmbiguousRegime) as question:
        return "asked" if another_state(problem) else f"unjustified question: {question}"
    except CalcsheetsError as refusal:
        return f"{type(refusal).__name__}: {refusal}"
    state = problem.path.state
    allowed = magnification(problem.path, list(problem.given))
    for result in record.results:
        hidden = state[result.key]
        found = float("nan") if result.value is None else result.value
        apart = abs(found - hidden) / abs(hidden)
        if not apart <= _EXACT + _DIGITS_OF_INPUT * allowed[result.key]:
            return f"another value: {result.key} is {found!r} instead of {hidden!r}"
    return "solved"


def another_state(problem: Hidden) -> bool:
    """Whether another state fits the given quantities and the branches stated."""
    path, target = problem.path, problem.path.state
    aims = np.array([np.log(abs(target[key])) for key in problem.given])
    start = np.log(np.array(path.free))

    def apart(logarithms: np.ndarray) -> np.ndarray:
        try:
            state = path.state_of(tuple(np.exp(logarithms)))
            found = np.array([np.log(abs(state[key])) for key in problem.given]) - aims
        except (ValueError, OverflowError, ZeroDivisionError):
            return np.full(len(aims), 1e3)
        return np.where(np.isfinite(found), found, 1e3)

    chance = random.Random(5)
    for attempt in range(_ATTEMPTS):
        width = _WIDTHS[attempt % len(_WIDTHS)]
        few = 1 + attempt % len(start)  # a second state often differs in little
        kept = set(chance.sample(range(len(start)), len(start) - few))
        steps = [0.0 if i in kept else chance.gauss(0, width) for i in range(len(start))]
        moved = start + np.array(steps)
        fit = least_squares(apart, moved, xtol=1e-15, ftol=1e-15, gtol=1e-15)
        if np.abs(fit.fun).max() < 1e-9 and np.abs(fit.x - start).max() > 1e-4:
            state = path.state_of(tuple(np.exp(fit.x)))
            if _on_branches(problem, state):
                return True
    return False


def _on_branches(problem: Hidden, state: dict[str, float]) -> bool:
    return all(
        (state[f"M@{name}"] < 1) == (branch == "subsonic")
        for name, branch in problem.branches.items()
    )


if __name__ == "__main__":
    sys.exit(main())
