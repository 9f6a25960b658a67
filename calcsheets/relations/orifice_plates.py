"""Orifice plates of ISO 5167-2, and two of ISO/TR 15377: C, expansibility, uncertainty.

The Reader-Harris/Gallagher equation is written once for each kind of tapping and size of pipe:
with corner tappings its two tapping terms vanish, and below 71.12 mm (2.8 in) it has one more.
Lengths that the standard states in millimetres appear over one millimetre or one inch, so that
its numbers stand as printed.
"""

from __future__ import annotations

from ..expressions import Constant, Expr, exp, number, symbols
from .meters import (
    NOT_LAMINAR,
    PRESSURE_RATIO,
    U_C,
    C,
    D,
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
)
from .relation import Chapter, Limit, Regime, Relation, Source
from .sources import iso_5167
from .throttles import (
    CORNER,
    D_AND_HALF,
    ECCENTRIC,
    FLANGE,
    ORIFICE_PLATES,
    PLATE_UNCERTAINTY,
    QUARTER_CIRCLE,
    SPECIAL_PLATES,
)

L_1, Lp_2, Mp_2, A = symbols("L_1 Lp_2 Mp_2 A_RG")
inch = Constant("l_in")

LARGE_PIPE = "pipe of 71.12 mm or more"
SMALL_PIPE = "pipe below 71.12 mm"
LOW_RATIO = "diameter ratio up to 0.6"
HIGH_RATIO = "diameter ratio above 0.6"

_TR_15377 = Source(
    "ISO/TR 15377, flow measurement beyond the scope of ISO 5167", "1998", "", "library"
)
_SPECIAL = ("a plate made and fitted as ISO/TR 15377 demands",)
_SPACED = (D_AND_HALF, FLANGE)
_PLATE = ("a square-edged plate made and fitted as ISO 5167-2 demands",)
_CAUTIONS = (
    "A dull edge, a bent or reversed plate or a rough pipe shifts C by more than its stated "
    "uncertainty.",
)
_COMMON = (
    NOT_LAMINAR,
    *pipe_between(50, 1000),
    *ratio_between("0.1", "0.75"),
    Limit((d / mm).at_least(number("12.5")), "the standard covers bores of 12.5 mm or more"),
    Limit(Re_D.at_least(5000), "the standard covers pipe Reynolds numbers of 5000 or more"),
)
_LOWEST_REYNOLDS = {
    CORNER: Re_D.at_least(16000 * beta**2),
    D_AND_HALF: Re_D.at_least(16000 * beta**2),
    FLANGE: Re_D.at_least(170 * beta**2 * (D / mm)),
}


def _equation(tapping: str, size: str) -> Expr:
    """Return C by the Reader-Harris/Gallagher equation, its terms in the published order."""
    million = number("1000000")
    terms = (
        number("0.5961")
        + number("0.0261") * beta**2
        - number("0.216") * beta**8
        + number("0.000521") * (million * beta / Re_D) ** number("0.7")
        + (number("0.0188") + number("0.0063") * A)
        * beta ** number("3.5")
        * (million / Re_D) ** number("0.3")
    )
    if tapping != CORNER:
        upstream = (
            number("0.043") + number("0.080") * exp(-10 * L_1) - number("0.123") * exp(-7 * L_1)
        )
        terms = (
            terms
            + upstream * (1 - number("0.11") * A) * (beta**4 / (1 - beta**4))
            - number("0.031")
            * (Mp_2 - number("0.8") * Mp_2 ** number("1.1"))
            * beta ** number("1.3")
        )
    if size == SMALL_PIPE:
        terms = terms + number("0.011") * (number("0.75") - beta) * (number("2.8") - D / inch)
    return terms


def _coefficient(label: str, tapping: str, size: str) -> Relation:
    tappings = {CORNER: "corner", D_AND_HALF: "D and D/2", FLANGE: "flange"}
    return Relation(
        f"C_{label}",
        f"Reader-Harris/Gallagher equation, {tappings[tapping]} tappings, {size}",
        C.equals(_equation(tapping, size)),
        iso_5167(2),
        (tapping,),
        limits=(
            *_COMMON,
            Limit(
                _LOWEST_REYNOLDS[tapping],
                "for these tappings the smallest Reynolds number rises with the diameter ratio",
            ),
        ),
        assumptions=_PLATE,
        cautions=_CAUTIONS,
        regime=size,
        empirical=True,
    )


_TAPPINGS = (
    Relation(
        "upstream_spacing_flange",
        "Upstream spacing of flange tappings",
        L_1.equals(inch / D),
        iso_5167(2),
        (FLANGE,),
        assumptions=("the tapping stands 25.4 mm upstream of the plate",),
    ),
    Relation(
        "downstream_spacing_flange",
        "Downstream spacing of flange tappings",
        Lp_2.equals(inch / D),
        iso_5167(2),
        (FLANGE,),
        assumptions=("the tapping stands 25.4 mm downstream of the plate",),
    ),
    Relation(
        "upstream_spacing_D",
        "Upstream spacing of D and D/2 tappings",
        L_1.equals(1),
        iso_5167(2),
        (D_AND_HALF,),
        assumptions=("the tapping stands one pipe diameter upstream of the plate",),
    ),
    Relation(
        "downstream_spacing_D_half",
        "Downstream spacing of D and D/2 tappings",
        Lp_2.equals(number("0.47")),
        iso_5167(2),
        (D_AND_HALF,),
        assumptions=("the tapping stands half a pipe diameter downstream of the upstream face",),
    ),
    Relation(
        "dam_height",
        "Dam height of the downstream tapping",
        Mp_2.equals(2 * Lp_2 / (1 - beta)),
        iso_5167(2),
        _SPACED,
        assumptions=_PLATE,
    ),
    Relation(
        "reynolds_term",
        "Reynolds number term of the Reader-Harris/Gallagher equation",
        A.equals((19000 * beta / Re_D) ** number("0.8")),
        iso_5167(2),
        ORIFICE_PLATES,
        assumptions=_PLATE,
    ),
)

_COEFFICIENTS = (
    *(
        _coefficient(f"{label}_{end}", tapping, size)
        for label, tapping in (("corner", CORNER), ("D_half", D_AND_HALF), ("flange", FLANGE))
        for end, size in (("large", LARGE_PIPE), ("small", SMALL_PIPE))
    ),
    Relation(
        "C_quarter_circle",
        "Discharge coefficient of a quarter-circle orifice plate",
        C.equals(
            number("0.73823")
            + number("0.3309") * beta
            - number("1.16158") * beta**2
            + number("1.5084") * beta**3
        ),
        _TR_15377,
        (QUARTER_CIRCLE,),
        limits=(
            *ratio_between("0.245", "0.6"),
            Limit((d / mm).at_least(15), "the report covers bores of 15 mm or more"),
            Limit((D / mm).at_most(500), "the report covers pipes up to 500 mm"),
            Limit(Re_D.at_most(100000 * beta), "the report covers small Reynolds numbers"),
        ),
        assumptions=_SPECIAL,
        empirical=True,
    ),
    Relation(
        "C_eccentric",
        "Discharge coefficient of an eccentric orifice plate",
        C.equals(
            number("0.9355")
            - number("1.6889") * beta
            + number("3.0428") * beta**2
            - number("1.7989") * beta**3
        ),
        _TR_15377,
        (ECCENTRIC,),
        limits=(
            *ratio_between("0.46", "0.84"),
            *pipe_between(100, 1000),
            Limit((d / mm).at_least(50), "the report covers bores of 50 mm or more"),
            Limit(
                Re_D.at_least(200000 * beta**2),
                "the report covers Reynolds numbers from 2e5 times the square of beta",
            ),
            Limit(
                Re_D.at_most(1000000 * beta),
                "the report covers Reynolds numbers up to 1e6 times beta",
            ),
        ),
        assumptions=_SPECIAL,
        empirical=True,
    ),
)

_EXPANSIBILITY = (
    Relation(
        "orifice_expansibility",
        "Expansibility factor of an orifice plate",
        eps.equals(
            1
            - (number("0.351") + number("0.256") * beta**4 + number("0.93") * beta**8)
            * (1 - (p_2 / p_1) ** (1 / kappa_1))
        ),
        iso_5167(2),
        (*ORIFICE_PLATES, *SPECIAL_PLATES),
        limits=(PRESSURE_RATIO,),
        assumptions=("air, steam or natural gas; other gases of known isentropic exponent",),
        empirical=True,
    ),
    Relation(
        "orifice_expansibility_uncertainty",
        "Uncertainty of the expansibility factor of an orifice plate",
        U_eps.equals(number("0.035") * dp / (kappa_1 * p_1)),
        iso_5167(2, "5.3.3.2", "read in the source"),
        (*ORIFICE_PLATES, *SPECIAL_PLATES),
        assumptions=("diameter ratio, pressure ratio and exponent are without error",),
        empirical=True,
    ),
)

_UNCERTAINTY_LIMITS = (
    Limit(
        (D / inch).at_least(number("2.8")),
        "below 71.12 mm another 0.9 (0.75 - beta)(2.8 - D/25.4) % is to be added",
    ),
    Limit(
        Re_D.at_least(10000),
        "below a Reynolds number of 10 000 another 0.5 % is to be added if beta exceeds 0.5",
    ),
)
_UNCERTAINTIES = (
    Relation(
        "C_uncertainty_low",
        "Uncertainty of C, diameter ratio up to 0.6",
        U_C.equals(number("0.005")),
        iso_5167(2, "5.3.3.1", "read in the source"),
        (PLATE_UNCERTAINTY,),
        limits=(
            Limit(
                beta.at_least(number("0.2")),
                "below a diameter ratio of 0.2 the uncertainty is (0.7 - beta) %",
                essential=True,
            ),
            *_UNCERTAINTY_LIMITS,
        ),
        assumptions=("beta, D, Reynolds number and roughness are without error",),
        regime=LOW_RATIO,
        empirical=True,
    ),
    Relation(
        "C_uncertainty_high",
        "Uncertainty of C, diameter ratio above 0.6",
        U_C.equals((number("1.667") * beta - number("0.5")) / 100),
        iso_5167(2, "5.3.3.1", "read in the source"),
        (PLATE_UNCERTAINTY,),
        limits=(
            Limit(beta.at_most(number("0.75")), "the standard ends at a diameter ratio of 0.75"),
            *_UNCERTAINTY_LIMITS,
        ),
        assumptions=("beta, D, Reynolds number and roughness are without error",),
        regime=HIGH_RATIO,
        empirical=True,
    ),
)

CHAPTER = Chapter(
    "orifice_plates",
    "Orifice plates",
    _TAPPINGS + _COEFFICIENTS + _EXPANSIBILITY + _UNCERTAINTIES,
    regimes=(
        Regime(
            "pipe_size",
            "Size of the pipe: from 71.12 mm the equation for C has no term of its own for it",
            (((D / inch).at_least(number("2.8")), LARGE_PIPE),),
            SMALL_PIPE,
            ORIFICE_PLATES,
            iso_5167(2),
        ),
        Regime(
            "diameter_ratio_range",
            "Range of the diameter ratio, for the uncertainty of C",
            ((beta.at_most(number("0.6")), LOW_RATIO),),
            HIGH_RATIO,
            (PLATE_UNCERTAINTY,),
            iso_5167(2, "5.3.3.1", "read in the source"),
        ),
    ),
)
