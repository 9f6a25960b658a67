"""Stage 9, checking: what the program computed is found again by other means."""

from .finding import Finding
from .findings import check_record
from .recalculation import ENGINE, check_workbook, recalculated, require_same_values

__all__ = [
    "ENGINE",
    "Finding",
    "check_record",
    "check_workbook",
    "recalculated",
    "require_same_values",
]
