"""Nothing but the fonts of the templates folder is ever fetched."""

from __future__ import annotations

from pathlib import Path
from typing import Any
from urllib.parse import unquote, urlsplit

from weasyprint.urls import URLFetcher

from ...errors import OutputError


class FontFetcher(URLFetcher):  # type: ignore[misc]  # the library has no types
    """Gives out the fonts of one folder and refuses everything else.

    Args:
        folder: the folder of fonts.
    """

    def __init__(self, folder: Path) -> None:
        super().__init__(allowed_protocols=("file",))
        self._folder = folder.resolve()

    def fetch(self, url: str, headers: Any = None) -> Any:
        """Return a font.

        Raises:
            OutputError: for any other address.
        """
        parts = urlsplit(url)
        path = Path(unquote(parts.path)).resolve()
        if parts.scheme != "file" or path.parent != self._folder or path.suffix != ".woff2":
            raise OutputError(url, "a sheet is made without it", "Remove it from the template")
        return super().fetch(path.as_uri(), headers)
