"""The JSON Schema of a brief, generated from its form, so that editors complete and check it.

Run ``python -m calcsheets.brief.schema > docs/brief.schema.json`` after a change of the form.

The schema holds what can be seen without understanding units or following names: tables,
keys, types, choices and patterns. Whether a unit fits its quantity, whether a station exists
and whether fractions add to 1 is for the reader alone.
"""

from __future__ import annotations

import json
import sys
from typing import Any

from ..quantities import Kind, catalogue
from ..quantities.measured import LONGEST_TEXT as LONGEST_VALUE
from ..relations import load_library
from .form import DATE_PATTERN, NAME_PATTERN, RESERVED_NAMES, Form, Key, Keys, brief_form
from .gas import BALANCE
from .table import CONTROL, LONGEST_TEXT, MOST_DIGITS

DIALECT = "https://json-schema.org/draft/2020-12/schema"
_NUMBER_PATTERN = r"^\s*[-+−]?(?:[0-9]|\.[0-9])"
_FRACTION_PATTERN = rf"^(?:{BALANCE}|\s*[0-9]{{0,3}}\.?[0-9]{{1,20}}\s*%?\s*)$"

Schema = dict[str, Any]


def brief_schema() -> Schema:
    """Return the JSON Schema (draft 2020-12) of a brief read as TOML."""
    form = brief_form()
    tables: dict[str, Schema] = {
        "calculation": _table(form.calculation),
        "site": _table(form.site),
        "gas": _gas(form),
        "stations": {
            "type": "object",
            "propertyNames": {"pattern": NAME_PATTERN, "not": {"enum": [*RESERVED_NAMES]}},
            "additionalProperties": _table(form.station),
        },
        "path": _list(_leg(form)),
        "wanted": _wanted(form),
        "assumption": _list(_assumption(form)),
        "reference": _list(_table(form.reference)),
        "caution": _list(_table(form.caution)),
    }
    return {
        "$schema": DIALECT,
        "title": "Brief of a calculation",
        "type": "object",
        "properties": {name: tables[name] for name in form.tables},
        "required": list(form.required),
        "additionalProperties": False,
        "$defs": {
            "text": {"type": "string", "maxLength": LONGEST_TEXT, "not": {"pattern": CONTROL}},
            "measured": _measured(),
            "value": {"oneOf": [{"$ref": "#/$defs/measured"}, _value_table(form.value)]},
        },
    }


def _table(keys: Keys) -> Schema:
    """A table of these keys and no others."""
    return {
        "type": "object",
        "properties": {key.name: _key(key) for key in keys.values()},
        "required": [key.name for key in keys.values() if key.required],
        "additionalProperties": False,
    }


def _list(item: Schema) -> Schema:
    return {"type": "array", "items": item}


def _key(key: Key) -> Schema:
    return {"description": key.about, **_content(key)}


def _content(key: Key) -> Schema:
    if key.choices:
        return {"enum": list(key.choices)}
    match key.what:
        case "name":
            return {"type": "string", "pattern": NAME_PATTERN}
        case "key":
            return {"type": "string", "pattern": _variable_pattern()}
        case "date":
            return {"type": "string", "pattern": DATE_PATTERN, "format": "date"}
        case "digits":
            return {"type": "integer", "minimum": 1, "maximum": MOST_DIGITS}
        case "fractions":
            return {
                "type": "object",
                "minProperties": 2,
                "additionalProperties": {"type": "string", "pattern": _FRACTION_PATTERN},
            }
        case "value" | "measured":
            return {"$ref": f"#/$defs/{key.what}"}
    text: Schema = {"$ref": "#/$defs/text"}
    return {**text, "pattern": r"\S"} if key.required else text


def _measured() -> Schema:
    return {
        "description": "A number and its unit, such as 12.0 bar(g).",
        "type": "string",
        "maxLength": LONGEST_VALUE,
        "pattern": _NUMBER_PATTERN,
    }


def _value_table(keys: Keys) -> Schema:
    """A table gives a value, or names an equal; an equal has neither tolerance nor status."""
    return {
        **_table(keys),
        "oneOf": [
            {"required": ["value"]},
            {
                "required": ["same_as"],
                "not": {"anyOf": [{"required": ["tolerance"]}, {"required": ["status"]}]},
            },
        ],
    }


def _gas(form: Form) -> Schema:
    own = [{"required": [key.name]} for key in form.gas.values() if key.what == "value"]
    return {
        **_table(form.gas),
        "anyOf": [{"required": ["name"]}, {"required": ["composition"]}, *own],
        "dependentRequired": {
            "composition": ["by"],
            **{key: ["composition"] for key in ("by", "source", "status")},
        },
        "dependentSchemas": {"composition": {"not": {"anyOf": own}}},
    }


def _leg(form: Form) -> Schema:
    """A process passes an orifice or does not, and has regimes of its own or none."""
    library = load_library()
    rules: list[Schema] = []
    for process in library.processes.values():
        regimes = library.outcomes(process.name)
        through: Schema = {"required": ["through"]}
        then: Schema = through if process.needs_through else {"not": through}
        # the reader takes a regime left empty as one that is not stated
        then["properties"] = {"regime": {"enum": [*regimes, ""]}}
        rules.append({"if": {"properties": {"process": {"const": process.name}}}, "then": then})
    return {**_table(form.leg), "allOf": rules}


def _assumption(form: Form) -> Schema:
    """A hold has an owner."""
    return {
        **_table(form.assumption),
        "if": {"properties": {"status": {"const": "to be confirmed"}}, "required": ["status"]},
        "then": {"properties": {"owner": {"minLength": 1}}, "required": ["owner"]},
    }


def _wanted(form: Form) -> Schema:
    """A quantity at a place, or a state in words, which has neither unit nor criterion."""
    measured_only = {"unit", "digits", "at_most", "at_least"}
    words = {name: key for name, key in form.wanted.items() if name not in measured_only}
    return {
        "type": "object",
        "minProperties": 1,
        "patternProperties": {
            _variable_pattern(): _table(form.wanted),
            _variable_pattern(Kind.STATE): _table(words),
        },
        "additionalProperties": False,
    }


def _variable_pattern(kind: Kind | None = None) -> str:
    """A quantity at a place: states in words for their kind, all others without one."""
    symbols = "|".join(
        symbol for symbol, q in catalogue().items() if (q.kind is Kind.STATE) == (kind is not None)
    )
    return f"^(?:{symbols})@{NAME_PATTERN[1:]}"


def main() -> None:
    """Write the schema to standard output."""
    sys.stdout.write(json.dumps(brief_schema(), indent=1, ensure_ascii=False) + "\n")


if __name__ == "__main__":
    main()
