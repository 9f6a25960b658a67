"""Checkable calculation sheets for compressible gas flow.

>>> import calcsheets
>>> brief = calcsheets.read_brief("examples/receiver-letdown.toml")
>>> record = calcsheets.calculate(brief, inputs={"p_0@receiver": "12.4 bar(g)"})
>>> record.value("regime@orifice")
'choked'
"""

from .brief import Brief, parse_brief, read_brief
from .calculation import calculate
from .errors import CalcsheetsError
from .record import Record

__all__ = ["Brief", "CalcsheetsError", "Record", "calculate", "parse_brief", "read_brief"]
