"""Values as TOML text, enough for briefs: the standard library reads TOML and does not write it."""

from __future__ import annotations

from typing import Any


def write_toml(tables: dict[str, Any]) -> str:
    """Return TOML with one line for each top-level table."""
    return "".join(f"{_text(name)} = {_value(value)}\n" for name, value in tables.items())


def _value(value: Any) -> str:
    match value:
        case bool():
            return str(value).lower()
        case int() | float():
            return repr(value)
        case str():
            return _text(value)
        case list():
            return f"[{', '.join(_value(item) for item in value)}]"
        case dict():
            return f"{{{', '.join(f'{_text(k)} = {_value(v)}' for k, v in value.items())}}}"
    raise TypeError(type(value).__name__)


def _text(text: str) -> str:
    def escaped(c: str) -> str:
        return c if c.isprintable() and c not in '"\\' else f"\\U{ord(c):08x}"

    return f'"{"".join(escaped(c) for c in text)}"'
