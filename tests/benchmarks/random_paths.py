"""Random consistent states of random paths, by plain formulas and none of the program's code.

A state follows from a few free numbers. Which of its quantities suffice to determine it is
decided from the rank of their derivatives with respect to the free numbers.

The formulas are those of the calorically perfect gas in every textbook (common practice).
"""

from __future__ import annotations

import math
import random
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass

import numpy as np

State = dict[str, float]
"""Value in coherent SI of each quantity, by its key."""

_STEP = 1e-6
_LARGEST_CONDITION = 1e5
_STREAM = (
    "p", "T", "rho", "M", "u", "a", "p_0", "T_0", "rho_0", "A", "d", "mdot", "A_cr", "q_V", "G",
    "q_dyn", "a_cr", "p_cr", "T_cr", "M_cr",
)  # fmt: skip
_VESSEL = ("p_0", "T_0", "V", "m", "rho_0")
_UNITS: Mapping[str, str] = {
    "p": "Pa(a)", "p_0": "Pa(a)", "p_cr": "Pa(a)", "q_dyn": "Pa(d)", "T": "K", "T_0": "K",
    "T_cr": "K", "rho": "kg/m3", "rho_0": "kg/m3", "u": "m/s", "a": "m/s", "a_cr": "m/s",
    "A": "m2", "A_cr": "m2", "d": "m", "mdot": "kg/s", "q_V": "m3/s", "G": "kg/(m2*s)",
    "R": "J/(kg*K)", "V": "m3", "m": "kg", "dm": "kg", "t": "s",
    "dh": "J/kg", "de": "J/kg", "w_b": "J/kg", "w_s": "J/kg",
}  # fmt: skip


@dataclass(frozen=True)
class Leg:
    """A process of a path with its stations and what else stands in its entry."""

    name: str
    start: str
    end: str
    process: str
    through: str = ""


@dataclass(frozen=True)
class Path:
    """A random path.

    Attributes:
        kinds: kind of each station.
        legs: its processes.
        free: the free numbers.
        state_of: the state that follows from free numbers.
    """

    kinds: Mapping[str, str]
    legs: tuple[Leg, ...]
    free: tuple[float, ...]
    state_of: Callable[[tuple[float, ...]], State]

    @property
    def state(self) -> State:
        """The state of its own free numbers."""
        return self.state_of(self.free)


def unit_of(key: str) -> str:
    """Return the unit in which a quantity stands in a brief, empty for a plain number."""
    return _UNITS.get(key.partition("@")[0], "")


def random_path(chance: random.Random) -> Path:
    """Return a random path of two to five stations with a consistent state."""
    draw = chance.random()
    if draw < 0.7:
        return _stream_path(chance)
    return _let_down(chance) if draw < 0.85 else _change(chance)


def sufficient_subset(path: Path, chance: random.Random) -> list[str] | None:
    """Return quantities, in random order, that determine the state and none too many.

    Returns:
        Their keys, or ``None`` where the choice would magnify the rounding of its inputs.
    """
    state = path.state
    keys = sorted(state)
    chance.shuffle(keys)
    rows = dict(zip(sorted(state), _jacobian(path), strict=True))
    chosen: list[str] = []
    matrix = np.empty((0, len(path.free)))
    for key in sorted(keys, key=lambda key: _likelihood(key, chance)):
        trial = np.vstack([matrix, rows[key]])
        values = np.linalg.svd(trial, compute_uv=False)
        if values[-1] > 1e-3 * values[0]:
            matrix = trial
            chosen.append(key)
        if len(chosen) == len(path.free):
            condition = values[0] / values[-1]
            return chosen if condition < _LARGEST_CONDITION else None
    return None


def magnification(path: Path, given: list[str]) -> dict[str, float]:
    """Return by how much a relative error of the given quantities may grow in each other one."""
    keys = sorted(path.state)
    jacobian = _jacobian(path)
    rows = np.array([jacobian[keys.index(key)] for key in given])
    back = np.linalg.pinv(rows)
    return {key: float(np.abs(jacobian[i] @ back).sum()) for i, key in enumerate(keys)}


def _likelihood(key: str, chance: random.Random) -> float:
    """Gas properties are known nearly always; places are not favoured."""
    symbol = key.partition("@")[0]
    return chance.random() - (0.9 if symbol in ("gamma", "R") else 0.0)


def _jacobian(path: Path) -> np.ndarray:
    """Logarithmic derivatives of every quantity, one row each, by the free numbers."""
    keys = sorted(path.state)
    columns = []
    for index in range(len(path.free)):
        ends = []
        for factor in (1 + _STEP, 1 - _STEP):
            moved = tuple(v * factor if i == index else v for i, v in enumerate(path.free))
            state = path.state_of(moved)
            ends.append(np.array([_logarithm(state[key]) for key in keys]))
        columns.append((ends[0] - ends[1]) / (2 * _STEP))
    return np.array(columns).T


def _logarithm(value: float) -> float:
    return math.log(abs(value)) if value else -700.0


def stream(gamma: float, gas: float, p_0: float, t_0: float, mach: float, area: float) -> State:
    """Return every quantity of a stream from its stagnation state, Mach number and area."""
    factor = 1 + (gamma - 1) / 2 * mach**2
    t, p = t_0 / factor, p_0 / factor ** (gamma / (gamma - 1))
    rho, a = p / (gas * t), math.sqrt(gamma * gas * t)
    u = mach * a
    t_cr = t_0 * 2 / (gamma + 1)
    ratio = (2 / (gamma + 1) * factor) ** ((gamma + 1) / (2 * (gamma - 1))) / mach
    a_cr = math.sqrt(gamma * gas * t_cr)
    return {
        "p": p, "T": t, "rho": rho, "M": mach, "u": u, "a": a, "p_0": p_0, "T_0": t_0,
        "rho_0": p_0 / (gas * t_0), "A": area, "d": math.sqrt(4 * area / math.pi),
        "mdot": rho * u * area, "A_cr": area / ratio, "q_V": u * area, "G": rho * u,
        "q_dyn": rho * u**2 / 2, "a_cr": a_cr, "T_cr": t_cr, "M_cr": u / a_cr,
        "p_cr": p_0 * (2 / (gamma + 1)) ** (gamma / (gamma - 1)),
    }  # fmt: skip


def _stream_path(chance: random.Random) -> Path:
    count = chance.randint(2, 5)
    names = [f"s{i}" for i in range(1, count + 1)]
    processes: list[str] = []
    machs = [_mach(chance)]
    for _ in names[1:]:
        process = chance.choice(["isentropic flow", "adiabatic passage", "normal shock", "orifice"])
        if process == "normal shock" and machs[-1] <= 1:
            process = "isentropic flow"
        if process == "orifice" and machs[-1] > 1:
            process = "adiabatic passage"
        processes.append(process)
        if process == "normal shock":
            machs.append(0.5)  # any subsonic number: the shock decides
        else:
            machs.append(chance.uniform(0.05, 0.6) if process == "orifice" else _mach(chance))
    free = [chance.uniform(1.1, 1.66), chance.uniform(200, 500), 10 ** chance.uniform(5, 6.5)]
    free += [chance.uniform(250, 600), machs[0], 10 ** chance.uniform(-3, -1)]
    for process, mach in zip(processes, machs[1:], strict=True):
        if process != "normal shock":
            free.append(mach)
        if process == "adiabatic passage":
            free.append(chance.uniform(0.6, 0.98))
        if process == "orifice":
            free += [chance.uniform(0.55, 0.98), chance.uniform(0.1, 0.93)]
    legs = tuple(
        Leg(f"l{i}", names[i - 1], names[i], process) for i, process in enumerate(processes, 1)
    )
    kinds = dict.fromkeys(names, "stream")
    return Path(kinds, legs, tuple(free), lambda values: _stream_state(legs, values))


def _mach(chance: random.Random) -> float:
    return chance.uniform(0.08, 0.85) if chance.random() < 0.6 else chance.uniform(1.2, 3.0)


def _stream_state(legs: tuple[Leg, ...], free: tuple[float, ...]) -> State:
    values = iter(free)
    gamma, gas, p_0, t_0 = (next(values) for _ in range(4))
    state: State = {"gamma@gas": gamma, "R@gas": gas}
    here = stream(gamma, gas, p_0, t_0, next(values), next(values))
    state |= {f"{symbol}@{legs[0].start}": here[symbol] for symbol in _STREAM}
    for leg in legs:
        here, own = _behind(leg.process, gamma, gas, here, values)
        state |= {f"{symbol}@{leg.end}": here[symbol] for symbol in _STREAM}
        state |= {f"{symbol}@{leg.name}": value for symbol, value in own.items()}
    return state


def _behind(
    process: str, gamma: float, gas: float, here: State, values: Iterator[float]
) -> tuple[State, State]:
    """The stream behind a process, and the process's own quantities."""
    p_0, t_0, mdot = here["p_0"], here["T_0"], here["mdot"]
    if process == "normal shock":
        square = here["M"] ** 2
        mach = math.sqrt(((gamma - 1) * square + 2) / (2 * gamma * square - (gamma - 1)))
        p = here["p"] * (2 * gamma * square - (gamma - 1)) / (gamma + 1)
        p_0 = p * (1 + (gamma - 1) / 2 * mach**2) ** (gamma / (gamma - 1))
        return stream(gamma, gas, p_0, t_0, mach, here["A"]), {}
    mach = next(values)
    own: State = {}
    if process == "adiabatic passage":
        p_0 *= next(values)
    if process == "orifice":
        c_d, ratio = next(values), next(values)
        own = orifice(gamma, gas, p_0, t_0, ratio, mdot, c_d)
        p_0 = p_0 * ratio * (1 + (gamma - 1) / 2 * mach**2) ** (gamma / (gamma - 1))
    unit = stream(gamma, gas, p_0, t_0, mach, 1.0)
    return stream(gamma, gas, p_0, t_0, mach, mdot / unit["mdot"]), own


def orifice(
    gamma: float, gas: float, p_0: float, t_0: float, ratio: float, mdot: float, c_d: float
) -> State:
    """Return the quantities of the orifice that passes a mass flow, choked or not."""
    throat = max(ratio, (2 / (gamma + 1)) ** (gamma / (gamma - 1)))
    inner = throat ** (2 / gamma) - throat ** ((gamma + 1) / gamma)
    flux = p_0 * math.sqrt(2 * gamma / ((gamma - 1) * gas * t_0) * inner)
    area = mdot / (c_d * flux)
    return {"C_d": c_d, "A": area, "d": math.sqrt(4 * area / math.pi), "mdot": mdot}


def _let_down(chance: random.Random) -> Path:
    """A vessel let down through an orifice that stays choked, into the open."""
    process = chance.choice(["let-down, isothermal", "let-down, adiabatic"])
    legs = (
        Leg("hole", "before", "outside", "orifice"),
        Leg("down", "before", "after", process, through="hole"),
    )
    free = (
        chance.uniform(1.1, 1.66), chance.uniform(200, 500), 10 ** chance.uniform(6, 6.7),
        chance.uniform(260, 400), 10 ** chance.uniform(-1, 1.5), 10 ** chance.uniform(-5, -3),
        chance.uniform(0.6, 0.98), chance.uniform(0.45, 0.9), chance.uniform(6e4, 1.1e5),
    )  # fmt: skip
    kinds = {"before": "vessel", "after": "vessel", "outside": "stream"}
    return Path(kinds, legs, free, lambda values: _let_down_state(process, values))


def _let_down_state(process: str, free: tuple[float, ...]) -> State:
    gamma, gas, p_1, t_1, volume, area, c_d, ratio, back = free
    p_2 = p_1 * ratio
    warm = process == "let-down, isothermal"
    t_2 = t_1 if warm else t_1 * ratio ** ((gamma - 1) / gamma)
    masses = [p * volume / (gas * t) for p, t in ((p_1, t_1), (p_2, t_2))]
    speed = c_d * area * math.sqrt(gamma * gas * t_1) / volume
    choked = ((gamma + 1) / 2) ** ((gamma + 1) / (2 * (gamma - 1)))
    course = (
        math.log(1 / ratio)
        if warm
        else 2 / (gamma - 1) * (ratio ** (-(gamma - 1) / (2 * gamma)) - 1)
    )
    flow = c_d * area * p_1 * math.sqrt(gamma / (gas * t_1)) / choked
    return {
        "gamma@gas": gamma, "R@gas": gas, "p_0@before": p_1, "T_0@before": t_1,
        "V@before": volume, "m@before": masses[0], "p_0@after": p_2, "T_0@after": t_2,
        "m@after": masses[1], "C_d@hole": c_d, "A@hole": area,
        "d@hole": math.sqrt(4 * area / math.pi), "mdot@hole": flow,
        "dm@down": masses[0] - masses[1], "t@down": course * choked / speed, "p@outside": back,
    }  # fmt: skip


def _change(chance: random.Random) -> Path:
    """A change of state of a gas: isentropic, polytropic or isothermal."""
    process = chance.choice(["isentropic change", "polytropic change", "isothermal change"])
    legs = (Leg("change", "one", "two", process),)
    free = [chance.uniform(1.1, 1.66), chance.uniform(200, 500), 10 ** chance.uniform(5, 6.5)]
    ratio = chance.choice([chance.uniform(0.2, 0.8), chance.uniform(1.3, 4)])
    free += [chance.uniform(250, 600), ratio]
    if process == "polytropic change":
        free.append(chance.uniform(1.05, 1.6))
    kinds = {"one": "stream", "two": "stream"}
    return Path(kinds, legs, tuple(free), lambda values: _change_state(process, values))


def _change_state(process: str, free: tuple[float, ...]) -> State:
    gamma, gas, p_1, t_1, ratio = free[:5]
    exponent = {"isentropic change": gamma, "isothermal change": 1.0}.get(process, free[-1])
    p_2 = p_1 * ratio
    t_2 = t_1 * ratio ** ((exponent - 1) / exponent)
    state = {
        "gamma@gas": gamma, "R@gas": gas, "p@one": p_1, "T@one": t_1, "p@two": p_2, "T@two": t_2,
        "rho@one": p_1 / (gas * t_1), "rho@two": p_2 / (gas * t_2),
    }  # fmt: skip
    if process == "isentropic change":
        state["w_b@change"] = gas / (gamma - 1) * (t_1 - t_2)
    elif process == "polytropic change":
        state["n@change"] = exponent
        state["w_b@change"] = gas * (t_1 - t_2) / (exponent - 1)
    else:
        state["w_b@change"] = gas * t_1 * math.log(1 / ratio)
    return state
