"""Ducts: friction, heat, and the reference states of their flow.

Three friction factors are in use, the second a quarter and the third an eighth of the first.
They have different symbols, and nothing but their relations leads from one to another. The
sonic states of flow with friction and of flow with heat have different symbols as well: they
are different states of the same stream.
"""

from __future__ import annotations

from collections.abc import Iterator

from .. import dimension as dim
from ..quantity import Kind, Notation, Quantity
from .entry import quantity


def quantities() -> Iterator[Quantity]:
    """Return the quantities."""
    yield from _of_the_duct()
    yield from _of_its_resistance()
    yield from _of_friction_factors()
    yield from _of_adiabatic_friction()
    yield from _of_isothermal_friction()
    yield from _of_heating()


def _of_the_duct() -> Iterator[Quantity]:
    n = Notation
    yield quantity("L", "length of the duct", n("L"), dim.LENGTH, "m", high="1e8", zero=True)
    yield quantity(
        "x_d", "distance along the duct", n("x", "d"), dim.LENGTH, "m", high="1e8", zero=True
    )
    yield quantity("D_h", "hydraulic diameter", n("D", "h"), dim.LENGTH, "m", high="1e4")
    yield quantity("P_w", "wetted perimeter", n("P", "w"), dim.LENGTH, "m", high="1e5")
    yield quantity("W_d", "width of a rectangular duct", n("W"), dim.LENGTH, "m", high="1e4")
    yield quantity("H_d", "height of a rectangular duct", n("H"), dim.LENGTH, "m", high="1e4")
    yield quantity("D_o", "outer diameter of an annular duct", n("D", "o"), dim.LENGTH, "m",
                   high="1e4")  # fmt: skip
    yield quantity("D_i", "inner diameter of an annular duct", n("D", "i"), dim.LENGTH, "m",
                   high="1e4", zero=True)  # fmt: skip
    yield quantity("F_w", "force on the wall along the duct", n("F", "w"), dim.FORCE, "N",
                   low="-1e12")  # fmt: skip
    yield quantity("Qdot", "heat flow into the stream", n("Q", accent="dot"), dim.POWER, "W",
                   low="-1e15", high="1e15")  # fmt: skip


def _of_its_resistance() -> Iterator[Quantity]:
    n = Notation
    one = dim.ONE
    yield quantity("f_D", "Darcy friction factor", n("f", "D"), one, "1", high="1e4")
    yield quantity("K", "sum of the loss coefficients", n("K"), one, "1", zero=True)
    yield quantity("K_d", "total loss coefficient of the duct", n("K", "d"), one, "1", zero=True)
    yield quantity(
        "L_eq", "equivalent length of the fittings", n("L", "eq"), dim.LENGTH, "m", high="1e8",
        zero=True,
    )  # fmt: skip


def _of_friction_factors() -> Iterator[Quantity]:
    n = Notation
    one = dim.ONE
    yield quantity("Re", "Reynolds number of the duct", n("Re"), one, "1")
    yield quantity("k", "equivalent roughness of the wall", n("k"), dim.LENGTH, "m", high="1",
                   zero=True)  # fmt: skip
    yield quantity("k_rel", "relative roughness", n("k", "rel"), one, "1", high="0.5", zero=True)
    yield quantity("f_F", "Fanning friction factor", n("f", "F"), one, "1", high="2500")
    yield quantity(
        "phi_f", "friction factor τ/(ρ u²), an eighth of the Darcy factor", n("φ", "f"), one, "1",
        high="1250",
    )  # fmt: skip
    yield quantity("tau_w", "shear stress on the wall", n("τ", "w"), dim.PRESSURE, "Pa",
                   kind=Kind.DIFFERENTIAL)  # fmt: skip
    for symbol, subscript, law in (
        ("f_lam", "lam", "of laminar flow"),
        ("f_CW", "CW", "by Colebrook and White"),
        ("f_Hd", "H", "by Haaland"),
        ("f_SJ", "SJ", "by Swamee and Jain"),
        ("f_Ch", "Ch", "by Churchill"),
        ("f_r", "r", "of fully rough flow"),
        ("f_sm", "sm", "of smooth ducts"),
        ("f_Bl", "Bl", "of smooth ducts by Blasius"),
    ):
        yield quantity(
            symbol, f"Darcy friction factor {law}", n("f", subscript), one, "1", high="1e4"
        )


def _sonic(letter: str, flow: str, parts: str) -> Iterator[Quantity]:
    """The sonic state of one kind of flow; ``parts`` are the symbols that it needs."""
    n = Notation
    for symbol, title, base, subscript, dimension, unit, kind in (
        ("p", "sonic pressure", "p", letter, dim.PRESSURE, "Pa", Kind.ABSOLUTE),
        ("T", "sonic temperature", "T", letter, dim.TEMPERATURE, "K", Kind.LEVEL),
        ("rho", "sonic density", "ρ", letter, dim.DENSITY, "kg/m3", Kind.PLAIN),
        ("p_0", "sonic stagnation pressure", "p", f"0{letter}", dim.PRESSURE, "Pa",
         Kind.ABSOLUTE),
        ("T_0", "sonic stagnation temperature", "T", f"0{letter}", dim.TEMPERATURE, "K",
         Kind.LEVEL),
    ):  # fmt: skip
        if symbol in parts.split():
            key = f"{symbol}{letter}" if symbol.endswith("0") else f"{symbol}_{letter}"
            notation = n(base, subscript, superscript="*")
            yield quantity(key, f"{title} of {flow}", notation, dimension, unit, kind=kind)


def _of_adiabatic_friction() -> Iterator[Quantity]:
    flow = "adiabatic flow with friction (Fanno)"
    yield from _sonic("F", flow, "p rho p_0")
    yield quantity(
        "K_F",
        "loss coefficient from here to the sonic end, adiabatic (Fanno)",
        Notation("K", "F", superscript="*"),
        dim.ONE,
        "1",
        zero=True,
    )
    yield quantity(
        "L_F",
        "length of duct from the first station to the sonic end (Fanno)",
        Notation("L", "F", superscript="*"),
        dim.LENGTH,
        "m",
        zero=True,
    )


def _of_isothermal_friction() -> Iterator[Quantity]:
    n = Notation
    flow = "isothermal flow with friction, at M = 1/√γ"
    pressure, temperature = dim.PRESSURE, dim.TEMPERATURE
    absolute = Kind.ABSOLUTE
    yield quantity("p_T", f"limiting pressure of {flow}", n("p", "T", superscript="*"), pressure,
                   "Pa", kind=absolute)  # fmt: skip
    yield quantity("p_0T", f"limiting stagnation pressure of {flow}",
                   n("p", "0T", superscript="*"), pressure, "Pa", kind=absolute)  # fmt: skip
    yield quantity("T_0T", f"limiting stagnation temperature of {flow}",
                   n("T", "0T", superscript="*"), temperature, "K", kind=Kind.LEVEL)  # fmt: skip
    yield quantity("K_T", "loss coefficient from here to the limit, isothermal",
                   n("K", "T", superscript="*"), dim.ONE, "1", zero=True)  # fmt: skip
    yield quantity(
        "L_T", "length of duct from the first station to the limit, isothermal",
        n("L", "T", superscript="*"), dim.LENGTH, "m", zero=True,
    )  # fmt: skip


def _of_heating() -> Iterator[Quantity]:
    flow = "flow with heat (Rayleigh)"
    yield from _sonic("R", flow, "p T rho p_0 T_0")
    yield quantity(
        "T_mx",
        "highest static temperature that heating can reach (Rayleigh)",
        Notation("T", "max"),
        dim.TEMPERATURE,
        "K",
        kind=Kind.LEVEL,
    )
    yield quantity(
        "q_R",
        "heat per mass from here to thermal choking (Rayleigh)",
        Notation("q", "R", superscript="*"),
        dim.SPECIFIC_ENERGY,
        "J/kg",
        zero=True,
    )
