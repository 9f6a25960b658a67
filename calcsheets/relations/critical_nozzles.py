"""Critical-flow nozzles of ISO 9300: the throat is sonic, and the flow knows no back pressure.

``C_d`` depends on the flow by the Reynolds number of the throat, so that both are solved
together. For a real gas the critical flow function ``C_star`` is stated from a property table;
that of a perfect gas is a relation here.
"""

from __future__ import annotations

from ..expressions import PI, Expr, number, sqrt, symbols
from .orifices import CRITICAL_RATIO
from .relation import Chapter, Limit, Process, Regime, Relation
from .roles import INLET, OUTLET
from .sources import definition, iso_9300, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT, REVERSIBLE
from .throttles import CRITICAL_NOZZLES, CYLINDRICAL, TOROIDAL, TOROIDAL_FINE

CRITICAL = "critical throat"
NOT_CRITICAL = "throat not surely critical"

gamma, R, mdot, d, C_d, C_star = symbols("gamma R mdot d C_d C_star")
Re_nt, A_2t, r_i, r_max = symbols("Re_nt A_2t r_i r_max")
p_0, T_0, eta_0 = (s.of(INLET) for s in symbols("p_0 T_0 eta_0"))
p_2 = symbols("p")[0].of(OUTLET)
U_q, U_C, U_Cstar, U_d, U_p, U_T = symbols("U_q U_C U_Cstar U_d U_p U_T")

_MADE = ("a nozzle of the shape and finish that the standard demands", "dry gas, one phase")


def _coefficient(
    label: str, nozzle: str, right: Expr, lowest: int, highest: int, reason: str
) -> Relation:
    return Relation(
        f"C_d_{label}",
        f"Discharge coefficient of a {nozzle}",
        C_d.equals(right),
        iso_9300(),
        (nozzle,),
        limits=(
            Limit(
                Re_nt.at_least(1000),
                "in laminar flow the correlation means nothing",
                essential=True,
            ),
            Limit(Re_nt.at_least(lowest), reason),
            Limit(Re_nt.at_most(highest), reason),
        ),
        assumptions=_MADE,
        empirical=True,
    )


_FLOW = (
    Relation(
        "critical_flow_function",
        "Critical flow function of a perfect gas",
        C_star.equals(sqrt(gamma * (2 / (gamma + 1)) ** ((gamma + 1) / (gamma - 1)))),
        textbook("Choked isentropic flow of a perfect gas"),
        CRITICAL_NOZZLES,
        assumptions=(PERFECT, CONSTANT_HEATS, REVERSIBLE),
        errs="A dense gas may have a critical flow function some per cent larger: state C_star "
        "from a property table there.",
    ),
    Relation(
        "critical_nozzle_flow",
        "Mass flow of a critical flow nozzle",
        mdot.equals(PI / 4 * d**2 * C_d * C_star * p_0 / sqrt(R * T_0)),
        iso_9300(),
        CRITICAL_NOZZLES,
        assumptions=_MADE,
        cautions=(
            "Use the stagnation pressure: the static pressure at the inlet tapping of a narrow "
            "inlet pipe is lower.",
        ),
        regime=CRITICAL,
    ),
    Relation(
        "nozzle_throat_reynolds",
        "Reynolds number of the nozzle throat",
        Re_nt.equals(4 * mdot / (PI * d * eta_0)),
        definition("Definition of the throat Reynolds number, ISO 9300"),
        CRITICAL_NOZZLES,
    ),
    _coefficient(
        "toroidal",
        TOROIDAL,
        number("0.9959") - number("2.720") / sqrt(Re_nt),
        21_000,
        32_000_000,
        "the standard covers throat Reynolds numbers from 2.1e4 to 3.2e7",
    ),
    _coefficient(
        "toroidal_fine",
        TOROIDAL_FINE,
        number("0.9985") - number("3.412") / sqrt(Re_nt),
        21_000,
        1_400_000,
        "the standard covers throat Reynolds numbers from 2.1e4 to 1.4e6",
    ),
    _coefficient(
        "cylindrical",
        CYLINDRICAL,
        number("0.9976") - number("0.1388") * Re_nt ** number("-0.2"),
        350_000,
        11_000_000,
        "the standard covers throat Reynolds numbers from 3.5e5 to 1.1e7",
    ),
)

_BACK_PRESSURE = (
    Relation(
        "diffuser_back_pressure",
        "Ideal back-pressure ratio of a nozzle with a diffuser",
        A_2t.equals(
            sqrt((gamma - 1) / 2)
            * (2 / (gamma + 1)) ** ((gamma + 1) / (2 * (gamma - 1)))
            / (r_i ** (1 / gamma) * sqrt(1 - r_i ** ((gamma - 1) / gamma)))
        ),
        textbook("Isentropic flow, subsonic at the exit of the diffuser"),
        CRITICAL_NOZZLES,
        limits=(
            Limit(
                r_i.at_least(CRITICAL_RATIO),
                "the diffuser recovers pressure in subsonic flow",
                essential=True,
            ),
        ),
        assumptions=(PERFECT, CONSTANT_HEATS, REVERSIBLE),
    ),
    Relation(
        "largest_back_pressure",
        "Largest permissible back-pressure ratio",
        r_max.equals(number("0.8") * (r_i - CRITICAL_RATIO) + CRITICAL_RATIO),
        iso_9300(),
        CRITICAL_NOZZLES,
        limits=(
            Limit(
                Re_nt.at_least(200_000),
                "below a throat Reynolds number of 2e5 the diffuser may recover nothing",
            ),
        ),
        assumptions=("a conical diffuser behind the throat, as the standard demands",),
        cautions=(
            "Small nozzles may lose the critical state early: prove it by a second back pressure.",
        ),
        empirical=True,
    ),
)

_UNCERTAIN = (
    Relation(
        "critical_flow_uncertainty",
        "Uncertainty of the mass flow of a critical flow nozzle",
        U_q.equals(sqrt(U_C**2 + U_Cstar**2 + (2 * U_d) ** 2 + U_p**2 + U_T**2 / 4)),
        iso_9300(),
        CRITICAL_NOZZLES,
        assumptions=("the uncertainties are independent, small, and all at 95 %",),
    ),
)

CHAPTER = Chapter(
    "critical_nozzles",
    "Critical-flow nozzles",
    _FLOW + _BACK_PRESSURE + _UNCERTAIN,
    regimes=(
        Regime(
            "critical_throat",
            "Critical throat: back pressure against the largest permissible one",
            (((p_2 / p_0).at_most(r_max), CRITICAL),),
            NOT_CRITICAL,
            CRITICAL_NOZZLES,
            iso_9300(),
        ),
    ),
    processes=tuple(
        Process(name, f"a flow meter: {name}", one_stream=True) for name in CRITICAL_NOZZLES
    ),
)
