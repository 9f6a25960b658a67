"""The live workbook."""

from .book import workbook_bytes

__all__ = ["workbook_bytes"]
