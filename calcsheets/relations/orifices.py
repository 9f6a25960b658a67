"""Flow through an orifice or a convergent nozzle, choked or not."""

from __future__ import annotations

from ..expressions import sqrt, symbols
from .relation import Chapter, Limit, Process, Regime, Relation, starting_from
from .roles import INLET, OUTLET
from .sources import naca_1135, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT, REVERSIBLE

ORIFICE = "orifice"
CHOKED = "choked"
NOT_CHOKED = "not choked"

gamma, R, mdot, A, C_d = symbols("gamma R mdot A C_d")
p_0, T_0 = (s.of(INLET) for s in symbols("p_0 T_0"))
p = symbols("p")[0].of(OUTLET)
mdot_1, mdot_2 = mdot.of(INLET), mdot.of(OUTLET)

CRITICAL_RATIO = (2 / (gamma + 1)) ** (gamma / (gamma - 1))

_ASSUMPTIONS = (
    PERFECT,
    CONSTANT_HEATS,
    REVERSIBLE + " up to the throat; the discharge coefficient carries the rest",
    "the approach velocity is small, so that the upstream state is the stagnation state",
)
_ERRS = (
    "A perfect gas may understate the choked flow of a dense real gas (methane at 200 bar by "
    "about a fifth): safe as a relief capacity, unsafe as a vent load."
)

CHAPTER = Chapter(
    "orifices",
    "Orifices and convergent nozzles",
    (
        Relation(
            "choked_mass_flow",
            "Choked mass flow",
            mdot.equals(
                C_d * A * p_0
                * sqrt(gamma / (R * T_0))
                * (2 / (gamma + 1)) ** ((gamma + 1) / (2 * (gamma - 1)))
            ),
            naca_1135(),
            (ORIFICE,),
            regime=CHOKED,
            assumptions=_ASSUMPTIONS,
            errs=_ERRS,
        ),
        Relation(
            "unchoked_mass_flow",
            "Mass flow below choking",
            mdot.equals(
                C_d * A * p_0
                * sqrt(
                    2 * gamma / ((gamma - 1) * R * T_0)
                    * ((p / p_0) ** (2 / gamma) - (p / p_0) ** ((gamma + 1) / gamma))
                )
            ),
            textbook("Isentropic flow to the back pressure (Saint-Venant and Wantzel)"),
            (ORIFICE,),
            limits=(
                Limit(
                    (p / p_0).at_most(1),
                    "gas flows from the higher to the lower pressure",
                    essential=True,
                ),
            ),
            regime=NOT_CHOKED,
            assumptions=_ASSUMPTIONS,
            errs=_ERRS,
        ),
        Relation(
            "orifice_continuity",
            "The stream downstream of the orifice",
            mdot_2.equals(mdot),
            textbook("Conservation of mass, steady flow"),
            (ORIFICE,),
            assumptions=("nothing else joins or leaves the stream",),
        ),
        Relation(
            "orifice_approach",
            "The stream upstream of the orifice",
            mdot_1.equals(mdot),
            textbook("Conservation of mass, steady flow"),
            (starting_from(ORIFICE, "stream"),),
            assumptions=("nothing else joins or leaves the stream",),
        ),
    ),
    regimes=(
        Regime(
            "choking",
            "Choking of the orifice: back pressure against the critical pressure ratio",
            (((p / p_0).at_most(CRITICAL_RATIO), CHOKED),),
            NOT_CHOKED,
            (ORIFICE,),
            naca_1135(),
            cautions=(
                "A sharp-edged orifice does not choke fully at the ideal ratio: its flow still "
                "rises a little below it.",
            ),
        ),
    ),
    processes=(Process(ORIFICE, "flow through an orifice or convergent nozzle", one_stream=True),),
)  # fmt: skip
