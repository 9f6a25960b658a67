"""The processes that throttle a stream: meters, nozzles, restrictions, valves, components.

The names stand here because chapters on streams offer their relations to all of them.
"""

from __future__ import annotations

CORNER = "orifice plate, corner tappings"
D_AND_HALF = "orifice plate, D and D/2 tappings"
FLANGE = "orifice plate, flange tappings"
ORIFICE_PLATES = (CORNER, D_AND_HALF, FLANGE)
QUARTER_CIRCLE = "quarter-circle orifice plate"
ECCENTRIC = "eccentric orifice plate"
SPECIAL_PLATES = (QUARTER_CIRCLE, ECCENTRIC)
ISA_1932 = "ISA 1932 nozzle"
LONG_RADIUS = "long radius nozzle"
VENTURI_NOZZLE = "Venturi nozzle"
NOZZLES = (ISA_1932, LONG_RADIUS)
AS_CAST = "Venturi tube, as cast"
MACHINED = "Venturi tube, machined"
WELDED = "Venturi tube, rough-welded sheet-iron"
VENTURI_TUBES = (AS_CAST, MACHINED, WELDED)
METERS = (
    *ORIFICE_PLATES,
    *SPECIAL_PLATES,
    *NOZZLES,
    VENTURI_NOZZLE,
    *VENTURI_TUBES,
)
PLATE_UNCERTAINTY = "flow uncertainty, orifice plate"

TOROIDAL = "critical flow nozzle, toroidal throat"
TOROIDAL_FINE = "critical flow nozzle, accurately machined toroidal throat"
CYLINDRICAL = "critical flow nozzle, cylindrical throat"
CRITICAL_NOZZLES = (TOROIDAL, TOROIDAL_FINE, CYLINDRICAL)

VALVE = "control valve"
VALVE_REDUCED = "control valve between reducers"
VALVES = (VALVE, VALVE_REDUCED)

COMPONENT = "pneumatic component"
COMPONENT_INDEXED = "pneumatic component with subsonic index"
TUBE = "pneumatic tube"
PNEUMATIC = (COMPONENT, COMPONENT_INDEXED, TUBE)
SERIES = "pneumatic components in series"
PARALLEL = "pneumatic components in parallel"

THROTTLES = (*METERS, *CRITICAL_NOZZLES, *VALVES, *PNEUMATIC)
