"""Stage 8, sheets: a record becomes a workbook and a PDF; nothing is computed here."""
