"""Let-down and filling across the end of choking, forwards and backwards."""

from __future__ import annotations

import pytest

import calcsheets
from calcsheets.errors import NoRoot
from calcsheets.quantities import read_measured
from tests.vessels.briefs import calculated, filling, let_down, result
from tests.vessels.witnesses import filling_time, let_down_time

KINDS = ("isothermal", "adiabatic")
# Start, end and pressure behind the orifice in bar: choked throughout, to unchoked, never choked.
LET_DOWNS = {"throughout": (13, 3, 1.2), "before the end": (13, 1.3, 1.2), "never": (2, 1.25, 1.2)}
FILLINGS = {"throughout": (1, 4, 8), "before the end": (1, 7.9, 8), "never": (5, 7.99, 8)}
REGIMES = {
    "throughout": ("choked throughout", "choked"),
    "before the end": ("unchoked at the end", "choked"),
    "never": ("unchoked at the end", "not choked"),
}


def lines(case: tuple[float, float, float], supply: str) -> dict[str, str]:
    p_1, p_2, p_b = (f"'{p} bar(a)'" for p in case)
    return {"p_1": f"p_0 = {p_1}", "p_2": f"p_0 = {p_2}", "p_b": f"{supply} = {p_b}"}


WANTED = """
't@change' = { unit = 's', digits = 12 }
'regime@change' = {}
'regime@orifice' = {}
"""


@pytest.mark.parametrize("kind", KINDS)
@pytest.mark.parametrize("name", LET_DOWNS)
def test_a_let_down_takes_as_long_as_its_balances_say(kind: str, name: str) -> None:
    case = LET_DOWNS[name]
    record = calculated(let_down(kind, **lines(case, "p"), wanted=WANTED))
    expected = let_down_time(kind, *(p * 1e5 for p in case))
    assert result(record) == pytest.approx(expected, rel=1e-9)
    assert tuple(r.state for r in record.results[1:]) == REGIMES[name]


@pytest.mark.parametrize("kind", KINDS)
@pytest.mark.parametrize("name", FILLINGS)
def test_a_filling_takes_as_long_as_its_balances_say(kind: str, name: str) -> None:
    case = FILLINGS[name]
    record = calculated(filling(kind, **lines(case, "p_0"), wanted=WANTED))
    expected = filling_time(kind, *(p * 1e5 for p in case))
    assert result(record) == pytest.approx(expected, rel=1e-9)
    assert tuple(r.state for r in record.results[1:]) == REGIMES[name]


@pytest.mark.parametrize("kind", KINDS)
def test_an_integral_step_is_exact_and_says_so(kind: str) -> None:
    step = calculated(let_down(kind)).steps[-1]
    (item,) = step.integrals
    assert step.certified_digits == item.certified_digits == 15
    assert item.difference < 1e-15 * item.total
    assert len(item.nodes) == 16


@pytest.mark.parametrize("kind", KINDS)
def test_the_last_bar_down_to_the_pressure_behind_takes_a_finite_time(kind: str) -> None:
    """The integrand has no singular end, whatever the units in which equal pressures are typed."""
    times = [
        result(calculated(let_down(kind, p_2=f"p_0 = '{text}'")))
        for text in ("1.2 bar(a)", "120 kPa(a)", "1200000001e-4 Pa(a)")
    ]
    assert times[0] == times[1] == pytest.approx(times[2], rel=1e-4)
    assert times[0] == pytest.approx(let_down_time(kind, 13e5, 1.2e5, 1.2e5), rel=1e-6)


UNKNOWNS = {
    "A": ("'A@orifice' = { unit = 'mm2', digits = 12 }", "A@orifice"),
    "p_2": ("'p_0@END' = { unit = 'bar(a)', digits = 12 }", "p_0@END"),
    "p_1": ("'p_0@receiver' = { unit = 'bar(a)', digits = 12 }", "p_0@receiver"),
    "p_b": ("'P@BACK' = { unit = 'bar(a)', digits = 12 }", "P@BACK"),
}


@pytest.mark.parametrize("kind", KINDS)
@pytest.mark.parametrize("name", LET_DOWNS)
@pytest.mark.parametrize("unknown", UNKNOWNS)
def test_each_quantity_of_a_let_down_is_found_again_in_its_regime(
    kind: str, name: str, unknown: str
) -> None:
    """The regime depends on the answer: each is tried, and kept if its own test agrees.

    While the orifice stays choked, the pressure behind it has no part in the time.
    """
    known = lines(LET_DOWNS[name], "p")
    time = result(calculated(let_down(kind, **known)))
    wanted = UNKNOWNS[unknown][0].replace("END", "emptied").replace("P@BACK", "p@header")
    text = let_down(kind, **{**known, unknown: "", "wanted": wanted, "t": f"t = '{time!r} s'"})
    if (unknown, name) == ("p_b", "throughout"):
        with pytest.raises(calcsheets.CalcsheetsError):
            calculated(text)
        return
    hidden = "50 mm2" if unknown == "A" else known[unknown].split("'")[1]
    found = result(calculated(text))
    assert found == pytest.approx(float(read_measured(hidden).number), rel=1e-12)


@pytest.mark.parametrize("kind", KINDS)
@pytest.mark.parametrize("name", FILLINGS)
@pytest.mark.parametrize("unknown", ["A", "p_2", "p_1"])
def test_each_quantity_of_a_filling_is_found_again_in_its_regime(
    kind: str, name: str, unknown: str
) -> None:
    known = lines(FILLINGS[name], "p_0")
    time = result(calculated(filling(kind, **known)))
    wanted = UNKNOWNS[unknown][0].replace("END", "filled")
    text = filling(kind, **{**known, unknown: "", "wanted": wanted, "t": f"t = '{time!r} s'"})
    hidden = "50 mm2" if unknown == "A" else known[unknown].split("'")[1]
    found = result(calculated(text))
    assert found == pytest.approx(float(read_measured(hidden).number), rel=1e-12)


def test_a_time_after_which_the_pressures_are_equal_is_refused_with_the_longest() -> None:
    wanted = "'p_0@emptied' = { unit = 'bar(a)' }"
    with pytest.raises(calcsheets.CalcsheetsError):
        calculated(let_down("isothermal", p_2="", t="t = '5000 s'", wanted=wanted))


def test_a_let_down_below_the_pressure_behind_is_refused() -> None:
    with pytest.raises(NoRoot) as caught:
        calculated(let_down("isothermal", p_2="p_0 = '1.1 bar(a)'"))
    assert caught.value.limits == ("gas flows from the higher to the lower pressure",)
