"""What can happen to a vessel, and what is said of it alike everywhere."""

from __future__ import annotations

LET_DOWN_ISOTHERMAL = "let-down, isothermal"
LET_DOWN_ADIABATIC = "let-down, adiabatic"
FILLING_ISOTHERMAL = "filling, isothermal"
FILLING_ADIABATIC = "filling, adiabatic"
LET_DOWNS = (LET_DOWN_ISOTHERMAL, LET_DOWN_ADIABATIC)
FILLINGS = (FILLING_ISOTHERMAL, FILLING_ADIABATIC)
CHOKED_THROUGHOUT = "choked throughout"
UNCHOKED_AT_THE_END = "unchoked at the end"

UNIFORM = "the gas in the vessel is uniform and at rest"
COLD = (
    "A let-down cools the gas and the wall: check the vessel and pipe metal against its "
    "minimum design temperature, and the gas for condensation and hydrates.",
)
HOT = (
    "Filling heats the gas; in oxygen service fast filling can ignite materials by compression.",
)
