"""A cell formula means what the expression means, to a spreadsheet engine too."""

from __future__ import annotations

import random
import re
from fractions import Fraction

import ironcalc
import pytest
from flint import arb

from calcsheets.errors import DefinitionError
from calcsheets.expressions import (
    CONSTANTS,
    Condition,
    Constant,
    Expr,
    Function,
    Integral,
    Number,
    Power,
    Product,
    Sum,
    Symbol,
    integrals_in,
    number,
    replace_integrals,
    symbols,
    symbols_in,
)
from calcsheets.relations import EQUAL_WITHIN, load_library
from calcsheets.sheets.typesetting import plain_text
from calcsheets.sheets.workbook.formula import comparison, decision, formula, is_one_of, joined
from calcsheets.solving import evaluate, exact_ball, isolate, midpoint, working_precision
from calcsheets.solving.question import decide

a, b, c = symbols("p T rho")
CELLS = {a: "A1", b: "B1", c: "C1"}
ALLOWED = {"PI", "POWER", "SQRT", "EXP", "LN", "LOG10", "SIN", "COS", "TAN", "ASIN", "ACOS", "ATAN"}
LIBRARY = load_library()
INTEGRAL = 0.4375


def all_expressions() -> list[Expr]:
    """Both sides of every relation, every solved form, and both sides of every test."""
    found: list[Expr] = []
    for relation in LIBRARY.relations:
        found += [relation.published.left, relation.published.right]
        for unknown in relation.symbols:
            isolation = isolate(relation.published, unknown)
            found += [isolation.solved] if isolation else []
    for regime in LIBRARY.regimes:
        found += [side for c in regime.conditions for side in (c.left, c.right)]
    return found


def calculated(texts: list[str], numbers: dict[str, float]) -> list[object]:
    """What the spreadsheet engine makes of formulas in column D, with numbers in row 1."""
    model = ironcalc.create("test", "en", "UTC", "en")
    for reference, value in numbers.items():
        model.update_cell_with_number(0, 1, ironcalc.column_number_from_name(reference[:-1]), value)
    for row, text in enumerate(texts, start=2):
        model.set_user_input(0, row, 1, f"={text}")
    model.evaluate()
    return [model.get_cell_value(0, row, 1) for row in range(2, len(texts) + 2)]


def with_known_integrals(expr: Expr) -> Expr:
    """The expression with one number for every integral, as if it stood in a cell."""
    number = Number(Fraction(INTEGRAL))
    return replace_integrals(expr, dict.fromkeys(integrals_in(expr), number))


def _from_the_last_bit(expr: Expr, values: dict[Symbol, float]) -> float:
    """How far a value moves with the last bit of its operands: terms may nearly cancel.

    Each operation of the engine rounds once more, which the factor of the caller covers.
    """
    wide = {s: arb(value, abs(value) * 2.0**-53) for s, value in values.items()}
    try:
        return float(evaluate(expr, wide).rad())
    except ArithmeticError:
        return 0.0


def of_one(expr: Expr, values: tuple[float, ...] = (3.0, 2.0, 5.0)) -> object:
    return calculated([formula(expr, CELLS)], dict(zip(CELLS.values(), values, strict=True)))[0]


class TestAgainstASpreadsheetEngine:
    @pytest.mark.parametrize("seed", range(3))
    def test_every_expression_of_the_library_has_the_value_of_its_formula(self, seed):
        chance = random.Random(seed)
        expressions = all_expressions()
        quantities = sorted({s for e in expressions for s in _symbols(e)}, key=str)
        values = {symbol: _value(symbol, chance) for symbol in quantities}
        cells = {
            symbol: f"{ironcalc.column_name_from_number(i)}1"
            for i, symbol in enumerate(quantities, start=1)
        }
        found = calculated(
            [formula(with_known_integrals(expr), cells) for expr in expressions],
            {cells[symbol]: value for symbol, value in values.items()},
        )
        compared = 0
        with working_precision():
            balls = {symbol: exact_ball(Fraction(value)) for symbol, value in values.items()}
            for statement, engine in zip(expressions, found, strict=True):
                expr = with_known_integrals(statement)
                try:
                    ball = evaluate(expr, balls)
                except ArithmeticError:
                    continue
                exact = midpoint(ball)
                if not 1e-12 < abs(exact) < 1e12:
                    continue  # an exponential so large magnifies the rounding of its argument
                compared += 1
                allowed = 1e-13 * abs(exact) + 32 * _from_the_last_bit(expr, values)
                assert abs(engine - exact) <= allowed, plain_text(statement)
        assert compared > 0.9 * len(expressions)

    @pytest.mark.parametrize(
        ("expr", "value"),
        [
            ((a + b) * c, 25),
            (a - (b - c), 6),
            (Power(Power(a, b), number("2")), 81),
            (Power(a, Power(b, number("2"))), 81),
            (-(a + b), -5),
            (a / (b / c), 7.5),
            ((a / b) / c, 0.3),
            ((-a) ** 2, 9),
            (-(a**2), -9),
            (number("-2") ** 2, 4),
            (Sum((number("-2"), a)), 1),
            (Product((a, number("-2"))), -6),
            (a - (-b), 5),
            (a ** (-b), 1 / 9),
            (Number(Fraction(1, 3)) * a, 1),
            (1 + Number(Fraction(1, 3)) ** 2, 10 / 9),
        ],
    )
    def test_brackets_and_signs_survive(self, expr, value):
        assert of_one(expr) == pytest.approx(value, rel=1e-15)

    def test_the_functions_are_those_of_the_engine(self):
        for name, value in (("arcsin", 0.5), ("arccos", 0.5), ("arctan", 2.0), ("tan", 0.5)):
            there_and_back = Function(_INVERSE[name], Function(name, a))
            assert of_one(there_and_back, (value, 1.0, 1.0)) == pytest.approx(value, rel=1e-14)

    def test_the_logarithm_to_base_ten_is_that_of_the_engine(self):
        assert of_one(Function("lg", a), (1000.0, 1.0, 1.0)) == pytest.approx(3, rel=1e-15)
        assert formula(Function("lg", a / b), CELLS) == "LOG10((A1/B1))"

    def test_a_comparison_is_true_where_the_condition_holds(self):
        row = {"A1": 3.0, "B1": 2.0, "C1": 5.0}
        conditions = [a.at_most(3), a.below(3), (a + b).at_least(c), (a / b).above(c)]
        found = calculated([comparison(item, CELLS) for item in conditions], row)
        assert found == [True, False, True, False]


class TestText:
    @pytest.mark.parametrize(
        ("expr", "text"),
        [
            (a * b**2, "(A1*POWER(B1,2))"),
            (-a, "(0-A1)"),
            (1 + (a - 1) / 2 * b**2, "(1+(((A1-1)/2)*POWER(B1,2)))"),
            (number("0.62") * a, "(0.62*A1)"),
            (Number(Fraction(1, 3)), "(1/3)"),
            (number("0.00001"), "1E-05"),
            (number("-2"), "(0-2)"),
            (Constant("pi") / 4, "(PI()/4)"),
            (Constant("R_u"), "8.31446261815324"),
            (Constant("p_N"), "101325"),
        ],
    )
    def test_a_formula_is_written_in_full_brackets(self, expr, text):
        assert formula(expr, CELLS) == text

    def test_a_constant_may_stand_in_a_cell_of_its_own(self):
        assert formula(Constant("R_u") / a, CELLS, {"R_u": "Z9"}) == "(Z9/A1)"
        assert comparison(a.at_most(Constant("p_N")), CELLS, {"p_N": "Z8"}) == "A1<=Z8"

    def test_every_constant_is_written_as_its_nearest_double(self):
        for name, constant in CONSTANTS.items():
            if constant.value is not None:
                assert float(formula(Constant(name), {})) == float(constant.value)

    def test_only_functions_of_the_first_edition_of_the_standard_are_used(self):
        cells = {s: "A1" for e in all_expressions() for s in _symbols(e)}
        for expr in all_expressions():
            text = formula(with_known_integrals(expr), cells)
            assert set(re.findall(r"([A-Z][A-Z0-9]*)\(", text)) <= ALLOWED
            assert re.fullmatch(r"[A-Z0-9+\-*/(),.]+", text)
            assert not re.search(r"(^|[(,*/+-])-", text), "no sign stands before an operand"

    def test_a_symbol_without_a_cell_is_named(self):
        with pytest.raises(DefinitionError, match="symbol T: no cell holds its value"):
            formula(a + b, {a: "A1"})

    def test_an_integral_stands_in_a_cell_of_its_own(self):
        integral = Integral(c**2, c, a, b)
        assert formula(2 * integral, CELLS, integrals={integral: "Z9"}) == "(2*Z9)"
        with pytest.raises(DefinitionError, match="integral over rho: no cell holds its value"):
            formula(2 * integral, CELLS)


_INVERSE = {"arcsin": "sin", "arccos": "cos", "arctan": "tan", "tan": "arctan"}


def _symbols(expr: Expr) -> set[Symbol]:
    return set(symbols_in(expr))


def _value(symbol: Symbol, chance: random.Random) -> float:
    """A positive value well inside the bounds, so that no difference of neighbours is taken."""
    ranges = {"gamma": (1.2, 1.6), "n": (1.1, 1.5), "mu": (0.3, 1.2), "M": (1.1, 4.0),
              "beta_d": (0.3, 0.7), "eps": (0.8, 0.9)}  # fmt: skip
    low, high = ranges.get(symbol.quantity, (0.5, 9.0))
    return chance.uniform(low, high)


@pytest.mark.parametrize("compared", ["<", "<=", ">", ">="])
@pytest.mark.parametrize(
    "ratio", [0.5, 0.5 * (1 + 4e-13), 0.5 * (1 - 4e-13), 0.5 * (1 + 4e-12), 0.5 * (1 - 4e-12)]
)
def test_a_spreadsheet_decides_a_regime_as_the_solver_does(compared: str, ratio: float) -> None:
    """Sides that are equal but for the last digits of a cell count as equal."""
    condition = Condition(a, compared, number("0.5") * b)
    values = {a: exact_ball(Fraction(ratio)), b: exact_ball(Fraction(3))}
    with working_precision():
        values[a] *= 3
        expected = decide(condition, values)
    text = decision(condition, CELLS, float(EQUAL_WITHIN))
    (found,) = calculated([f'IF({text},"yes","no")'], {"A1": ratio * 3, "B1": 3.0})
    assert found == ("yes" if expected else "no")


def test_texts_are_compared_one_by_one() -> None:
    assert is_one_of("A1", ["choked"]) == 'A1="choked"'
    assert is_one_of("A1", ["a", "b"]) == 'OR(A1="a",A1="b")'
    assert joined("AND", ["x", "y"]) == "AND(x,y)"
    assert joined("AND", []) == ""
