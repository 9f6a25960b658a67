"""Random states inside the limits of a relation, for hiding one quantity and finding it again."""

from __future__ import annotations

import random
from collections.abc import Mapping
from fractions import Fraction

from calcsheets.expressions import Symbol
from calcsheets.relations import Limit, Relation, load_library
from calcsheets.solving import (
    Ball,
    compare,
    evaluate,
    exact_ball,
    isolate,
    midpoint,
    working_precision,
)
from calcsheets.solving.balls import OutsideDomainError
from tests.relations.meter_ranges import METER_RANGES

# Ranges in which quantities of the field lie, in coherent SI.
RANGES: Mapping[str, tuple[float, float]] = {
    "gamma": (1.05, 1.66), "M": (0.05, 5.0), "M_cr": (0.1, 2.2), "n": (1.05, 1.6),
    "C_d": (0.3, 1.0), "x": (0.05, 0.9), "w": (0.05, 0.9), "mu": (0.1, 1.5),
    "T": (120.0, 900.0), "p": (2e4, 3e6), "rho": (0.2, 40.0), "v": (0.03, 5.0),
    "u": (5.0, 900.0), "a": (150.0, 1200.0), "R": (150.0, 2000.0), "c_p": (500.0, 6000.0),
    "c_v": (300.0, 4000.0), "C_p": (20.0, 90.0), "M_w": (0.004, 0.1), "A": (1e-5, 0.5),
    "d": (0.002, 0.8), "V": (0.05, 50.0), "m": (0.1, 300.0), "t": (5.0, 4000.0),
    "mdot": (0.001, 20.0), "N": (1.0, 5000.0), "q": (-1e5, 2e5), "w_s": (-2e5, 2e5),
    "L": (1.0, 500.0), "x_d": (0.5, 100.0), "D_h": (0.01, 1.0), "P_w": (0.05, 4.0),
    "f_D": (0.008, 0.06), "K": (0.5, 20.0), "K_d": (0.1, 40.0), "L_eq": (0.5, 50.0),
    "Re": (200.0, 1e7), "k_rel": (2e-5, 0.04), "k": (1e-5, 3e-3),
    "f_lam": (0.03, 0.4), "f_CW": (0.009, 0.07), "f_sm": (0.008, 0.04), "f_r": (0.01, 0.07),
    "f_F": (0.002, 0.015), "phi_f": (0.001, 0.008), "D_o": (0.05, 1.0), "D_i": (0.02, 0.9),
    "F_i": (10.0, 1e5), "Qdot": (1e3, 1e6),
    "w_b": (-2e5, 2e5), "dh": (-2e5, 2e5), "de": (-2e5, 2e5), "ds": (-500.0, 500.0),
    "theta": (0.02, 1.0), "beta": (0.15, 1.5), "nu": (0.02, 1.8), "phi_fan": (0.1, 1.5),
    **METER_RANGES,
    "M_n1": (1.02, 4.0), "M_n2": (0.3, 0.98), "M_s": (1.02, 8.0), "M_r": (1.02, 3.0),
    "delta": (-0.5, 0.5), "alpha_i": (0.01, 0.4), "epsilon": (0.02, 0.4), "C_N": (0.01, 0.6),
    "C_A": (0.005, 0.1), "C_L": (0.01, 0.6), "C_D": (0.005, 0.2), "C_pr": (-0.5, 1.5),
    "tau": (0.02, 0.3), "k_s": (0.2, 1.5), "u_s": (10.0, 2000.0), "u_p": (10.0, 900.0),
    "q_dyn": (1e3, 1e5), "M_w4": (0.002, 0.05),
}  # fmt: skip
_TRIES = 20_000


def range_of(symbol: Symbol) -> tuple[float, float]:
    """The range of a quantity, by its symbol or the symbol that it is a kind of."""
    name = symbol.quantity
    while name not in RANGES and "_" in name:
        name = name.rpartition("_")[0]
    if name in RANGES:
        return RANGES[name]
    return (0.01, 100.0)


def regime_limits(relation: Relation) -> tuple[Limit, ...]:
    """What the regime of a relation asks of its own quantities, where it can be said in them."""
    found = []
    for regime in load_library().regimes:
        if not set(regime.offered_by) & set(relation.offered_by) or relation.regime_role:
            continue
        for _, outcomes in relation.uses:
            if not set(outcomes) <= set(regime.outcomes):
                continue
            for condition in regime.asks(outcomes):
                if set(condition.symbols) <= set(relation.symbols):
                    found.append(Limit(condition, " or ".join(outcomes), essential=True))
    return tuple(found)


def random_states(relation: Relation, count: int, seed: int) -> list[dict[Symbol, Ball]]:
    """States that satisfy a relation, its limits and the bounds of its quantities.

    One quantity that moves isolate is computed from the others, which are drawn; the rest of
    the state is exact.
    """
    chance = random.Random(f"{relation.name} {seed}")
    dependent = next(s for s in relation.symbols if isolate(relation.published, s) is not None)
    isolation = isolate(relation.published, dependent)
    assert isolation is not None
    found: list[dict[Symbol, Ball]] = []
    with working_precision():
        for _ in range(_TRIES):
            state = {s: _drawn(s, chance) for s in relation.symbols if s != dependent}
            try:
                state[dependent] = evaluate(isolation.solved, state)
                if _possible(relation, dependent, state):
                    found.append(state)
            except OutsideDomainError:
                continue
            if len(found) == count:
                break
    return found


def _drawn(symbol: Symbol, chance: random.Random) -> Ball:
    low, high = range_of(symbol)
    value = low * (high / low) ** chance.random() if low > 0 else chance.uniform(low, high)
    return exact_ball(Fraction(f"{value:.6g}"))


def _possible(relation: Relation, dependent: Symbol, state: Mapping[Symbol, Ball]) -> bool:
    value = state[dependent]
    bounds = dependent.definition
    if not value.is_finite() or not float(bounds.low) < midpoint(value) < float(bounds.high):
        return False
    # A value far outside the field shows nothing but rounding.
    if not 1e-9 < abs(midpoint(value)) < 1e9:
        return False
    conditions = [limit.condition for limit in (*regime_limits(relation), *relation.limits)]
    known = [c for c in conditions if set(c.symbols) <= set(state)]
    return all(compare(condition, state) is True for condition in known)
