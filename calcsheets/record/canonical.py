"""The canonical form of a record: RFC 8785 JSON, the same bytes for the same record."""

from __future__ import annotations

import hashlib
import json
import types
import typing
from collections.abc import Mapping
from dataclasses import fields, is_dataclass
from typing import Any

import rfc8785

from ..errors import DefinitionError
from ..expressions import (
    Condition,
    Equation,
    Expr,
    expression_from_mathml,
    expression_to_mathml,
)
from .model import Record

_LARGEST = 50_000_000


def record_bytes(record: Record) -> bytes:
    """Return the canonical JSON of a record, UTF-8."""
    return rfc8785.dumps(to_plain(record))


def digest_of(record: Record) -> str:
    """Return the SHA-256 of the canonical JSON, in hexadecimal."""
    return hashlib.sha256(record_bytes(record)).hexdigest()


def to_plain(value: Any) -> Any:
    """Return a value of the record as JSON would hold it; expressions as Content MathML."""
    if isinstance(value, Expr | Equation | Condition):
        return expression_to_mathml(value)
    if is_dataclass(value):
        return {item.name: to_plain(getattr(value, item.name)) for item in fields(value)}
    if isinstance(value, tuple):
        return [to_plain(item) for item in value]
    return value


def read_record(content: bytes) -> Record:
    """Return the record that :func:`record_bytes` wrote.

    Raises:
        DefinitionError: if the content is not such a record.
    """
    if len(content) > _LARGEST:
        raise DefinitionError("record", f"it has more than {_LARGEST} bytes")
    try:
        plain = json.loads(content)
        record = _from_plain(Record, plain)
    except (ValueError, KeyError, TypeError, RecursionError) as problem:
        raise DefinitionError("record", f"it cannot be read ({problem})") from problem
    if not isinstance(record, Record):
        raise DefinitionError("record", "it is none")
    return record


def _from_plain(kind: Any, value: Any) -> Any:
    origin = typing.get_origin(kind)
    if origin is tuple:
        (item, *_) = typing.get_args(kind)
        return tuple(_from_plain(item, entry) for entry in value)
    if origin in (types.UnionType, typing.Union):
        return _from_union(typing.get_args(kind), value)
    if isinstance(kind, type) and issubclass(kind, Expr | Equation | Condition):
        statement = expression_from_mathml(value)
        if not isinstance(statement, kind):
            raise ValueError(f"expected {kind.__name__}")
        return statement
    if is_dataclass(kind) and isinstance(kind, type):
        return _dataclass_from(kind, value)
    if kind is float and isinstance(value, int) and not isinstance(value, bool):
        return float(value)
    if not isinstance(value, kind) or (isinstance(value, bool) and kind is not bool):
        raise ValueError(f"expected {kind.__name__}, found {type(value).__name__}")
    return value


def _from_union(kinds: tuple[Any, ...], value: Any) -> Any:
    if value is None:
        if type(None) not in kinds:
            raise ValueError("a value is missing")
        return None
    problems = []
    for kind in kinds:
        if kind is type(None):
            continue
        try:
            return _from_plain(kind, value)
        except ValueError as problem:
            problems.append(str(problem))
    raise ValueError("; ".join(problems))


def _dataclass_from(kind: type, value: Any) -> Any:
    if not isinstance(value, Mapping):
        raise ValueError(f"expected an object for {kind.__name__}")
    hints = typing.get_type_hints(kind)
    names = [item.name for item in fields(kind)]
    extra = sorted(set(value) - set(names))
    if extra:
        raise ValueError(f"unknown field {extra[0]} in {kind.__name__}")
    return kind(**{name: _from_plain(hints[name], value[name]) for name in names})
