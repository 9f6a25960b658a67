"""Control valves. Kv and Cv are flows of water in different tests, and different quantities."""

from __future__ import annotations

from collections.abc import Iterator

from .. import dimension as dim
from ..quantity import Notation, Quantity
from .entry import quantity


def quantities() -> Iterator[Quantity]:
    """Return the quantities."""
    yield from _capacity()
    yield from _of_the_gas_in_it()
    yield from _of_its_fittings()


def _capacity() -> Iterator[Quantity]:
    n = Notation
    flow, one = dim.VOLUME_FLOW, dim.ONE
    yield quantity(
        "K_v", "flow coefficient Kv: flow of water at a pressure drop of 1 bar",
        n("K", "v"), flow, "m3/s", high="1000",
    )  # fmt: skip
    yield quantity(
        "C_v", "flow coefficient Cv: flow of water at a pressure drop of 1 psi",
        n("C", "v"), flow, "m3/s", high="1000",
    )  # fmt: skip
    yield quantity(
        "K_vs", "rated flow coefficient Kv, fully open", n("K", "vs"), flow, "m3/s", high="1000"
    )
    yield quantity("R_0", "inherent rangeability", n("R", "0"), one, "1", low="1", high="1000")
    yield quantity(
        "h_lin", "relative travel, linear characteristic", n("h", "lin"), one, "1", high="1"
    )
    yield quantity(
        "h_ep", "relative travel, equal-percentage characteristic", n("h", "ep"), one, "1",
        high="1", zero=True,
    )  # fmt: skip


def _of_the_gas_in_it() -> Iterator[Quantity]:
    n = Notation
    one = dim.ONE
    yield quantity("x_dp", "pressure drop over inlet pressure", n("x"), one, "1", high="1")
    yield quantity(
        "x_T", "pressure drop ratio of the valve alone at choked flow", n("x", "T"), one, "1",
        high="1",
    )  # fmt: skip
    yield quantity(
        "x_TP", "pressure drop ratio of valve and reducers at choked flow", n("x", "TP"), one,
        "1", high="2",
    )  # fmt: skip
    yield quantity(
        "x_ch", "pressure drop ratio at which the gas chokes", n("x", "choked"), one, "1", high="2"
    )
    yield quantity("F_gamma", "specific heat ratio factor", n("F", "γ"), one, "1", high="2")
    yield quantity("Y", "expansion factor of the valve", n("Y"), one, "1", high="1")
    yield quantity("Re_v", "Reynolds number of the valve", n("Re", "v"), one, "1")
    yield quantity("F_d", "valve style modifier", n("F", "d"), one, "1", high="2")
    yield quantity("F_rec", "liquid pressure recovery factor", n("F", "L"), one, "1", high="1")


def _of_its_fittings() -> Iterator[Quantity]:
    n = Notation
    one = dim.ONE
    yield quantity("F_P", "piping geometry factor", n("F", "P"), one, "1", high="2")
    for symbol, title, subscript in (
        ("zeta_1", "loss coefficient of the inlet reducer", "1"),
        ("zeta_2", "loss coefficient of the outlet reducer", "2"),
        ("zeta_B1", "Bernoulli coefficient at the inlet", "B1"),
        ("zeta_B2", "Bernoulli coefficient at the outlet", "B2"),
        ("zeta_i", "sum of the inlet coefficients", "i"),
    ):
        yield quantity(symbol, title, n("ζ", subscript), one, "1", high="10", zero=True)
    yield quantity(
        "zeta_S", "sum of the coefficients of the reducers", n("ζ", "Σ"), one, "1",
        low="-10", high="10",
    )  # fmt: skip
