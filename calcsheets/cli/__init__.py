"""Stage 12, command line: arguments become calls of the stages."""

from __future__ import annotations


def main() -> None:
    """Run the program."""
    from .app import run

    run()


__all__ = ["main"]
