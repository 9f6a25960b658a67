"""Files are written whole or not at all."""

from __future__ import annotations

import os
import tempfile
from pathlib import Path

from .errors import OutputError


def make_folder(path: Path) -> None:
    """Make a folder and those above it.

    Raises:
        OutputError: if it cannot be made.
    """
    try:
        path.mkdir(parents=True, exist_ok=True)
    except OSError as problem:
        raise _failed(path, problem) from problem


def write_whole(path: Path, content: bytes) -> None:
    """Write a file through a temporary one, so that no reader ever sees half of it.

    Raises:
        OutputError: if it cannot be written; an existing file is then left as it was.
    """
    temporary = ""
    try:
        handle, temporary = tempfile.mkstemp(dir=path.parent, prefix=f".{path.name}.")
        with os.fdopen(handle, "wb") as file:
            file.write(content)
            file.flush()
            os.fsync(file.fileno())
        Path(temporary).chmod(0o644)
        Path(temporary).replace(path)
    except OSError as problem:
        if temporary:
            Path(temporary).unlink(missing_ok=True)
        raise _failed(path, problem) from problem


def _failed(path: Path, problem: OSError) -> OutputError:
    reason = (problem.strerror or "cannot be written").lower()
    return OutputError(str(path), reason, "Free space or choose another folder with --out")
