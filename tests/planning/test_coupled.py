"""Which closed sets are offered, in which order."""

from __future__ import annotations

from itertools import pairwise
from pathlib import Path

import pytest

import calcsheets
from calcsheets.planning import Field, Loop, Problem, reach, state_problem
from calcsheets.planning.coupled import MOST_RELATIONS
from calcsheets.quantities import Kind, Variable, catalogue
from calcsheets.relations import load_library
from tests.solving.test_coupled import _HEAD, _STREAM, FLOW_AND_STATIC_TEMPERATURE

MACH = Variable("M", "pipe")


@pytest.fixture
def problem(tmp_path: Path) -> Problem:
    path = tmp_path / "brief.toml"
    text = _STREAM.format(branch="", given=FLOW_AND_STATIC_TEMPERATURE, wanted='"M@pipe" = {}')
    path.write_text(_HEAD + text)
    return state_problem(calcsheets.read_brief(path), load_library())


def offered(problem: Problem) -> list[Loop]:
    return list(Field.of(problem, {}, frozenset(), reach(problem, {})).loops([MACH]))


def test_smaller_sets_come_first_and_none_is_larger_than_anyone_would_follow(
    problem: Problem,
) -> None:
    sizes = [loop.size for loop in offered(problem)]
    assert sizes[0] == 2
    assert all(a <= b for a, b in pairwise(sizes))
    assert sizes[-1] <= MOST_RELATIONS


def test_every_set_is_closed(problem: Problem) -> None:
    """Its relations hold as many unknowns as relations, each derived after what it needs."""
    known = reach(problem, {})
    for loop in offered(problem):
        done = {loop.torn}
        for edge in loop.derivation:
            assert all(item in known or item in done for item in edge.inputs)
            done.add(edge.target)
        assert all(item in known or item in done for item in loop.closing.binding.values())
        assert len(done) == loop.size
        assert loop.closing.key not in {edge.source.key for edge in loop.derivation}


def test_a_gauge_pressure_is_never_torn(problem: Problem) -> None:
    kinds = {catalogue()[loop.torn.symbol].kind for loop in offered(problem)}
    assert not kinds & {Kind.GAUGE, Kind.REFERENCE_VOLUME}


def test_the_same_problem_offers_the_same_sets_in_the_same_order(problem: Problem) -> None:
    names = [[(loop.torn, loop.closing.key) for loop in offered(problem)] for _ in range(2)]
    assert names[0] == names[1]
