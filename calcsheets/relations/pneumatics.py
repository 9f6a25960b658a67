"""Pneumatic components and circuits, ISO 6358.

The sonic conductance counts air at 20 °C and 100 kPa (ANR), so that the flow at that state needs
no density. Its mass is counted dry: at 65 % relative humidity the same volume has 0.3 % less mass.
Pressures and temperatures are those at rest: of a receiver, or total ones in a tube, so that
components follow one another on a path.
"""

from __future__ import annotations

from ..expressions import Constant, Expr, number, sqrt, symbols
from .relation import Chapter, Limit, Process, Regime, Relation
from .roles import INLET, OUTLET
from .sources import derived, iso_6358
from .thermodynamics import CONSTANT_HEATS, PERFECT
from .throttles import COMPONENT, COMPONENT_INDEXED, PARALLEL, PNEUMATIC, SERIES, TUBE

CHOKED = "component choked"
NOT_CHOKED = "component not choked"
FIRST_CHOKES = "the first component chokes first"
SECOND_CHOKES = "the second component chokes first"

gamma, R, q, C, b, m = symbols("gamma R q_ANR C_son b_cr m_sub")
C_1, C_2, b_1, b_2, alpha = symbols("C_I C_II b_I b_II alpha_12")
A_eff, K_v, dp_c, L, d = symbols("A_eff K_v dp_c L_tube d_tube")
p_1, T_1 = (s.of(INLET) for s in symbols("p_0 T_0"))
p_2 = symbols("p_0")[0].of(OUTLET)
T_ANR, p_ANR = Constant("T_ANR"), Constant("p_ANR")
p_Kv, rho_w, metre, C_u = (Constant(name) for name in ("p_Kv", "rho_w", "l_m", "C_u"))

_AIR = (
    "compressed air; the component was tested with air",
    "the pressures are total pressures: stubs at the tube wall read less at high velocity",
)
_DOWNSTREAM = Limit(
    (p_2 / p_1).at_most(1), "air flows from the higher to the lower pressure", essential=True
)
_UNCHOKED = Limit(
    (p_2 / p_1).at_least(b), "at a smaller pressure ratio the component is choked", essential=True
)
_OPENS = Limit((dp_c / p_1).at_most(1 - b), "the component opens before it chokes", essential=True)
_CAUTIONS = (
    "The pressures are absolute. A catalogue value in litres per minute at 6 bar is no sonic "
    "conductance: ask for C and b.",
)


def _subsonic(power: Expr, span: Expr) -> Expr:
    return C * p_1 * sqrt(T_ANR / T_1) * (1 - ((p_2 / p_1 - b) / span) ** 2) ** power


_FLOW = (
    Relation(
        "component_flow_choked",
        "Flow of a choked component",
        q.equals(C * p_1 * sqrt(T_ANR / T_1)),
        iso_6358(1),
        PNEUMATIC,
        assumptions=_AIR,
        cautions=_CAUTIONS,
        regime=CHOKED,
    ),
    Relation(
        "component_flow",
        "Flow of a component below choking",
        q.equals(C * p_1 * sqrt(T_ANR / T_1) * sqrt(1 - ((p_2 / p_1 - b) / (1 - b)) ** 2)),
        iso_6358(1),
        tuple(name for name in PNEUMATIC if name != COMPONENT_INDEXED),
        limits=(_DOWNSTREAM, _UNCHOKED),
        assumptions=(*_AIR, "the subsonic index is 0.5: a quarter of an ellipse"),
        cautions=_CAUTIONS,
        regime=NOT_CHOKED,
        empirical=True,
    ),
    Relation(
        "component_flow_indexed",
        "Flow of a component below choking, with subsonic index and cracking pressure",
        q.equals(_subsonic(m, 1 - dp_c / p_1 - b)),
        iso_6358(1),
        (COMPONENT_INDEXED,),
        limits=(_DOWNSTREAM, _UNCHOKED, _OPENS),
        assumptions=_AIR,
        cautions=_CAUTIONS,
        regime=NOT_CHOKED,
        empirical=True,
    ),
)

_EQUIVALENTS = (
    Relation(
        "effective_area",
        "Sonic conductance of an effective area",
        C.equals(
            A_eff
            * sqrt(gamma)
            * (2 / (gamma + 1)) ** ((gamma + 1) / (2 * (gamma - 1)))
            * (sqrt(R * T_ANR) / p_ANR)
        ),
        derived("Choked flow of a perfect gas through an area, counted at ANR"),
        PNEUMATIC,
        assumptions=(PERFECT, CONSTANT_HEATS, "the area passes the ideal choked flow"),
    ),
    Relation(
        "conductance_and_kv",
        "Sonic conductance and Kv of one component",
        K_v.equals(C * p_ANR * sqrt(2 / (1 - b)) * sqrt(p_Kv / (rho_w * R * T_ANR))),
        derived("Equal flow at a small pressure drop by the quarter ellipse and by Kv"),
        PNEUMATIC,
        assumptions=(PERFECT, "a small pressure drop; the same passage for air and water"),
        errs="Near choking the two descriptions part: measure C and b there.",
    ),
    Relation(
        "tube_conductance",
        "Sonic conductance of a straight tube",
        (C / C_u).equals(
            number("0.029")
            * (d / metre) ** 2
            / sqrt(L / metre / (d / metre) ** number("1.25") + 510)
        ),
        iso_6358(3),
        (TUBE,),
        assumptions=("a straight smooth plastic or steel tube, its ends without losses",),
        empirical=True,
    ),
    Relation(
        "tube_back_pressure_ratio",
        "Critical back-pressure ratio of a straight tube",
        b.equals(474 * (C / C_u) / (d / metre) ** 2),
        iso_6358(3),
        (TUBE,),
        assumptions=("a straight smooth plastic or steel tube, its ends without losses",),
        empirical=True,
    ),
)

_K = (1 - b_1) / b_1
_CHAINS = (
    Relation(
        "series_ratio",
        "Conductance ratio of two components in series",
        alpha.equals(C_1 / (b_1 * C_2)),
        derived("Choking of the first component against that of the second"),
        (SERIES,),
        assumptions=("the air has one total temperature along the chain",),
    ),
    Relation(
        "series_first_chokes",
        "Sonic conductance of a series whose first component chokes first",
        C.equals(C_1),
        derived("The first component is choked, whatever the second does"),
        (SERIES,),
        assumptions=("the air has one total temperature along the chain",),
        regime=FIRST_CHOKES,
    ),
    Relation(
        "series_second_chokes",
        "Sonic conductance of a series whose second component chokes first",
        C.equals(
            C_2
            * alpha
            * (alpha * b_1 + (1 - b_1) * sqrt(alpha**2 + _K**2 - 1))
            / (alpha**2 + _K**2)
        ),
        derived("Quarter ellipse of the first component with choked flow of the second"),
        (SERIES,),
        assumptions=("the air has one total temperature along the chain", "subsonic index 0.5"),
        regime=SECOND_CHOKES,
    ),
    Relation(
        "series_back_pressure_ratio",
        "Critical back-pressure ratio of two components in series",
        ((1 - b) / C**2).equals((1 - b_1) / C_1**2 + (1 - b_2) / C_2**2),
        derived("Small pressure drops of both components add"),
        (SERIES,),
        assumptions=("subsonic index 0.5", "one ellipse describes the chain"),
        errs="Between small drops and choking the ellipse of the chain is some per cent off.",
        empirical=True,
    ),
    Relation(
        "parallel_conductance",
        "Sonic conductance of two components in parallel",
        C.equals(C_1 + C_2),
        derived("Choked flows of both components add"),
        (PARALLEL,),
        assumptions=("both components are choked",),
    ),
    Relation(
        "parallel_back_pressure_ratio",
        "Critical back-pressure ratio of two components in parallel",
        (C / sqrt(1 - b)).equals(C_1 / sqrt(1 - b_1) + C_2 / sqrt(1 - b_2)),
        derived("Flows of both components at one small pressure drop add"),
        (PARALLEL,),
        assumptions=("subsonic index 0.5", "one ellipse describes both components"),
        errs="Where the two ratios differ the ellipse of both together is an approximation.",
        empirical=True,
    ),
)

CHAPTER = Chapter(
    "pneumatics",
    "Pneumatic components and circuits",
    _FLOW + _EQUIVALENTS + _CHAINS,
    regimes=(
        Regime(
            "component_choking",
            "Choking of the component: pressure ratio against its critical one",
            (((p_2 / p_1).at_most(b), CHOKED),),
            NOT_CHOKED,
            (COMPONENT, COMPONENT_INDEXED, TUBE),
            iso_6358(1),
        ),
        Regime(
            "series_choking",
            "Which component of a series chokes first",
            ((alpha.at_most(1), FIRST_CHOKES),),
            SECOND_CHOKES,
            (SERIES,),
            derived("Choking of the first component against that of the second"),
        ),
    ),
    processes=(
        Process(COMPONENT, "a pneumatic component of known C and b", one_stream=True),
        Process(
            COMPONENT_INDEXED,
            "a pneumatic component of known C, b, subsonic index and cracking pressure",
            one_stream=True,
        ),
        Process(TUBE, "a straight pneumatic tube", one_stream=True),
        Process(SERIES, "two pneumatic components in series, as one of the same flow"),
        Process(PARALLEL, "two pneumatic components in parallel, as one of the same flow"),
    ),
)  # fmt: skip
