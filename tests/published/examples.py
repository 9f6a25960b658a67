"""How each published worked example is put to the program, as a brief.

``{name}`` stands for the input of that name in ``worked_examples.toml``, written in our units;
pressures there are absolute. ``{name|unit}`` gives a plain number that unit: a ratio of areas is
put as an area over one square metre. ``wanted`` leads from a symbol of the source to our key and
unit; ``#2`` behind a symbol means its second value in the source.

What a source leaves open is supplied in the brief where the result does not depend on it, such as
a gas constant beside a Mach number.
"""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True)
class Case:
    """One example as a brief.

    Attributes:
        id: id of the example.
        gas: content of ``[gas]``.
        a: quantities of the first station.
        b: quantities of the second station.
        process: process between them.
        leg: quantities of the process, and what else its entry needs.
        wanted: our key and unit for each symbol of the source.
        more: further tables.
    """

    id: str
    gas: str
    wanted: dict[str, tuple[str, str]]
    a: str = ""
    b: str = ""
    process: str = "change of state"
    leg: str = ""
    more: str = ""


_G = "gamma = {gamma}\nR = {R}"
_AIR = 'gamma = {gamma}\nR = "287 J/(kg*K)"'

CASES = (
    Case("elger-12-1", _G, {"a": ("a@a", "m/s")}, a="T = {T}"),
    Case("elger-12-2", _G, {"M": ("M@a", "1")}, a="T = {T}\nu = {V}"),
    Case("elger-12-3", _AIR, {"T_0": ("T_0@a", "K")}, a="T = {T}\nM = {M}"),
    Case(
        "elger-12-5",
        _AIR,
        {"M_2": ("M@b", "1"), "p_2": ("p@b", "kPa(a)"), "T_2": ("T@b", "K")},
        a="M = {M_1}\np = {p_1}\nT = {T_1}",
        process="normal shock",
    ),
    Case(
        "elger-12-6",
        _G,
        {"delta_s": ("ds@process", "J/(kg*K)")},
        a='M = {M_1}\np_0 = "1 bar(a)"',
        process="normal shock",
    ),
    Case(
        "elger-12-7",
        _AIR,
        {"A": ("A@a", "cm2")},
        a="M = {M}\nA_cr = {A_throat}",
    ),
    Case(
        "elger-12-8",
        _G,
        {"M": ("M@a", "1"), "p": ("p@a", "kPa(a)"), "T": ("T@a", "K"), "V": ("u@a", "m/s")},
        a='A = {area_ratio|m2}\nA_cr = "1 m2"\np_0 = {p_0}\nT_0 = {T_0}\nbranch = "supersonic"',
    ),
    Case("elger-12-9", _G, {"mdot": ("mdot@a", "kg/s")}, a="M = {M}\nA = {A}\nT = {T}\np = {p}"),
    Case(
        "elger-12-10",
        _AIR,
        {"M": ("M@a", "1"), "p": ("p@a", "kPa(a)")},
        a='A = {area_ratio|m2}\nA_cr = "1 m2"\np_0 = {p_0}\nbranch = "supersonic"',
    ),
    Case(
        "elger-12-11",
        _AIR,
        {"M_1": ("M@a", "1"), "M_2": ("M@b", "1"), "M_e": ("M@e", "1"), "p_e": ("p@e", "kPa(a)")},
        a='A = {area_ratio_shock|m2}\nA_cr = "1 m2"\np_0 = {p_0}\nbranch = "supersonic"',
        process="normal shock",
        more=(
            '[stations.e]\nA = {area_ratio_exit|m2}\nbranch = "subsonic"\n'
            '[[path]]\nname = "diffuser"\nfrom = "b"\nto = "e"\nprocess = "isentropic flow"\n'
        ),
    ),
    Case(
        "balmer-16-12",
        _AIR,
        {"p_1": ("p@a", "kPa(a)"), "T_1": ("T@a", "K"), "M_2": ("M@b", "1")},
        a="M = {M_1}\np_0 = {p_0}\nT_0 = {T_0}",
        process="normal shock",
    ),
    Case(
        "niemeyer-isentropic",
        _AIR,
        {"M_2": ("M@b", "1")},
        a='M = {M_1}\nA = "1 m2"',
        b='A = {A_2_over_A_1|m2}\nbranch = "subsonic"',
        process="isentropic flow",
    ),
    Case(
        "mae113-2-39",
        "gamma = {gamma}\nc_p = {c_p}",
        {
            "T_1": ("T@a", "°R"),
            "p_1": ("p@a", "psia"),
            "M_2": ("M@b", "1"),
            "p_t2": ("p_0@b", "psia"),
            "p_2": ("p@b", "psia"),
            "T_2": ("T@b", "°R"),
            "V_1": ("u@a", "ft/s"),
        },
        a="M = {M_1}\np_0 = {p_t1}\nT_0 = {T_t1}",
        process="normal shock",
    ),
    Case(
        "jiskha-nozzle",
        _AIR,
        {"M": ("M@a", "1"), "A_exit": ("A@a", "in2")},
        a="p_0 = {p_0}\np = {p}\nA_cr = {A_throat}",
    ),
    Case("farrell-critical-pressure", _AIR, {"p_0": ("p_0@a", "kPa(a)")}, a="p_cr = {p_a}"),
    Case("farrell-critical-pressure", _AIR, {"p_0#2": ("p_0@a", "psia")}, a="p_cr = {p_a}"),
    Case(
        "farrell-relief",
        "gamma = {gamma}\nM_w = {molar_mass}",
        {"mdot/A": ("G@process", "kg/(m2*s)"), "p": ("p_cr@a", "bar(a)"), "T": ("T_cr@a", "K")},
        a="p_0 = {p_0}\nT_0 = {T_0}",
        b='p = "1 bar(a)"',
        process="orifice",
        leg='C_d = "1"\nA = "1 m2"',
    ),
    Case(
        "filo-entropy",
        "c_p = {c_p}\nR = {R}",
        {"delta_s": ("ds@process", "kJ/(kg*K)")},
        a="p = {p_1}\nT = {T_1}",
        b="p = {p_2}\nT = {T_2}",
    ),
    Case(
        "justaaa-compression",
        _AIR,
        {"T_2": ("T@b", "K")},
        a="T = {T_1}\nv = {V_1|m3/kg}",
        b="v = {V_2|m3/kg}",  # any volume per mass will do: only the ratio counts
        process="isentropic change",
    ),
    Case(
        "hrw-19-60",
        _AIR,
        {"T_2": ("T@b", "K")},
        a="T = {T_1}\np = {p_1}",
        b="p = {p_2}",
        process="isentropic change",
    ),
    Case(
        "neet-256atm",
        _AIR,
        {"p_2": ("p@b", "atm(a)")},
        a="T = {T_1}\np = {p_1}",
        b="T = {T_2}",
        process="isentropic change",
    ),
    Case(
        "cengel-co2-critical",
        _AIR,
        {"T_star": ("T_cr@a", "K"), "p_star": ("p_cr@a", "kPa(a)")},
        a="p_0 = {p_0}\nT_0 = {T_0}",
    ),
    Case(
        "cengel-co2-duct",
        _G,
        {
            "T": ("T@a", "K"),
            "rho": ("rho@a", "kg/m3"),
            "M": ("M@a", "1"),
            "A": ("A@a", "cm2"),
            "V": ("u@a", "m/s"),
        },
        a="p_0 = {p_0}\nT_0 = {T_0}\np = {p}\nmdot = {mdot}",
    ),
    Case(
        "cengel-cd-nozzle",
        _G,
        {
            "V_star": ("a_cr@a", "m/s"),
            "rho_star": ("rho_cr@a", "kg/m3"),
            "T_e": ("T@a", "K"),
            "rho_e": ("rho@a", "kg/m3"),
            "A_e": ("A@a", "cm2"),
            "V_e": ("u@a", "m/s"),
            "mdot": ("mdot@a", "kg/s"),
        },
        a="p_0 = {p_0}\nT_0 = {T_0}\nM = {M_e}\nA_cr = {A_throat}",
    ),
    Case(
        "cengel-shock-exit",
        _G,
        {
            "p_t2": ("p_0@b", "MPa(a)"),
            "p_2": ("p@b", "MPa(a)"),
            "T_2": ("T@b", "K"),
            "rho_2": ("rho@b", "kg/m3"),
            "delta_s": ("ds@process", "kJ/(kg*K)"),
            "V_2": ("u@b", "m/s"),
        },
        a="p_0 = {p_0}\nT_0 = {T_0}\nM = {M_1}",
        process="normal shock",
    ),
    Case(
        "cengel-diffuser-mach", _G, {"a": ("a@a", "m/s"), "M": ("M@a", "1")}, a="T = {T}\nu = {V}"
    ),
    Case(
        "cengel-entropy",
        "c_p = {c_p}\nR = {R}",
        {"delta_s": ("ds@process", "kJ/(kg*K)")},
        a="p = {p_1}\nT = {T_1}",
        b="p = {p_2}\nT = {T_2}",
    ),
    Case(
        "moran-polytropic",
        'gamma = "1.4"\nR = {R}',
        {"T_2": ("T@b", "K"), "w": ("w_b@process", "kJ/kg")},
        a="p = {p_1}\nT = {T_1}",
        b="p = {p_2}",
        process="polytropic change",
        leg="n = {n}",
    ),
    Case(
        "cengel-aircraft",
        "gamma = {gamma}\nc_p = {c_p}",
        {"p_01": ("p_0@a", "kPa(a)"), "T_01": ("T_0@a", "K")},
        a="p = {p}\nT = {T}\nu = {V}",
    ),
    Case(
        "sutton-3-2",
        _G,
        {"V_e": ("u@a", "m/s"), "F": ("F@a", "N")},
        a="p_0 = {p_0}\nT_0 = {T_0}\np = {p_e}\nmdot = {mdot}",
        more="[site]\np_atm = {p_a}\n",
    ),
)

# Ratios, asked by giving what they are a ratio to the value of one unit.
RATIOS = (
    Case(
        "elger-12-11",
        _AIR,
        {"p_t_ratio": ("p_0@b", "bar(a)")},
        a='A = {area_ratio_shock|m2}\nA_cr = "1 m2"\np_0 = "1 bar(a)"\nbranch = "supersonic"',
        process="normal shock",
    ),
    Case(
        "balmer-16-12",
        _AIR,
        {
            "p_ratio": ("p@b", "bar(a)"),
            "T_ratio": ("T@b", "K"),
            "p_t2_over_p1": ("p_0@b", "bar(a)"),
        },
        a='M = {M_1}\np = "1 bar(a)"\nT = "1 K"',
        process="normal shock",
    ),
    Case(
        "balmer-16-12",
        _AIR,
        {"p_t_ratio": ("p_0@b", "bar(a)")},
        a='M = {M_1}\np_0 = "1 bar(a)"',
        process="normal shock",
    ),
    Case(
        "balmer-fliegner-us",
        _G,
        {"mdot sqrt(T_0)/(A p_0)": ("mdot@process", "lbm/s")},
        a='p_0 = "1 psia"\nT_0 = "1 °R"',
        b='p = "0.1 psia"',
        process="orifice",
        leg='C_d = "1"\nA = "1 in2"',
    ),
    Case(
        "balmer-fliegner-si",
        _G,
        {"mdot sqrt(T_0)/(A p_0)": ("mdot@process", "kg/s")},
        a='p_0 = "1 Pa(a)"\nT_0 = "1 K"',
        b='p = "0.1 Pa(a)"',
        process="orifice",
        leg='C_d = "1"\nA = "1 m2"',
    ),
    Case(
        "niemeyer-isentropic",
        _AIR,
        {"A_1_over_A_star": ("A@a", "m2")},
        a='M = {M_1}\nA_cr = "1 m2"',
    ),
    Case(
        "jiskha-nozzle",
        _AIR,
        {"area_ratio": ("A@a", "m2")},
        a='p_0 = {p_0}\np = {p}\nA_cr = "1 m2"',
    ),
)

# Examples with two cases of their own in one row.
TWICE = (
    Case(
        "moran-9-14",
        _G,
        {"mdot_a": ("mdot@process", "kg/s")},
        a="p_0 = {p_0}\nT_0 = {T_0}",
        b="p = {p_b_a}",
        process="orifice",
        leg='C_d = "1"\nA = {A_exit}',
    ),
    Case(
        "moran-9-14",
        _G,
        {"mdot_b": ("mdot@process", "kg/s")},
        a="p_0 = {p_0}\nT_0 = {T_0}",
        b="p = {p_b_b}",
        process="orifice",
        leg='C_d = "1"\nA = {A_exit}',
    ),
    Case("moran-9-14", _G, {"M_b": ("M@a", "1")}, a="p_0 = {p_0}\np = {p_b_b}"),
    Case("us-standard-atmosphere-sound", _G, {"a_a": ("a@a", "m/s")}, a="T = {T_a}"),
    Case("us-standard-atmosphere-sound", _G, {"a_b": ("a@a", "m/s")}, a="T = {T_b}"),
    Case(
        "cengel-back-pressure",
        _G,
        {"mdot_a": ("mdot@process", "kg/s")},
        a="p = {p}\nT = {T}\nu = {V}",
        b="p = {p_b_a}",
        process="orifice",
        leg='C_d = "1"\nA = {A_throat}',
    ),
    Case(
        "cengel-back-pressure",
        _G,
        {"mdot_b": ("mdot@process", "kg/s")},
        a="p = {p}\nT = {T}\nu = {V}",
        b="p = {p_b_b}",
        process="orifice",
        leg='C_d = "1"\nA = {A_throat}',
    ),
)

# Steps towards a published value that is more than one quantity of one brief.
_UNIT_HOLE = {
    "a": 'p_0 = "10 bar(a)"\nT_0 = "300 K"',
    "b": 'p = "1 bar(a)"',
    "process": "orifice",
    "leg": 'C_d = "1"\nA = "1 m2"',
}
STEPS = {
    "sphere": Case("elger-12-4", _AIR, {"q": ("q_dyn@a", "Pa")}, a="p = {p}\nM = {M}"),
    "second area": Case(
        "niemeyer-isentropic",
        _AIR,
        {"A_star": ("A_cr@b", "m2")},
        a='M = {M_1}\nA = "1 m2"',
        b="A = {A_2_over_A_1|m2}",
        process="isentropic flow",
    ),
    "hydrogen": Case(
        "farrell-choked-ratio",
        "gamma = {gamma_H2}\nM_w = {molar_mass_H2}",
        {"mdot": ("mdot@process", "kg/s")},
        **_UNIT_HOLE,
    ),
    "methane": Case(
        "farrell-choked-ratio",
        "gamma = {gamma_CH4}\nM_w = {molar_mass_CH4}",
        {"mdot": ("mdot@process", "kg/s")},
        **_UNIT_HOLE,
    ),
    "dry air": Case(
        "acfm-altitude",
        _AIR.replace("{gamma}", '"1.4"'),
        {"Q": ("q_V@a", "ft3/min")},
        a="mdot = {Q_std|ft3/min(ref)}\np = {p_dry|psia}\nT = {T}",
        more="[site]\np_ref = {p_std}\nT_ref = {T_std}\n",
    ),
    "compressor": Case(
        "cengel-aircraft",
        "gamma = {gamma}\nc_p = {c_p}",
        {"T_02": ("T@b", "K"), "w": ("w_s@process", "kJ/kg")},
        a='p = "1 bar(a)"\nT = {T_01}',
        b="p = {pressure_ratio|bar(a)}",
        process="isentropic change",
    ),
    "rocket": Case(
        "sutton-3-2",
        _G,
        {"V_e": ("u@a", "m/s")},
        a="p_0 = {p_0}\nT_0 = {T_0}\np = {p_e}\nmdot = {mdot}",
    ),
}

# Inputs of the sources that no brief takes.
NOT_TAKEN = {
    ("elger-12-10", "p_b"): "the source compares its result with it and computes nothing",
    ("cengel-back-pressure", "c_p"): "it follows from gamma and R; that is 0.05 % lower",
    ("cengel-co2-duct", "c_p"): "it follows from gamma and R; that is 0.4 % lower",
    ("cengel-shock-exit", "c_p"): "it follows from gamma and R; that is 0.05 % lower",
}

# Examples that cannot be put to the program, by id, with the reason. At present there are none.
NOT_RUN: dict[str, str] = {}
