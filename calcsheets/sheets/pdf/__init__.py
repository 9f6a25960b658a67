"""The printed sheet: a record becomes PDF/A-3a."""

from .document import PAPERS, Attachment, pdf_bytes, render_html, write_pdf

__all__ = ["PAPERS", "Attachment", "pdf_bytes", "render_html", "write_pdf"]
