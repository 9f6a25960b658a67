"""Stage 1, vocabulary: names, symbols, dimensions, bounds and the closed list of units."""

from .catalogue import BAROMETRIC, GAUGE_OF, catalogue
from .dimension import Dimension
from .measured import (
    Measured,
    default_unit,
    find_unit,
    quantity_given,
    quantity_stated,
    read_measured,
)
from .quantity import Kind, Notation, Quantity, Variable
from .reference_states import REFERENCE_STATES, ReferenceState
from .unit import Unit
from .units import all_units, units_by_name

__all__ = [
    "BAROMETRIC",
    "GAUGE_OF",
    "REFERENCE_STATES",
    "Dimension",
    "Kind",
    "Measured",
    "Notation",
    "Quantity",
    "ReferenceState",
    "Unit",
    "Variable",
    "all_units",
    "catalogue",
    "default_unit",
    "find_unit",
    "quantity_given",
    "quantity_stated",
    "read_measured",
    "units_by_name",
]
