"""Nozzles and Venturi nozzles of ISO 5167-3, and Venturi tubes of ISO 5167-4.

Their gas expands without a free jet, so that one expansibility factor, that of an isentropic
change between the tappings, serves all of them.
"""

from __future__ import annotations

from ..expressions import number, sqrt, symbols
from .meters import (
    NOT_LAMINAR,
    PRESSURE_RATIO,
    U_C,
    C,
    Re_D,
    U_eps,
    beta,
    d,
    dp,
    eps,
    kappa_1,
    mm,
    p_1,
    p_2,
    pipe_between,
    ratio_between,
    reynolds_between,
)
from .relation import Chapter, Limit, Regime, Relation
from .sources import iso_5167
from .throttles import (
    AS_CAST,
    ISA_1932,
    LONG_RADIUS,
    MACHINED,
    NOZZLES,
    VENTURI_NOZZLE,
    VENTURI_TUBES,
    WELDED,
)

LOW_RATIO = "nozzle with a diameter ratio up to 0.6"
HIGH_RATIO = "nozzle with a diameter ratio above 0.6"

(tau,) = symbols("tau_p")
_ALL = (*NOZZLES, VENTURI_NOZZLE, *VENTURI_TUBES)
_MADE = ("the device is made and fitted as the standard demands",)
_TUBE_CAUTION = (
    "Outside its Reynolds numbers C of a Venturi tube may differ by some per cent: it falls "
    "at lower ones, and may exceed its value by up to 3 % in high-pressure gas.",
)

_COEFFICIENTS = (
    Relation(
        "C_isa_1932",
        "Discharge coefficient of an ISA 1932 nozzle",
        C.equals(
            number("0.9900")
            - number("0.2262") * beta ** number("4.1")
            - (number("0.00175") * beta**2 - number("0.0033") * beta ** number("4.15"))
            * (number("1000000") / Re_D) ** number("1.15")
        ),
        iso_5167(3),
        (ISA_1932,),
        limits=(
            NOT_LAMINAR,
            *pipe_between(50, 500),
            *ratio_between("0.3", "0.8"),
            *reynolds_between("20000", "10000000"),
        ),
        assumptions=_MADE,
        cautions=(
            "With a diameter ratio below 0.44 the standard begins at a Reynolds number of 70 000.",
        ),
        empirical=True,
    ),
    Relation(
        "C_long_radius",
        "Discharge coefficient of a long radius nozzle",
        C.equals(
            number("0.9965") - number("0.00653") * sqrt(beta) * sqrt(number("1000000") / Re_D)
        ),
        iso_5167(3),
        (LONG_RADIUS,),
        limits=(
            NOT_LAMINAR,
            *pipe_between(50, 630),
            *ratio_between("0.2", "0.8"),
            *reynolds_between("10000", "10000000"),
        ),
        assumptions=_MADE,
        empirical=True,
    ),
    Relation(
        "C_venturi_nozzle",
        "Discharge coefficient of a Venturi nozzle",
        C.equals(number("0.9858") - number("0.196") * beta ** number("4.5")),
        iso_5167(3),
        (VENTURI_NOZZLE,),
        limits=(
            *pipe_between(65, 500),
            *ratio_between("0.316", "0.775"),
            *reynolds_between("150000", "2000000"),
            Limit((d / mm).at_least(50), "the standard covers throats of 50 mm or more"),
        ),
        assumptions=_MADE,
        empirical=True,
    ),
)


def _tube(
    label: str,
    tube: str,
    coefficient: str,
    pipe: tuple[int, int],
    ratio: tuple[str, str],
    reynolds: tuple[str, str],
) -> Relation:
    return Relation(
        f"C_venturi_{label}",
        f"Discharge coefficient of a {tube}",
        C.equals(number(coefficient)),
        iso_5167(4),
        (tube,),
        limits=(*pipe_between(*pipe), *ratio_between(*ratio), *reynolds_between(*reynolds)),
        assumptions=_MADE,
        cautions=_TUBE_CAUTION,
        empirical=True,
    )


_TUBES = (
    _tube("cast", AS_CAST, "0.984", (100, 800), ("0.3", "0.75"), ("200000", "2000000")),
    _tube("machined", MACHINED, "0.995", (50, 250), ("0.4", "0.75"), ("200000", "1000000")),
    _tube("welded", WELDED, "0.985", (200, 1200), ("0.4", "0.7"), ("200000", "2000000")),
)

_EXPANSIBILITY = (
    Relation(
        "tapping_pressure_ratio",
        "Pressure ratio between the tappings",
        tau.equals(p_2 / p_1),
        iso_5167(3),
        _ALL,
        assumptions=("both pressures are absolute and taken at the tappings",),
    ),
    Relation(
        "nozzle_expansibility",
        "Expansibility factor of a nozzle or Venturi tube",
        eps.equals(
            sqrt(
                (kappa_1 * tau ** (2 / kappa_1) / (kappa_1 - 1))
                * ((1 - beta**4) / (1 - beta**4 * tau ** (2 / kappa_1)))
                * ((1 - tau ** ((kappa_1 - 1) / kappa_1)) / (1 - tau))
            )
        ),
        iso_5167(3),
        _ALL,
        limits=(PRESSURE_RATIO,),
        assumptions=("isentropic expansion to the throat, with one exponent",),
    ),
    Relation(
        "nozzle_expansibility_uncertainty",
        "Uncertainty of the expansibility factor of a nozzle",
        U_eps.equals(number("0.02") * dp / p_1),
        iso_5167(3, known="from memory"),
        NOZZLES,
        assumptions=("diameter ratio, pressure ratio and exponent are without error",),
        empirical=True,
    ),
    Relation(
        "venturi_expansibility_uncertainty",
        "Uncertainty of the expansibility factor of a Venturi nozzle or tube",
        U_eps.equals((4 + 100 * beta**8) / 100 * dp / p_1),
        iso_5167(4, known="from memory"),
        (VENTURI_NOZZLE, *VENTURI_TUBES),
        assumptions=("diameter ratio, pressure ratio and exponent are without error",),
        empirical=True,
    ),
)


def _uncertainty(label: str, words: str, device: str, value: str, part: int) -> Relation:
    return Relation(
        f"C_uncertainty_{label}",
        f"Uncertainty of C, {words}",
        U_C.equals(number(value)),
        iso_5167(part, known="from memory"),
        (device,),
        assumptions=("beta, D, Reynolds number and roughness are without error",),
        empirical=True,
    )


_UNCERTAINTIES = (
    Relation(
        "C_uncertainty_isa_low",
        "Uncertainty of C, ISA 1932 nozzle with a diameter ratio up to 0.6",
        U_C.equals(number("0.008")),
        iso_5167(3, known="from memory"),
        (ISA_1932,),
        assumptions=("beta, D, Reynolds number and roughness are without error",),
        regime=LOW_RATIO,
        empirical=True,
    ),
    Relation(
        "C_uncertainty_isa_high",
        "Uncertainty of C, ISA 1932 nozzle with a diameter ratio above 0.6",
        U_C.equals((2 * beta - number("0.4")) / 100),
        iso_5167(3, known="from memory"),
        (ISA_1932,),
        assumptions=("beta, D, Reynolds number and roughness are without error",),
        regime=HIGH_RATIO,
        empirical=True,
    ),
    _uncertainty("long_radius", "long radius nozzle", LONG_RADIUS, "0.02", 3),
    Relation(
        "C_uncertainty_venturi_nozzle",
        "Uncertainty of C, Venturi nozzle",
        U_C.equals((number("1.2") + number("1.5") * beta**4) / 100),
        iso_5167(3, known="from memory"),
        (VENTURI_NOZZLE,),
        assumptions=("beta, D, Reynolds number and roughness are without error",),
        empirical=True,
    ),
    _uncertainty("cast", AS_CAST, AS_CAST, "0.007", 4),
    _uncertainty("machined", MACHINED, MACHINED, "0.01", 4),
    _uncertainty("welded", WELDED, WELDED, "0.015", 4),
)

CHAPTER = Chapter(
    "flow_nozzles",
    "Flow nozzles and Venturi tubes",
    _COEFFICIENTS + _TUBES + _EXPANSIBILITY + _UNCERTAINTIES,
    regimes=(
        Regime(
            "nozzle_ratio_range",
            "Range of the diameter ratio, for the uncertainty of C of an ISA 1932 nozzle",
            ((beta.at_most(number("0.6")), LOW_RATIO),),
            HIGH_RATIO,
            (ISA_1932,),
            iso_5167(3, known="from memory"),
        ),
    ),
)  # fmt: skip
