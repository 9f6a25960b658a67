"""The processes in ducts of constant area, and what is said of them alike.

The names stand here because chapters on streams offer their relations to all of them.
"""

from __future__ import annotations

from .relation import station_of

FANNO = "duct with friction, adiabatic"
ISOTHERMAL_DUCT = "duct with friction, isothermal"
RAYLEIGH = "heat addition at constant area"
ROUGH_DUCTS = (FANNO, ISOTHERMAL_DUCT)
DUCTS = (*ROUGH_DUCTS, RAYLEIGH)

FANNO_END = "open end, adiabatic duct"
ISOTHERMAL_END = "open end, isothermal duct"
RAYLEIGH_END = "open end, heated duct"
OPEN_ENDS = (FANNO_END, ISOTHERMAL_END, RAYLEIGH_END)

FANNO_STATION = station_of(FANNO)
ISOTHERMAL_STATION = station_of(ISOTHERMAL_DUCT)
RAYLEIGH_STATION = station_of(RAYLEIGH)

ONE_DIMENSIONAL = "steady one-dimensional flow in a duct of constant area"
NO_HEAT = "no heat through the wall"
NO_FRICTION = "no friction at the wall"
