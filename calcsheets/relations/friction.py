"""Friction factors of ducts: the three that are in use, and the laws and fits that give them.

Each law or fit gives a friction factor of its own. Which of them a calculation uses is for its
originator to say, in the brief: ``f_D = { same_as = "f_CW@pipe", source = "..." }``.
"""

from __future__ import annotations

from ..expressions import Equation, Expr, lg, ln, number, sqrt, symbols
from .duct_flows import ROUGH_DUCTS
from .relation import Chapter, Limit, Relation, Source
from .roles import INLET
from .sources import definition, derived, library, textbook

Re, eta, k, k_rel, D_h, A = symbols("Re eta k k_rel D_h A")
f_D, f_F, phi_f, tau_w = symbols("f_D f_F phi_f tau_w")
f_lam, f_CW, f_Hd, f_SJ, f_Ch, f_r, f_sm, f_Bl = symbols("f_lam f_CW f_Hd f_SJ f_Ch f_r f_sm f_Bl")
A_d, P_w, W_d, H_d, D_o, D_i = symbols("A P_w W_d H_d D_o D_i")
mdot_1, rho_1, u_1 = (s.of(INLET) for s in symbols("mdot rho u"))

_ROUND = "full developed flow in a circular duct, or in another by its hydraulic diameter"
_TURBULENT = Limit(Re.at_least(4000), "a law of turbulent flow")
_PUBLISHED_RANGE = Limit(k_rel.at_most(number("0.05")), "the range in which it was fitted")
_ROUGHNESS_GROWS = (
    "Roughness grows with age and deposits: a value of new pipe understates the friction of old "
    "pipe. Used for a relief or vent line take the rough end of the range.",
)

_SECTION = (
    Relation(
        "rectangle_area",
        "Area of a rectangular duct",
        A_d.equals(W_d * H_d),
        definition("Geometry of the rectangle"),
        ROUGH_DUCTS,
    ),
    Relation(
        "rectangle_perimeter",
        "Wetted perimeter of a rectangular duct",
        P_w.equals(2 * (W_d + H_d)),
        definition("Geometry of the rectangle"),
        ROUGH_DUCTS,
    ),
    Relation(
        "annulus_hydraulic_diameter",
        "Hydraulic diameter of an annular duct",
        D_h.equals(D_o - D_i),
        derived("Hydraulic diameter of the section between two circles"),
        ROUGH_DUCTS,
        limits=(Limit((D_i / D_o).at_most(1), "the outer wall lies outside", essential=True),),
        assumptions=("both walls are wetted and concentric",),
    ),
)

_NUMBERS = (
    Relation(
        "reynolds_number",
        "Reynolds number of the duct",
        Re.equals(mdot_1 * D_h / (A * eta)),
        definition("Definition of the Reynolds number"),
        ROUGH_DUCTS,
        assumptions=("one viscosity along the duct",),
    ),
    Relation(
        "relative_roughness",
        "Relative roughness",
        k_rel.equals(k / D_h),
        definition("Definition of the relative roughness"),
        ROUGH_DUCTS,
        cautions=_ROUGHNESS_GROWS,
    ),
    Relation(
        "fanning_factor",
        "Darcy and Fanning friction factor",
        f_D.equals(4 * f_F),
        definition("Definition of the Darcy and of the Fanning friction factor"),
        ROUGH_DUCTS,
        cautions=(
            "A chart or program may give either factor under the name f: a laminar line 64/Re "
            "shows the Darcy factor, 16/Re the Fanning factor.",
        ),
    ),
    Relation(
        "stanton_pannell_factor",
        "Darcy friction factor and wall shear over ρ u²",
        f_D.equals(8 * phi_f),
        definition("Definition of the Darcy friction factor and of the factor τ/(ρ u²)"),
        ROUGH_DUCTS,
    ),
    Relation(
        "wall_shear",
        "Shear stress on the wall at the first station",
        tau_w.equals(f_D / 8 * rho_1 * u_1**2),
        definition("Definition of the Darcy friction factor"),
        ROUGH_DUCTS,
    ),
)


def _law(
    name: str,
    title: str,
    equation: Equation,
    source: Source,
    *limits: Limit,
    cautions: tuple[str, ...] = (),
    errs: str = "",
) -> Relation:
    """A friction factor by one law or fit."""
    return Relation(
        name,
        title,
        equation,
        source,
        ROUGH_DUCTS,
        limits=limits,
        assumptions=(_ROUND,),
        cautions=cautions,
        errs=errs,
        empirical=True,
    )


def _inverse_root(factor: Expr) -> Expr:
    return 1 / sqrt(factor)


_OF_CHURCHILL = (
    (number("2.457") * ln(1 / ((7 / Re) ** number("0.9") + number("0.27") * k_rel))) ** 16
    + (37530 / Re) ** 16
)  # fmt: skip

_LAWS = (
    Relation(
        "laminar_friction",
        "Friction factor of laminar flow in a circle (Hagen and Poiseuille)",
        f_lam.equals(64 / Re),
        textbook("Law of Hagen and Poiseuille"),
        ROUGH_DUCTS,
        limits=(Limit(Re.at_most(2300), "above it flow in a circle need not be laminar"),),
        assumptions=("full developed laminar flow in a circular duct",),
    ),
    _law(
        "colebrook_white",
        "Friction factor by Colebrook and White (implicit)",
        _inverse_root(f_CW).equals(
            -2 * lg(k_rel / number("3.7") + number("2.51") / (Re * sqrt(f_CW)))
        ),
        library(
            "C. F. Colebrook, Turbulent Flow in Pipes, with Particular Reference to the "
            "Transition Region between the Smooth and Rough Pipe Laws, J. ICE 11",
            "1939",
        ),
        _TURBULENT,
        _PUBLISHED_RANGE,
        cautions=_ROUGHNESS_GROWS,
    ),
    _law(
        "haaland",
        "Friction factor by Haaland",
        _inverse_root(f_Hd).equals(
            number("-1.8") * lg((k_rel / number("3.7")) ** number("1.11") + number("6.9") / Re)
        ),
        library(
            "S. E. Haaland, Simple and Explicit Formulas for the Friction Factor in Turbulent "
            "Pipe Flow, J. Fluids Eng. 105",
            "1983",
        ),
        _TURBULENT,
        Limit(Re.at_most(10**8), "the range in which it was fitted"),
        _PUBLISHED_RANGE,
        errs="Within about 2 % of Colebrook and White, on either side.",
    ),
    _law(
        "swamee_jain",
        "Friction factor by Swamee and Jain",
        _inverse_root(f_SJ).equals(
            -2 * lg(k_rel / number("3.7") + number("5.74") / Re ** number("0.9"))
        ),
        library(
            "P. K. Swamee and A. K. Jain, Explicit Equations for Pipe-Flow Problems, "
            "J. Hydraul. Div. ASCE 102",
            "1976",
        ),
        Limit(Re.at_least(5000), "the range in which it was fitted"),
        Limit(Re.at_most(10**8), "the range in which it was fitted"),
        _PUBLISHED_RANGE,
        errs="Within about 3 % of Colebrook and White, on either side.",
    ),
    _law(
        "churchill",
        "Friction factor by Churchill, for all regimes",
        f_Ch.equals(
            8 * ((8 / Re) ** 12 + 1 / _OF_CHURCHILL ** number("1.5")) ** number("1/12")
        ),
        library(
            "S. W. Churchill, Friction-Factor Equation Spans All Fluid-Flow Regimes, "
            "Chem. Eng. 84",
            "1977",
        ),
        cautions=(
            "Between laminar and turbulent flow, Re 2300 to 4000, flow is not steady and no "
            "formula predicts its friction.",
        ),
    ),
    _law(
        "rough_limit",
        "Friction factor of fully rough flow (von Kármán)",
        _inverse_root(f_r).equals(-2 * lg(k_rel / number("3.7"))),
        library("T. von Kármán, law of fully rough pipes", "1930"),
        Limit(k_rel.at_least(number("0.00001")), "a smooth wall has no rough limit"),
        cautions=_ROUGHNESS_GROWS,
        errs="The limit for an infinite Reynolds number: friction at a finite one is higher, so "
        "that a flow found with it is too large.",
    ),
    _law(
        "smooth_law",
        "Friction factor of smooth ducts (Prandtl, von Kármán, Nikuradse; implicit)",
        _inverse_root(f_sm).equals(-2 * lg(number("2.51") / (Re * sqrt(f_sm)))),
        library("L. Prandtl, law of smooth pipes", "1933"),
        _TURBULENT,
        errs="A real wall has more friction: the least value for a given Reynolds number.",
    ),
    _law(
        "blasius",
        "Friction factor of smooth ducts by Blasius",
        f_Bl.equals(number("0.3164") / Re ** number("1/4")),
        library("H. Blasius, law of similarity of friction in liquids", "1913"),
        Limit(Re.at_least(3000), "the range of the measurements"),
        Limit(Re.at_most(200_000), "the range of the measurements"),
    ),
)  # fmt: skip

CHAPTER = Chapter("friction", "Friction factor and roughness", _SECTION + _NUMBERS + _LAWS)
