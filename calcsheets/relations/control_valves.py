"""Control valves on gas, IEC 60534-2-1; also a pressure regulator that stands wide open.

The standard writes its equations for numbers in stated units, with a constant N for each choice
of units. Here they stand for quantities, so that no unit can be mistaken:

- Kv is the flow of water at a drop of 1 bar, Cv that at 1 psi. The gas equation follows from this
  definition with the density of water at 15 °C, 999.1 kg/m3, to which the standard refers. The
  root of that density is the constant N6: 31.61, printed as 31.6 for kg/h, bar and kg/m3.
- N8 and N9 are N6 with the density of the gas by molar mass, temperature and compressibility
  factor. They need no equations of their own, and their rounding is not taken over: 109.6 is
  printed as 110 and 2457 as 2460, which is 0.35 % and 0.12 % too much.
- Kv over Cv follows from both definitions: 0.86498 for m3/h and gal/min, printed as 0.865.
- N2 = 0.00160, N4 = 0.0707 and N5 = 0.00180, for Kv in m3/h and lengths in mm, stand in the
  equations as printed, over one cubic metre per hour and one millimetre.
"""

from __future__ import annotations

from ..expressions import Constant, Expr, number, sqrt, symbols
from .relation import Chapter, Limit, Process, Regime, Relation
from .roles import INLET, OUTLET
from .sources import definition, iec_60534
from .throttles import VALVE, VALVE_REDUCED, VALVES

CHOKED = "valve choked"
NOT_CHOKED = "valve not choked"

gamma, mdot, d, K_v, C_v, K_vs = symbols("gamma mdot d K_v C_v K_vs")
R_0, h_lin, h_ep = symbols("R_0 h_lin h_ep")
x, x_T, x_TP, x_ch, F_gamma, Y, F_P = symbols("x_dp x_T x_TP x_ch F_gamma Y F_P")
Re_v, F_d, F_L = symbols("Re_v F_d F_rec")
zeta_1, zeta_2, zeta_B1, zeta_B2 = symbols("zeta_1 zeta_2 zeta_B1 zeta_B2")
zeta_i, zeta_S = symbols("zeta_i zeta_S")
p_1, rho_1, eta_1, D_1 = (s.of(INLET) for s in symbols("p rho eta D"))
p_2, D_2 = (s.of(OUTLET) for s in symbols("p D"))
q_u, mm, nu_u = Constant("q_Kv"), Constant("l_mm"), Constant("nu_u")
p_Kv, p_Cv, rho_w = Constant("p_Kv"), Constant("p_Cv"), Constant("rho_w")

_MODEL = (
    "a gas that behaves nearly ideally, without liquid, between the pressure tappings",
    "turbulent flow through the valve",
)
_ERRS = (
    "The equation is that of a nearly ideal gas: near the critical point, and for valves made for "
    "low noise, ask the maker for tested values."
)
_LIMITS = (
    Limit(gamma.at_least(number("1.08")), "the standard covers gamma from 1.08 to 1.65"),
    Limit(gamma.at_most(number("1.65")), "the standard covers gamma from 1.08 to 1.65"),
    Limit(x_T.at_most(number("0.84")), "the standard covers valves with xT up to 0.84"),
    Limit(Re_v.at_least(10_000), "below a valve Reynolds number of 10 000 the flow is laminar"),
)
_WIDER = "the pipe is wider than the valve"
_CAUTIONS = (
    "Pressures are absolute. Take xT at the travel of the calculation: it falls as a valve opens.",
    "A choked valve is loud and shakes: predict its noise by IEC 60534-8-3.",
    "Throttling cools most gases: check for hydrates and frost.",
)


def _flow(label: str, words: str, valve: str, choked: bool) -> Relation:
    ratio = x_ch if choked else x
    factors: tuple[Expr, ...] = (K_v, F_P, Y) if valve == VALVE_REDUCED else (K_v, Y)
    product: Expr = factors[0]
    for factor in factors[1:]:
        product = product * factor
    state = "choked" if choked else "not choked"
    return Relation(
        f"{label}_{'choked' if choked else 'unchoked'}",
        f"Mass flow of a control valve{words}, {state} (the form with N6)",
        mdot.equals(product * sqrt(ratio * p_1 * rho_1 * (rho_w / p_Kv))),
        iec_60534(),
        (valve,),
        limits=_LIMITS,
        assumptions=_MODEL,
        cautions=_CAUTIONS,
        regime=CHOKED if choked else NOT_CHOKED,
        errs=_ERRS,
    )


_CAPACITY = (
    Relation(
        "kv_and_cv",
        "Kv and Cv",
        K_v.equals(C_v * sqrt(p_Kv / p_Cv)),
        definition("Definitions of Kv and Cv, IEC 60534-1"),
        VALVES,
        assumptions=("both are tested with the same water, turbulent and not choked",),
    ),
    Relation(
        "linear_characteristic",
        "Travel of a valve with linear characteristic",
        (K_v / K_vs).equals(1 / R_0 + (1 - 1 / R_0) * h_lin),
        iec_60534("4", "inherent characteristics"),
        VALVES,
        assumptions=("the inherent characteristic is linear from 1/R0 to 1",),
    ),
    Relation(
        "equal_percentage_characteristic",
        "Travel of a valve with equal-percentage characteristic",
        (K_v / K_vs).equals(R_0 ** (h_ep - 1)),
        iec_60534("4", "inherent characteristics"),
        VALVES,
        assumptions=("the inherent characteristic is exponential from 1/R0 to 1",),
    ),
)

_GAS = (
    Relation(
        "valve_pressure_ratio",
        "Pressure drop ratio of a valve",
        x.equals((p_1 - p_2) / p_1),
        iec_60534(),
        VALVES,
        assumptions=("both pressures are absolute, two pipe diameters before and six behind",),
    ),
    Relation(
        "specific_heat_ratio_factor",
        "Specific heat ratio factor",
        F_gamma.equals(gamma / number("1.4")),
        iec_60534(),
        VALVES,
        limits=_LIMITS[:2],
        assumptions=_MODEL[:1],
    ),
    Relation(
        "choked_ratio",
        "Pressure drop ratio at which a valve chokes",
        x_ch.equals(F_gamma * x_T),
        iec_60534(),
        (VALVE,),
        assumptions=_MODEL,
        empirical=True,
    ),
    Relation(
        "choked_ratio_reduced",
        "Pressure drop ratio at which a valve between reducers chokes",
        x_ch.equals(F_gamma * x_TP),
        iec_60534(),
        (VALVE_REDUCED,),
        assumptions=_MODEL,
        empirical=True,
    ),
    Relation(
        "expansion_factor",
        "Expansion factor of a valve",
        Y.equals(1 - x / (3 * x_ch)),
        iec_60534(),
        VALVES,
        assumptions=_MODEL,
        regime=NOT_CHOKED,
        empirical=True,
    ),
    Relation(
        "expansion_factor_choked",
        "Expansion factor of a choked valve",
        Y.equals(number("2/3")),
        iec_60534(),
        VALVES,
        assumptions=_MODEL,
        regime=CHOKED,
        empirical=True,
    ),
    _flow("valve_flow", "", VALVE, choked=False),
    _flow("valve_flow", "", VALVE, choked=True),
    _flow("valve_flow_reduced", " between reducers", VALVE_REDUCED, choked=False),
    _flow("valve_flow_reduced", " between reducers", VALVE_REDUCED, choked=True),
    Relation(
        "valve_reynolds_number",
        "Reynolds number of a valve",
        Re_v.equals(
            number("0.0707") * F_d * (mdot / eta_1) * (nu_u / q_u)
            / sqrt(K_v / q_u * F_L)
            * (F_L**2 * (K_v / q_u) ** 2 / (number("0.00160") * (D_1 / mm) ** 4) + 1)
            ** number("1/4")
        ),
        iec_60534(),
        VALVES,
        assumptions=("N4 is 0.0707 and N2 is 0.00160, for Kv in m3/h and mm",),
        empirical=True,
    ),
)  # fmt: skip


def _size() -> Expr:
    """The square of the valve's relative capacity, in the units of N2 and N5."""
    return ((K_v / q_u) / (d / mm) ** 2) ** 2


_FITTINGS = (
    Relation(
        "inlet_reducer",
        "Loss coefficient of the inlet reducer",
        zeta_1.equals(number("0.5") * (1 - (d / D_1) ** 2) ** 2),
        iec_60534(),
        (VALVE_REDUCED,),
        limits=(Limit((d / D_1).at_most(1), _WIDER, essential=True),),
        assumptions=("a short concentric reducer",),
        empirical=True,
    ),
    Relation(
        "outlet_reducer",
        "Loss coefficient of the outlet reducer",
        zeta_2.equals((1 - (d / D_2) ** 2) ** 2),
        iec_60534(),
        (VALVE_REDUCED,),
        limits=(Limit((d / D_2).at_most(1), _WIDER, essential=True),),
        assumptions=("a short concentric reducer",),
        empirical=True,
    ),
    Relation(
        "inlet_bernoulli",
        "Bernoulli coefficient at the inlet",
        zeta_B1.equals(1 - (d / D_1) ** 4),
        iec_60534(),
        (VALVE_REDUCED,),
        assumptions=("the dynamic pressure counts by the square of the area",),
    ),
    Relation(
        "outlet_bernoulli",
        "Bernoulli coefficient at the outlet",
        zeta_B2.equals(1 - (d / D_2) ** 4),
        iec_60534(),
        (VALVE_REDUCED,),
        assumptions=("the dynamic pressure counts by the square of the area",),
    ),
    Relation(
        "sum_of_fittings",
        "Sum of the coefficients of the reducers",
        zeta_S.equals(zeta_1 + zeta_2 + zeta_B1 - zeta_B2),
        iec_60534(),
        (VALVE_REDUCED,),
        assumptions=("no other fitting lies between the pressure tappings",),
    ),
    Relation(
        "sum_of_inlet_fittings",
        "Sum of the inlet coefficients",
        zeta_i.equals(zeta_1 + zeta_B1),
        iec_60534(),
        (VALVE_REDUCED,),
        assumptions=("no other fitting lies between the pressure tapping and the valve",),
    ),
    Relation(
        "piping_geometry_factor",
        "Piping geometry factor",
        F_P.equals(1 / sqrt(1 + zeta_S / number("0.00160") * _size())),
        iec_60534(),
        (VALVE_REDUCED,),
        assumptions=("N2 is 0.00160, for Kv in m3/h and d in mm",),
        errs="Computed, not tested: the standard expects 5 % where Kv is not large for the size.",
        empirical=True,
    ),
    Relation(
        "choked_ratio_with_fittings",
        "Pressure drop ratio of valve and reducers at choked flow",
        x_TP.equals((x_T / F_P**2) / (1 + x_T * zeta_i / number("0.00180") * _size())),
        iec_60534(),
        (VALVE_REDUCED,),
        assumptions=("N5 is 0.00180, for Kv in m3/h and d in mm",),
        empirical=True,
    ),
)

CHAPTER = Chapter(
    "control_valves",
    "Control valves",
    _CAPACITY + _GAS + _FITTINGS,
    regimes=(
        Regime(
            "valve_choking",
            "Choking of the valve: pressure drop ratio against that of choked flow",
            ((x.at_least(x_ch), CHOKED),),
            NOT_CHOKED,
            VALVES,
            iec_60534(),
        ),
    ),
    processes=(
        Process(VALVE, "a control valve of the size of its pipes, or a regulator wide open",
                one_stream=True),
        Process(VALVE_REDUCED, "a control valve with reducers to wider pipes", one_stream=True),
    ),
)  # fmt: skip
