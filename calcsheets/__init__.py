"""Checkable calculation sheets for compressible gas flow.

>>> import calcsheets
>>> brief = calcsheets.read_brief("examples/receiver-letdown.toml")
>>> record = calcsheets.calculate(brief, inputs={"p_0@receiver": "12.4 bar(g)"})
>>> record.value("regime@orifice")
'choked'
"""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

from .brief import Brief, parse_brief, read_brief
from .calculation import calculate
from .errors import CalcsheetsError
from .record import Record

if TYPE_CHECKING:
    from .package import Package, write_sheets

__all__ = [
    "Brief",
    "CalcsheetsError",
    "Package",
    "Record",
    "calculate",
    "parse_brief",
    "read_brief",
    "write_sheets",
]


def __getattr__(name: str) -> Any:
    """Import the renderers only when they are asked for: they take most of the start-up."""
    if name in ("Package", "write_sheets"):
        from . import package

        return getattr(package, name)
    raise AttributeError(f"module {__name__!r} has no attribute {name!r}")
