"""The live workbook."""

from .book import Workbook, make_workbook
from .page import FormulaCell

__all__ = ["FormulaCell", "Workbook", "make_workbook"]
