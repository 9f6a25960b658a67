"""Flow meters that make a pressure difference: what ISO 5167-1 says of all of them.

The devices have chapters of their own: they give the discharge coefficient ``C``, the
expansibility factor and the uncertainties. The pipe is the first station, upstream of the
device; the second is its downstream tapping. Where the mass flow is asked, ``C`` depends on
the answer by the Reynolds number, and the relations are solved together.
"""

from __future__ import annotations

from ..expressions import PI, Constant, number, sqrt, symbols
from .relation import Chapter, Limit, Process, Relation, starting_from
from .roles import INLET, OUTLET
from .sources import definition, derived, iso_5167, textbook
from .thermodynamics import PERFECT
from .throttles import METERS, NOZZLES, ORIFICE_PLATES, PLATE_UNCERTAINTY, SPECIAL_PLATES, THROTTLES

gamma, mdot, C, eps, beta, E, d, D, dp, dw = symbols("gamma mdot C eps beta_d E d D dp_m dw")
d_20, D_20, alpha_d, alpha_D, Re_D, Re_d = symbols("d_20 D_20 alpha_d alpha_D Re_D Re_d")
mu_JT, K_w, xi = symbols("mu_JT K_w xi_w")
p_1, T_1, rho_1, eta_1, kappa_1 = (s.of(INLET) for s in symbols("p T rho eta kappa"))
p_2, T_2 = (s.of(OUTLET) for s in symbols("p T"))
mdot_1, mdot_2 = mdot.of(INLET), mdot.of(OUTLET)
U_q, U_C, U_eps, U_D, U_d, U_dp, U_rho, U_p, U_T = symbols(
    "U_q U_C U_eps U_D U_d U_dp U_rho U_p U_T"
)
T_20 = Constant("T_20")
mm = Constant("l_mm")

_RUN = (
    "the pipe runs full with a single phase, and the flow is steady and subsonic",
    "the straight lengths, the roughness and the device are as the standard demands",
)
PRESSURE_RATIO = Limit(
    (p_2 / p_1).at_least(number("0.75")),
    "the expansibility factor was measured down to p2/p1 of 0.75",
)
SAME_LOSS_LAW = sqrt(1 - beta**4 * (1 - C**2))


NOT_LAMINAR = Limit(
    Re_D.at_least(1000), "in laminar flow the correlation means nothing", essential=True
)


def pipe_between(low: int, high: int) -> tuple[Limit, Limit]:
    """Return the limits of the pipe diameter, in millimetres."""
    reason = f"the standard covers pipes from {low} mm to {high} mm"
    return (Limit((D / mm).at_least(low), reason), Limit((D / mm).at_most(high), reason))


def ratio_between(low: str, high: str) -> tuple[Limit, Limit]:
    """Return the limits of the diameter ratio."""
    reason = f"the standard covers diameter ratios from {low} to {high}"
    return (
        Limit(beta.at_least(number(low)), reason),
        Limit(beta.at_most(number(high)), reason),
    )


def reynolds_between(low: str, high: str) -> tuple[Limit, Limit]:
    """Return the limits of the Reynolds number of the pipe."""
    reason = f"the standard covers pipe Reynolds numbers from {low} to {high}"
    return (
        Limit(Re_D.at_least(number(low)), reason),
        Limit(Re_D.at_most(number(high)), reason),
    )


_FLOW = (
    Relation(
        "meter_diameter_ratio",
        "Diameter ratio",
        beta.equals(d / D),
        definition("Definition of the diameter ratio, ISO 5167-1"),
        (*METERS, PLATE_UNCERTAINTY),
    ),
    Relation(
        "velocity_of_approach",
        "Velocity of approach factor",
        E.equals(1 / sqrt(1 - beta**4)),
        definition("Definition of the velocity of approach factor, ISO 5167-1"),
        METERS,
    ),
    Relation(
        "meter_mass_flow",
        "Mass flow by a pressure difference",
        mdot.equals(C / sqrt(1 - beta**4) * eps * (PI / 4) * d**2 * sqrt(2 * dp * rho_1)),
        iso_5167(1),
        METERS,
        assumptions=_RUN,
        cautions=(
            "A gas that pulsates, carries liquid, or flows through a worn or reversed plate is "
            "misread, mostly too low.",
        ),
    ),
    Relation(
        "meter_pressure_difference",
        "Pressure difference between the tappings",
        dp.equals(p_1 - p_2),
        definition("Definition of the pressure difference"),
        METERS,
        assumptions=("both pressures are taken at the tappings, on one datum",),
    ),
    Relation(
        "meter_reynolds_number",
        "Reynolds number of the pipe",
        Re_D.equals(4 * mdot / (PI * eta_1 * D)),
        definition("Definition of the Reynolds number, ISO 5167-1"),
        METERS,
    ),
    Relation(
        "throat_reynolds_number",
        "Reynolds number of the throat",
        Re_d.equals(Re_D / beta),
        definition("Definition of the Reynolds number, ISO 5167-1"),
        METERS,
    ),
    Relation(
        "throttle_continuity",
        "The stream downstream of the device",
        mdot_2.equals(mdot),
        textbook("Conservation of mass, steady flow"),
        THROTTLES,
        assumptions=("nothing else joins or leaves the stream",),
    ),
    Relation(
        "throttle_approach",
        "The stream upstream of the device",
        mdot_1.equals(mdot),
        textbook("Conservation of mass, steady flow"),
        tuple(starting_from(name, "stream") for name in THROTTLES),
        assumptions=("nothing else joins or leaves the stream",),
    ),
)

_STATE = (
    Relation(
        "bore_expansion",
        "Bore at the working temperature",
        d.equals(d_20 * (1 + alpha_d * (T_1 - T_20))),
        textbook("Linear thermal expansion"),
        METERS,
        assumptions=("the device has the temperature of the gas", "one mean coefficient"),
    ),
    Relation(
        "pipe_expansion",
        "Pipe at the working temperature",
        D.equals(D_20 * (1 + alpha_D * (T_1 - T_20))),
        textbook("Linear thermal expansion"),
        METERS,
        assumptions=("the pipe has the temperature of the gas", "one mean coefficient"),
    ),
    Relation(
        "isentropic_exponent_perfect",
        "Isentropic exponent of a perfect gas",
        kappa_1.equals(gamma),
        textbook("Isentropic change of a perfect gas"),
        METERS,
        assumptions=(PERFECT,),
        errs="In a dense gas the isentropic exponent may be well above or below the ratio of "
        "specific heats; state kappa from a property table there.",
    ),
    Relation(
        "upstream_temperature",
        "Temperature upstream from that measured downstream",
        T_1.equals(T_2 + mu_JT * dw),
        iso_5167(1),
        METERS,
        assumptions=("throttling at constant enthalpy, with one Joule-Thomson coefficient",),
    ),
)

_LOSS = (
    Relation(
        "meter_loss_coefficient",
        "Pressure loss coefficient from the pressure loss",
        dw.equals(K_w * (8 * mdot**2) / (PI**2 * rho_1 * D**4)),
        definition("Definition of the loss coefficient by the dynamic pressure in the pipe"),
        METERS,
        assumptions=("dynamic pressure of the pipe, with the upstream density",),
    ),
    Relation(
        "relative_pressure_loss",
        "Relative pressure loss",
        dw.equals(xi * dp),
        definition("Definition of the relative pressure loss, ISO 5167-1"),
        METERS,
    ),
    Relation(
        "pressure_loss_of_plate",
        "Pressure loss of an orifice plate or nozzle",
        dw.equals((SAME_LOSS_LAW - C * beta**2) / (SAME_LOSS_LAW + C * beta**2) * dp),
        iso_5167(2, "5.4.1, equation (7)", "read in the source"),
        (*ORIFICE_PLATES, *SPECIAL_PLATES, *NOZZLES),
        assumptions=("from about one diameter upstream to six diameters downstream of the device",),
        empirical=True,
    ),
)

_UNCERTAIN = (
    Relation(
        "flow_uncertainty",
        "Uncertainty of the mass flow",
        U_q.equals(
            sqrt(
                U_C**2
                + U_eps**2
                + (2 * beta**4 / (1 - beta**4)) ** 2 * U_D**2
                + (2 / (1 - beta**4)) ** 2 * U_d**2
                + U_dp**2 / 4
                + U_rho**2 / 4
            )
        ),
        iso_5167(1, known="from memory"),
        (*(name for name in METERS if name not in ORIFICE_PLATES), PLATE_UNCERTAINTY),
        assumptions=("the uncertainties are independent, small, and all at 95 %",),
    ),
    Relation(
        "density_uncertainty",
        "Uncertainty of a density from pressure and temperature",
        U_rho.equals(sqrt(U_p**2 + U_T**2)),
        derived("Propagation of uncertainty through the perfect-gas state"),
        (*METERS, PLATE_UNCERTAINTY),
        assumptions=(PERFECT, "the composition adds nothing"),
    ),
)

CHAPTER = Chapter(
    "meters",
    "Flow meters by pressure difference",
    _FLOW + _STATE + _LOSS + _UNCERTAIN,
    processes=(
        *(Process(name, f"a flow meter: {name}", one_stream=True) for name in METERS),
        Process(PLATE_UNCERTAINTY, "the uncertainty of the flow by an orifice plate"),
    ),
)  # fmt: skip
