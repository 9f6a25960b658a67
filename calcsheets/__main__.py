"""``python -m calcsheets`` does what the command ``calcsheets`` does."""

from .cli import main

main()
