"""The workbook of a record."""
