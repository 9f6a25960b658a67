"""A move is made only where it loses no root."""

from __future__ import annotations

from fractions import Fraction

import pytest

from calcsheets.expressions import Equation, Expr, Function, Number, Root, symbols
from calcsheets.solving import isolate
from calcsheets.solving.principal import has_one_inverse, never_negative

beta, theta, nu, M, u, dp, p, mu = symbols("beta theta nu M u dp p mu")
HALF = Number(Fraction(1, 2))


@pytest.mark.parametrize(
    ("function", "argument", "single"),
    [
        ("sin", beta, True),
        ("sin", 2 * beta, False),  # from 0 to half a turn: two angles have one sine
        ("cos", 2 * beta, True),
        ("cos", beta - theta, False),  # of either sign: two differences have one cosine
        ("sin", beta - theta, True),
        ("tan", beta - theta, True),
        ("tan", 2 * beta, False),
        ("tan", -beta / 2, True),
        ("sin", nu, False),  # up to several turns
        ("sin", beta * theta, False),  # not known to be less than a quarter of a turn
        ("exp", nu, True),
        ("arctan", M, True),
    ],
)
def test_an_inverse_is_single_only_where_the_bounds_leave_one_angle(
    function: str, argument: Expr, single: bool
) -> None:
    assert has_one_inverse(function, argument) is single


@pytest.mark.parametrize(
    ("expr", "known"),
    [
        (M, True),
        (dp, False),
        (Function("sin", beta), True),
        (Function("sin", 2 * beta), True),
        (Function("cos", 2 * beta), False),
        (Function("tan", beta), True),
        (Function("ln", M), False),
        (M * Function("sin", beta) / u, True),
        (M - u, False),
        (M + u, True),
        (Root(dp), True),
        (p**2, True),
        (Number(Fraction(-2)), False),
    ],
)
def test_an_even_power_is_undone_only_where_its_base_is_not_negative(
    expr: Expr, known: bool
) -> None:
    assert never_negative(expr) is known


def test_an_arcsine_that_would_lose_a_root_is_no_move() -> None:
    two_angles = Equation(Function("sin", 2 * beta), M)
    assert isolate(two_angles, beta) is None
    one_angle = isolate(Equation(Function("sin", beta), M), beta)
    assert one_angle is not None
    assert [move.action for move in one_angle.moves] == ["apply"]


def test_the_square_of_a_sine_is_undone() -> None:
    isolation = isolate(Equation(Function("sin", beta) ** 2, M), beta)
    assert isolation is not None
    assert [move.action for move in isolation.moves] == ["take the positive square root", "apply"]
