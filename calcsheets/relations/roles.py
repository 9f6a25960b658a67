"""Roles: whose quantity a symbol of a relation means.

A relation is written once and used at many places. An empty role is the place at which the
relation is offered (a station, or a process of its own); the others are found from there.
A role with any other name is a place of that name, such as a component of a mixture.
"""

from __future__ import annotations

INLET = "1"
OUTLET = "2"
THROUGH = "through"
SUPPLY = "supply"
DISCHARGE = "discharge"
NOW = "now"

ROLE_TITLES = {
    INLET: "at the first station of the process",
    OUTLET: "at the second station of the process",
    THROUGH: "of the orifice that the gas passes",
    SUPPLY: "at the station upstream of that orifice",
    DISCHARGE: "at the station downstream of that orifice",
    NOW: "of the vessel in each row of its course",
}
