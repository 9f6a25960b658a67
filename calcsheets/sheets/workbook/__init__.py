"""The live workbook."""

from .book import Workbook, make_workbook
from .page import DIFFERENCE_FORMAT, FormulaCell

__all__ = ["DIFFERENCE_FORMAT", "FormulaCell", "Workbook", "make_workbook"]
