"""Equations, numbers and moves look on paper as an engineer writes them."""

from __future__ import annotations

import math
import re
from collections.abc import Mapping
from fractions import Fraction
from xml.etree import ElementTree as ET

import pytest
import ziamath
from hypothesis import assume, given, settings
from hypothesis import strategies as st
from ziamath.config import config

from calcsheets.errors import DefinitionError
from calcsheets.expressions import (
    Equation,
    Expr,
    Function,
    Integral,
    Negative,
    Number,
    Power,
    Product,
    Quotient,
    Root,
    Sum,
    Symbol,
    number,
    symbols,
)
from calcsheets.quantities import all_units, catalogue
from calcsheets.relations import load_library
from calcsheets.relations.roles import DISCHARGE, INLET, SUPPLY, THROUGH
from calcsheets.sheets.typesetting import (
    draw,
    latex_text,
    move_words,
    plain_text,
    presentation_mathml,
    significant,
    substituted_mathml,
    symbol_text,
    typed,
    unit_text,
)
from calcsheets.solving import ACTIONS, isolate
from tests.sheets.reading_back import value_of_mathml, value_of_text

RELATIONS = {relation.name: relation for relation in load_library().relations}
STATEMENTS = [
    *(relation.published for relation in RELATIONS.values()),
    *(limit.condition for relation in RELATIONS.values() for limit in relation.limits),
    *(condition for regime in load_library().regimes for condition in regime.conditions),
]
a, b, c = symbols("p T rho")
VALUES = {a: 1.3, b: 0.7, c: 2.1}
NAMES = {"p": 1.3, "T": 0.7, "ρ": 2.1}


class TestNumbers:
    @pytest.mark.parametrize(
        ("value", "digits", "text"),
        [
            (0.0, 4, "0"),
            (-0.0, 4, "0"),
            (1.0, 4, "1.000"),
            (-2.5, 4, "−2.500"),
            (9.9999, 4, "10.00"),
            (99999.96, 6, "100 000"),
            (999999.96, 7, "1.000 000 × 10⁶"),
            (0.001, 3, "0.001 00"),
            (0.00099999, 3, "0.001 00"),
            (0.0009994, 3, "9.99 × 10⁻⁴"),
            (1298200.0, 5, "1.2982 × 10⁶"),
            (123456.0, 4, "1.235 × 10⁵"),
            (1234.0, 4, "1234"),
            (12345.0, 5, "12 345"),
            (12345.678, 8, "12 345.678"),
            (287.05, 5, "287.05"),
            (0.5, 1, "0.5"),
            (1e-300, 2, "1.0 × 10⁻³⁰⁰"),
            (1.7e308, 2, "1.7 × 10³⁰⁸"),
            ("8.31446261815324", 15, "8.314 462 618 153 24"),
        ],
    )
    def test_a_number_keeps_its_significant_digits(self, value, digits, text):
        assert significant(value, digits).text == text.replace(" × ", "~").replace(
            " ", "\u202f"
        ).replace("~", " × ")

    def test_rounding_is_half_even_on_the_exact_decimal_of_the_double(self):
        assert significant(0.125, 2).text == "0.12"
        assert significant(0.375, 2).text == "0.38"
        assert significant(2.675, 3).text == "2.67", "the double lies below 2.675"
        assert significant("2.675", 3).text == "2.68", "the decimal lies half way"

    @given(st.floats(allow_nan=False, allow_infinity=False), st.integers(1, 17))
    def test_a_printed_number_reads_back_within_half_a_unit_of_its_last_digit(self, value, digits):
        printed = significant(value, digits)
        mantissa = Fraction(printed.mantissa.replace("−", "-").replace("\u202f", ""))
        back = mantissa * Fraction(10) ** (printed.exponent or 0)
        assert abs(back - Fraction(value)) <= abs(Fraction(value)) * Fraction(5, 10**digits)

    @given(st.floats(1e-12, 1e12), st.integers(1, 12))
    def test_no_digit_is_printed_that_is_not_significant(self, value, digits):
        shown = re.sub(r"[^0-9]", "", significant(value, digits).mantissa).lstrip("0")
        assert len(shown) == digits

    @pytest.mark.parametrize("bad", [math.nan, math.inf, "12 bar"])
    def test_what_is_not_a_finite_number_is_refused(self, bad):
        with pytest.raises(DefinitionError, match=r"number .*(finite|not a decimal)"):
            significant(bad, 4)

    def test_asking_for_no_digits_is_refused(self):
        with pytest.raises(DefinitionError, match="0 significant digits were asked for"):
            significant(1.0, 0)

    def test_a_typed_number_keeps_the_digits_of_its_author(self):
        assert typed("12.0").text == "12.0"
        assert typed("-1.50e-3").text == "−1.50 × 10⁻³"
        with pytest.raises(DefinitionError, match='number "1,5": it is not a decimal number'):
            typed("1,5")


class TestUnits:
    @pytest.mark.parametrize(
        ("name", "text"),
        [
            ("kg/(m2*s)", "kg/(m²·s)"),
            ("m3/h", "m³/h"),
            ("J/(kg*K)", "J/(kg·K)"),
            ("1", ""),
            ("°C", "°C"),
            ("mmH2O(g)", "mmH₂O(g)"),
            ("Nm3/h", "Nm³/h"),
            ("m3/h(ANR)", "m³/h(ANR)"),
            ("bar(a)", "bar(a)"),
        ],
    )
    def test_a_unit_is_printed_with_true_exponents(self, name, text):
        assert unit_text(name) == text

    def test_no_two_units_are_printed_alike(self):
        printed = [unit_text(unit.name) for unit in all_units()]
        assert len(set(printed)) == len(printed)
        assert not any(re.search(r"[0-9*]", text) for text in printed)

    def test_a_number_stands_apart_from_its_unit_but_not_from_a_degree_sign(self):
        assert significant(12.5, 3).with_unit("bar(g)") == "12.5\u00a0bar(g)"
        assert significant(12.5, 3).with_unit("°") == "12.5°"
        assert significant(12.5, 3).with_unit("1") == "12.5"


class TestPlainText:
    @pytest.mark.parametrize(
        ("name", "text"),
        [
            ("stagnation_pressure", "p₀/p = (1 + ((γ − 1)/2)·M²)^(γ/(γ − 1))"),
            ("speed_of_sound", "a = √(γ·R·T)"),
            ("enthalpy_change", "Δh = c_p·(T₂ − T₁)"),
            ("first_law_steady", "q − w_s = Δh + (u₂² − u₁²)/2"),
            ("shock_pressure", "p₂/p₁ = (2·γ·M₁² − (γ − 1))/(γ + 1)"),
            ("shock_entropy", "Δs = −R·ln(p_0,2/p_0,1)"),
            ("velocity_ratio", "M*² = (γ + 1)·M²/(2 + (γ − 1)·M²)"),
            ("mach_angle", "sin(μ) = 1/M"),
            ("circular_area", "A = (π/4)·d²"),
            ("molar_flow", "ṁ = ṅ·M_w"),
            ("specific_gas_constant", "R = R_u/M_w"),
            (
                "choked_mass_flow",
                "ṁ = C_d·A·p_0,1·√(γ/(R·T_0,1))·(2/(γ + 1))^((γ + 1)/(2·(γ − 1)))",
            ),
        ],
    )
    def test_a_relation_reads_as_a_handbook_prints_it(self, name, text):
        assert plain_text(RELATIONS[name].published) == text

    def test_a_limit_is_printed_with_its_comparison(self):
        assert plain_text((a / b).at_most(1)) == "p/T ≤ 1"
        assert plain_text(a.at_least(b)) == "p ≥ T"
        assert plain_text(a.below(b)) == "p < T"
        assert plain_text(a.above(b)) == "p > T"

    @pytest.mark.parametrize(
        ("symbol", "text"),
        [
            (Symbol("p_0"), "p₀"),
            (Symbol("mdot", INLET), "ṁ₁"),
            (Symbol("C_d", THROUGH), "C_d"),
            (Symbol("p_0", SUPPLY), "p_0,s"),
            (Symbol("p", DISCHARGE), "p_b"),
            (Symbol("A_cr", INLET), "A₁*"),
            (Symbol("x", "N2"), "x_N2"),
            (Symbol("dp"), "Δp"),
        ],
    )
    def test_a_symbol_carries_its_role_as_a_subscript(self, symbol, text):
        assert symbol_text(symbol) == text


class TestBrackets:
    @pytest.mark.parametrize(
        ("expr", "text"),
        [
            (Product((Sum((a, b)), c)), "(p + T)·ρ"),
            (a - (b - c), "p − (T − ρ)"),
            (Sum((a, Sum((b, c)))), "p + T + ρ"),
            (Power(Power(a, b), c), "(p^T)^ρ"),
            (Power(a, Power(b, c)), "p^(T^ρ)"),
            (Negative(Sum((a, b))), "−(p + T)"),
            (Quotient(a, Quotient(b, c)), "p/(T/ρ)"),
            (Quotient(Quotient(a, b), c), "(p/T)/ρ"),
            (Quotient(a, Product((b, c))), "p/(T·ρ)"),
            (Power(Negative(a), number("2")), "(−p)²"),
            (Negative(Power(a, number("2"))), "−p²"),
            (Product((a, Negative(b))), "p·(−T)"),
            (Sum((a, Product((Negative(b), c)))), "p − T·ρ"),
            (Negative(Negative(a)), "−(−p)"),
            (Power(number("-2"), number("2")), "(−2)²"),
            (Power(a, number("-1")), "p⁻¹"),
            (Power(Product((a, b)), c), "(p·T)^ρ"),
            (Power(Root(a), c), "(√p)^ρ"),
            (Power(Function("ln", a), c), "(ln(p))^ρ"),
            (Power(number("1/3"), c), "(1/3)^ρ"),
            (Sum((Negative(a), b)), "−p + T"),
            (Product((number("-1"), a)), "−p"),
        ],
    )
    def test_brackets_stand_where_they_are_needed_and_nowhere_else(self, expr, text):
        assert plain_text(expr) == text


class TestIntegrals:
    integral = Integral(1 + c / a, c, Root(a), b**2)
    single = Integral(c**2, c, a, b)

    @pytest.mark.parametrize(
        ("expr", "text"),
        [
            (single, "∫[p to T] ρ² dρ"),
            (integral, "∫[√p to T²] (1 + ρ/p) dρ"),
            (2 * single, "2·∫[p to T] ρ² dρ"),
            (Product((single, a)), "(∫[p to T] ρ² dρ)·p"),
            (Quotient(a, single), "p/(∫[p to T] ρ² dρ)"),
            (Power(single, b), "(∫[p to T] ρ² dρ)^T"),
            (Integral(1 / c, c, a, b), "∫[p to T] (1/ρ) dρ"),
        ],
    )
    def test_an_integral_is_one_factor_in_a_line(self, expr, text):
        assert plain_text(expr) == text

    def test_an_integral_is_set_with_its_limits_below_and_above_the_sign(self):
        root = ET.fromstring(presentation_mathml(self.integral))
        (over,) = root.iter("{http://www.w3.org/1998/Math/MathML}munderover")
        assert ["".join(part.itertext()) for part in over] == ["∫", "p", "T2"]
        assert words(presentation_mathml(self.integral)) == "∫pT2(1+ρp)dρ"

    def test_the_latex_of_an_integral_is_understood_by_a_typesetter(self):
        text = latex_text(self.single)
        assert text == r"\int_{p}^{T} \rho^{2} \, \mathrm{d} \rho"
        assert ziamath.Latex(text).getsize()[0] > 10

    def test_a_substitution_leaves_the_variable_a_letter(self):
        shown = substituted_mathml(self.integral, {a: ("2", "1"), b: ("3", "1")})
        assert words(shown) == "∫232(1+ρ2)dρ"

    def test_an_integral_is_drawn_with_paths_alone(self):
        drawing = draw(presentation_mathml(self.integral))
        assert drawing.height > 20
        assert {element.tag.split("}")[1] for element in ET.fromstring(drawing.svg).iter()} == {
            "svg", "path",
        }  # fmt: skip


def trees() -> st.SearchStrategy[Expr]:
    leaves = st.sampled_from([a, b, c]) | st.builds(
        lambda n, d: Number(Fraction(n, d)), st.integers(-9, 9), st.sampled_from([1, 2, 3])
    )

    def grown(inner: st.SearchStrategy[Expr]) -> st.SearchStrategy[Expr]:
        several = st.lists(inner, min_size=2, max_size=3).map(tuple)
        return (
            st.builds(Sum, several)
            | st.builds(Product, several)
            | st.builds(Quotient, inner, inner)
            | st.builds(Power, inner, inner)
            | st.builds(Negative, inner)
            | st.builds(Root, inner)
            | st.builds(Function, st.sampled_from(["exp", "ln", "lg", "sin"]), inner)
        )

    return st.recursive(leaves, grown, max_leaves=9)


def value_of(expr: Expr, values: Mapping[Symbol, float]) -> float:
    match expr:
        case Symbol():
            return values[expr]
        case Number(value):
            return float(value)
        case Sum(terms):
            return sum(value_of(term, values) for term in terms)
        case Product(factors):
            return math.prod(value_of(factor, values) for factor in factors)
        case Negative(operand):
            return -value_of(operand, values)
        case Quotient(above, below):
            return value_of(above, values) / value_of(below, values)
        case Power(base, exponent):
            return math.pow(value_of(base, values), value_of(exponent, values))
        case Root(radicand):
            return math.sqrt(value_of(radicand, values))
        case Function("ln", argument):
            return math.log(value_of(argument, values))
        case Function("lg", argument):
            return math.log10(value_of(argument, values))
        case Function(name, argument):
            return getattr(math, name)(value_of(argument, values))
    raise AssertionError(expr)


def expected(expr: Expr) -> float:
    """The value, if it does not hang on the last digit of its parts."""
    try:
        near = [value_of(expr, {s: v * f for s, v in VALUES.items()}) for f in (1, 1 + 1e-13)]
    except (ValueError, ZeroDivisionError, OverflowError):
        assume(False)
    assume(all(1e-6 < abs(value) < 1e9 for value in near))
    assume(math.isclose(*near, rel_tol=1e-9))
    return near[0]


class TestReadingBack:
    @settings(max_examples=300, deadline=None)
    @given(trees())
    def test_a_line_of_text_read_by_the_rules_of_arithmetic_gives_the_value(self, expr):
        value = expected(expr)
        assert math.isclose(value_of_text(plain_text(expr), NAMES), value, rel_tol=1e-6)

    @settings(max_examples=300, deadline=None)
    @given(trees())
    def test_an_equation_on_paper_read_by_the_rules_of_arithmetic_gives_the_value(self, expr):
        value = expected(expr)
        read = value_of_mathml(presentation_mathml(expr), NAMES)
        assert math.isclose(read, value, rel_tol=1e-6)

    @settings(max_examples=300, deadline=None)
    @given(trees(), st.sampled_from([1, -1]))
    def test_a_substitution_read_by_the_rules_of_arithmetic_gives_the_value(self, expr, sign):
        values = {a: 1.3, b: sign * 0.7, c: 2.1}
        operands = {symbol: (repr(value), "1") for symbol, value in values.items()}
        try:
            value = value_of(expr, values)
        except (ValueError, ZeroDivisionError, OverflowError):
            assume(False)
        assume(1e-6 < abs(value) < 1e9)
        read = value_of_mathml(substituted_mathml(expr, operands), {})
        assert math.isclose(read, value, rel_tol=1e-6)


def words(mathml: str) -> str:
    return "".join(ET.fromstring(mathml).itertext())


class TestSubstitution:
    def test_every_symbol_becomes_its_number_with_its_unit(self):
        gas = RELATIONS["perfect_gas"].published.right
        rho, r, t = gas.factors
        shown = substituted_mathml(
            gas,
            {
                rho: (significant(1.2, 3), "kg/m3"),
                r: (significant(287.05, 5), "J/(kg*K)"),
                t: ("288.15", "K"),
            },
        )
        assert words(shown) == "1.20kg/m³×287.05J/(kg·K)×288.15K"

    @pytest.mark.parametrize(
        ("expr", "operand", "text"),
        [
            (a**2, ("3", "m/s"), "(3m/s)2"),
            (a**2, ("3", "1"), "32"),
            (a**2, ("1.5e6", "1"), "(1.5×106)2"),
            (a**2, ("-3", "1"), "(−3)2"),
            (2 - a, ("-3", "1"), "2−(−3)"),
            (2 * a, ("-3", "1"), "2×(−3)"),
            (-a, ("-3", "1"), "−(−3)"),
            (a - 1, ("-3", "1"), "−3−1"),
        ],
    )
    def test_a_number_is_bracketed_where_it_could_be_misread(self, expr, operand, text):
        assert words(substituted_mathml(expr, {a: operand})) == text

    def test_a_symbol_without_a_number_is_named(self):
        with pytest.raises(DefinitionError, match=r"symbol T: no number is given"):
            substituted_mathml(a + b, {a: ("1", "1")})


class TestLibrary:
    def test_every_statement_of_the_library_can_be_set_in_every_form(self):
        for statement in STATEMENTS:
            assert plain_text(statement)
            ET.fromstring(presentation_mathml(statement))
            latex = latex_text(statement)
            assert latex.isascii() and latex.count("{") == latex.count("}")

    def test_the_latex_of_every_relation_is_understood_by_a_typesetter(self):
        for relation in RELATIONS.values():
            assert ziamath.Latex(latex_text(relation.published)).getsize()[0] > 10

    def test_no_two_symbols_of_one_relation_look_alike(self):
        for relation in RELATIONS.values():
            shown = [symbol_text(symbol) for symbol in relation.symbols]
            assert len(set(shown)) == len(shown), relation.name

    def test_every_quantity_has_a_symbol_that_can_be_drawn(self):
        for name in catalogue():
            assert draw(presentation_mathml(Symbol(name))).width > 1

    def test_every_move_of_the_library_can_be_put_in_words(self):
        for relation in RELATIONS.values():
            for unknown in relation.symbols:
                isolation = isolate(relation.published, unknown)
                for move in isolation.moves if isolation else ():
                    told, operand = move_words(move.action, move.operand)
                    assert told
                    assert operand is None or plain_text(operand)
                    assert plain_text(move.result)


class TestMoves:
    def test_there_are_words_for_every_action(self):
        for action in ACTIONS:
            operand = Function("ln", a) if action == "apply" else a
            told, _ = move_words(action, operand)
            assert told[0].islower() and not told.endswith((" ", "."))

    def test_applying_a_function_names_it_and_leaves_nothing_to_set(self):
        assert move_words("apply", Function("arcsin", 1 / a)) == (
            "take the arcsine of both sides",
            None,
        )
        assert move_words("divide by", a) == ("divide both sides by", a)

    def test_a_logarithm_to_base_ten_is_named_as_such(self):
        assert move_words("apply", Function("lg", a)) == (
            "take the logarithm to base 10 of both sides",
            None,
        )
        assert move_words("raise 10 to both sides", None) == (
            "raise 10 to the power of both sides",
            None,
        )

    def test_an_unknown_action_is_refused(self):
        with pytest.raises(DefinitionError, match="move guess: there are no words for it"):
            move_words("guess", None)


class TestDrawings:
    published = RELATIONS["unchoked_mass_flow"].published

    def test_a_drawing_holds_nothing_but_paths(self):
        drawing = draw(presentation_mathml(self.published))
        tags = {element.tag.split("}")[1] for element in ET.fromstring(drawing.svg).iter()}
        assert tags == {"svg", "path"}
        assert " id=" not in drawing.svg and "href" not in drawing.svg

    def test_the_same_mathml_gives_the_same_bytes(self):
        first = draw(presentation_mathml(self.published)).svg
        draw.cache_clear()
        assert draw(presentation_mathml(self.published)).svg == first

    def test_a_drawing_scales_with_the_size_of_its_letters(self):
        small, large = (draw(presentation_mathml(self.published), size) for size in (8.0, 16.0))
        for one, two in ((small.width, large.width), (small.height, large.height)):
            assert two == pytest.approx(2 * one, abs=0.01)

    def test_the_baseline_lies_inside_the_picture(self):
        deep, flat = draw(presentation_mathml(Equation(a, 1 / b))), draw(presentation_mathml(b))
        assert 0 < deep.depth < deep.height
        assert flat.depth < 0.5, "a letter without descender stands on the baseline"

    def test_the_settings_of_the_library_are_left_as_they_were(self):
        before = config.svg2, config.precision, config.minsizefraction
        draw.cache_clear()
        draw(presentation_mathml(a))
        assert (config.svg2, config.precision, config.minsizefraction) == before

    def test_text_that_is_not_mathml_is_refused(self):
        with pytest.raises(DefinitionError, match="MathML: it is not well formed"):
            draw("<math><mi>p</math>")
