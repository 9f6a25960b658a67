"""Let-down and filling integrated over time or pressure by scipy (library), from the balances."""

from __future__ import annotations

import math
from itertools import pairwise

from scipy.integrate import quad

GAMMA, R, V, T, C_D, A, T_SUPPLY = 1.4, 296.8, 3.2, 298.15, 0.82, 50e-6, 310.0
CRITICAL = (2 / (GAMMA + 1)) ** (GAMMA / (GAMMA - 1))


def mass_flow(p_0: float, t_0: float, p_back: float, gamma: float = GAMMA) -> float:
    """Isentropic flow through an orifice, choked or not."""
    critical = (2 / (gamma + 1)) ** (gamma / (gamma - 1))
    r = max(p_back / p_0, critical)
    r = min(r, 1.0)  # an integrator may try a step beyond
    bracket = r ** (2 / gamma) - r ** ((gamma + 1) / gamma)
    return C_D * A * p_0 * math.sqrt(2 * gamma / ((gamma - 1) * R * t_0) * bracket)


def let_down_time(kind: str, p_1: float, p_2: float, p_back: float) -> float:
    """dm = V/(R T) dp at constant temperature, V/(gamma R T) dp along an isentrope."""

    def per_pressure(p: float) -> float:
        if kind == "isothermal":
            return V / (R * T) / mass_flow(p, T, p_back)
        now = T * (p / p_1) ** ((GAMMA - 1) / GAMMA)
        return V / (GAMMA * R * now) / mass_flow(p, now, p_back)

    return _over(per_pressure, p_2, p_1, p_back / CRITICAL)


def filling_time(kind: str, p_1: float, p_2: float, p_supply: float) -> float:
    """dm = V/(R T) dp at constant temperature, V/(gamma R T_s) dp without heat exchange."""
    capacity = V / (R * T) if kind == "isothermal" else V / (GAMMA * R * T_SUPPLY)
    return _over(
        lambda p: capacity / mass_flow(p_supply, T_SUPPLY, p), p_1, p_2, p_supply * CRITICAL
    )


def _over(function, low: float, high: float, kink: float) -> float:  # type: ignore[no-untyped-def]
    ends = [low, *([kink] if low < kink < high else []), high]
    parts = pairwise(ends)
    return sum(quad(function, a, b, epsabs=0, epsrel=1e-11, limit=200)[0] for a, b in parts)
