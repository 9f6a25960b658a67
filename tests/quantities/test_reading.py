"""Any text is read exactly or refused: nothing else happens."""

from __future__ import annotations

from decimal import Decimal
from fractions import Fraction

from hypothesis import assume, example, given, settings
from hypothesis import strategies as st

from calcsheets.errors import UnitError
from calcsheets.quantities import (
    Unit,
    all_units,
    catalogue,
    find_unit,
    quantity_given,
    read_measured,
    units_by_name,
)
from calcsheets.quantities.measured import LONGEST_TEXT

numbers = st.decimals(min_value=-(10**9), max_value=10**9, places=6) | st.decimals(
    min_value=Decimal("-1e20"), max_value=Decimal("1e20"), allow_nan=False
).filter(lambda number: not number or abs(number.adjusted()) <= 20)
texts = st.text(max_size=90) | st.text("0123456789.,+-eE' _bargmNSCFkPh23/()*°ΔK³", max_size=30)


@settings(deadline=None)
@given(number=numbers, unit=st.sampled_from(all_units()))
def test_a_decimal_stays_as_typed_and_exact(number: Decimal, unit: Unit) -> None:
    name = "" if unit.name == "1" else f" {unit.name}"  # a plain number is written without unit
    text = f"{number}{name}"
    assume(len(text) <= LONGEST_TEXT)
    measured = read_measured(text)
    assert str(measured.number) == str(number)
    assert measured.unit is unit
    assert measured.rational == Fraction(number) * unit.factor + unit.offset


@settings(deadline=None)
@given(text=texts)
@example("1 ")
@example("٣ bar")
@example("1e400 m")
@example("1" * 79)
@example("1 000 Pa")
@example("\N{MINUS SIGN}5 °C")
def test_a_text_is_read_or_refused(text: str) -> None:
    try:
        measured = read_measured(text)
    except UnitError as problem:
        assert str(problem)
    else:
        assert measured.text == text
        assert measured.unit in all_units()


@settings(deadline=None)
@given(text=texts, symbol=st.sampled_from(sorted(catalogue())))
def test_a_text_fits_a_quantity_or_is_refused(text: str, symbol: str) -> None:
    try:
        stated = quantity_given(catalogue()[symbol], read_measured(text))
    except UnitError as problem:
        assert str(problem)
    else:
        assert stated.low <= stated.high


@settings(deadline=None)
@given(symbol=st.sampled_from(sorted(catalogue())), unit=st.sampled_from(sorted(units_by_name())))
def test_every_unit_fits_a_quantity_or_is_refused_with_a_remedy(symbol: str, unit: str) -> None:
    quantity = catalogue()[symbol]
    try:
        stated = quantity_given(quantity, read_measured(f"1 {unit}"))
    except UnitError as problem:
        assert problem.remedy
    else:
        assert stated.dimension == find_unit(unit).dimension
