"""What the tests share: the examples, and the programs that look at our files from outside."""

from __future__ import annotations

import os
import shutil
from pathlib import Path

import pytest

ROOT = Path(__file__).resolve().parent.parent
EXAMPLES = tuple(sorted((ROOT / "examples").glob("*.toml")))


def require_program(name: str) -> str:
    """Return the path of an outside program; without it skip, but never in CI."""
    found = shutil.which(name)
    if found is None:
        if os.environ.get("CI"):
            pytest.fail(f"{name} is not installed; .ci/run must install it")
        pytest.skip(f"{name} is not installed: see the prerequisites for tests in README.md")
    return found
