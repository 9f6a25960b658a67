"""Regimes and their tests in words."""

from __future__ import annotations

from collections.abc import Sequence

from ...record import RegimeTest, RegimeUse
from .plain import plain_text


def test_text(test: RegimeTest) -> str:
    """Return a regime test as lines of text, in the order in which it is tested."""
    cases = [f"{case.outcome} if {plain_text(case.condition)}" for case in test.cases]
    return "\n".join((*cases, f"{test.otherwise} if not"))


def regime_words(uses: Sequence[RegimeUse]) -> str:
    """Return the regimes in which something holds: ``choked and shock inside or at the exit``."""
    return " and ".join(" or ".join(use.outcomes) for use in uses)
