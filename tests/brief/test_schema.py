"""The published JSON Schema and the reader accept the same briefs, as far as structure goes.

What needs an understanding of units, names or numbers is left to the reader alone: a unit of
another dimension, a bound, a station that does not exist, fractions that do not add to 1. So
is TOML's difference between 4 and 4.0, which JSON does not know.
"""

from __future__ import annotations

import copy
import json
import subprocess
import sys
import tomllib
from collections.abc import Iterator
from typing import Any

import jsonschema
import pytest

from calcsheets.brief import brief_form, parse_brief
from calcsheets.brief.form import Key, Keys
from calcsheets.brief.schema import brief_schema
from calcsheets.errors import BriefError
from calcsheets.quantities import Quantity, catalogue, default_unit
from tests.brief.toml_writer import write_toml
from tests.conftest import EXAMPLES, ROOT

Document = dict[str, Any]
Path_ = tuple[str | int, ...]

PUBLISHED = ROOT / "docs" / "brief.schema.json"
FORM = brief_form()
CHECKER = jsonschema.Draft202012Validator(brief_schema())
GOOD: Document = tomllib.loads((ROOT / "tests" / "brief" / "good.toml").read_text("utf-8"))
MIXTURE = {"by": "mole", "composition": {"nitrogen": "79 %", "oxygen": "balance"}}


def reader_accepts(document: Document) -> bool:
    try:
        parse_brief(write_toml(document))
    except BriefError:
        return False
    return True


def value_for(symbol: str) -> str:
    """A value within the bounds of a quantity, with its unit."""
    unit = default_unit(catalogue()[symbol]).name
    number = {
        "gamma": "1.4",
        "gamma_4": "1.4",
        "x": "0.5",
        "w": "0.5",
        "p_atm": "98200",
        "T_ref": "288.15",
    }
    quantity = catalogue()[symbol]
    inside = "1" if quantity.low <= 1 <= quantity.high else _between(quantity)
    return f"{number.get(symbol, inside)} {'' if unit == '1' else unit}".strip()


def _between(quantity: Quantity) -> str:
    return str(float((quantity.low + quantity.high) / 2))


def content_for(key: Key) -> Any:
    """Something that a key may hold."""
    if key.choices:
        return key.choices[0]
    if key.what == "value":
        return value_for(key.name)
    return {"date": "2026-03-31", "digits": 3}.get(key.what, "some text")


def at(document: Document, path: Path_) -> Any:
    for part in path:
        document = document[part]  # type: ignore[index]
    return document


def changed(path: Path_, content: Any, base: Document = GOOD) -> Document:
    """The good document with one key set; ``None`` removes it."""
    document = copy.deepcopy(base)
    table = at(document, path[:-1])
    if content is None:
        table.pop(path[-1], None)
    else:
        table[path[-1]] = content
    return document


def with_every_table() -> Document:
    document = copy.deepcopy(GOOD)
    document["caution"] = [{"text": "Cold gas."}]
    document["wanted"]["regime@orifice"] = {"title": "Choked?"}
    return document


FULL = with_every_table()
TABLES: tuple[tuple[Path_, Keys], ...] = (
    (("calculation",), FORM.calculation),
    (("site",), FORM.site),
    (("gas",), FORM.gas),
    (("stations", "receiver"), FORM.station),
    (("stations", "receiver", "p_0"), FORM.value),
    (("path", 0), FORM.leg),
    (("wanted", "mdot@orifice"), FORM.wanted),
    (("assumption", 0), FORM.assumption),
    (("reference", 0), FORM.reference),
    (("caution", 0), FORM.caution),
)
SPECIAL = {"composition", "by", "same_as", "through", "regime", "name", "from", "to", "process"}
FITTING = {
    "value": "7 bar(g)",
    "tolerance": "0.1 bar",
    "unit": "kg/h",
    "at_most": "900 kg/h",
    "at_least": "900 kg/h",
}


def one_key_at_a_time() -> Iterator[tuple[str, Document]]:
    """Every key with something that it may hold."""
    for path, keys in TABLES:
        for key in keys.values():
            gauge_twice = path[-1] in ("receiver", "p_0") and key.name in ("p_0", "p_0g")
            of_a_composition = path == ("gas",) and key.name in ("source", "status")
            if key.name not in SPECIAL and not gauge_twice and not of_a_composition:
                content = FITTING.get(key.name) or content_for(key)
                if key.what == "value" and key.name in at(FULL, path):
                    continue
                name = f"{'.'.join(map(str, path))}.{key.name}"
                yield name, changed((*path, key.name), content, FULL)


def whole_documents() -> Iterator[tuple[str, Document]]:
    yield "good", GOOD
    yield "full", FULL
    for name in ("nozzle", "orifice"):
        yield name, tomllib.loads((ROOT / "tests/brief" / f"{name}.toml").read_text("utf-8"))
    for example in EXAMPLES:
        yield example.stem, tomllib.loads(example.read_text("utf-8"))
    yield "mixture", changed(("gas",), MIXTURE)
    yield "named mixture", changed(("gas",), {"name": "some air", **MIXTURE})
    yield (
        "mixture with its source",
        changed(("gas",), {"source": "GC-1", "status": "verified", **MIXTURE}),
    )
    yield "own gas", changed(("gas",), {"gamma": "1.4", "M_w": "28.96 g/mol"})
    yield "equality", changed(("stations", "header", "p"), {"same_as": "p_0@emptied"})
    yield (
        "why equal",
        changed(("stations", "header", "p"), {"same_as": "p_0@emptied", "source": "DS-1"}),
    )
    yield "stated regime", changed(("path", 0, "regime"), "choked")
    yield (
        "no site, path, stations",
        {name: GOOD[name] for name in ("calculation", "gas")} | {"wanted": {"R@gas": {}}},
    )


def wrong_types() -> Iterator[tuple[str, Document]]:
    """Every key with a value of each wrong type."""
    for path, keys in TABLES:
        for key in keys.values():
            wrong: list[Any] = [True, 1.5, ["x"], {"zzz": "x"}]
            wrong.append("x" if key.what in ("digits", "fractions") else 7)
            for content in wrong:
                name = f"{'.'.join(map(str, path))}.{key.name} = {content!r}"
                yield name, changed((*path, key.name), content, FULL)
    for table in FORM.tables:
        for content in ("x", 7, [1], True):
            yield f"{table} = {content!r}", changed((table,), content, FULL)
    for path in (("stations", "receiver"), ("wanted", "mdot@orifice"), ("path", 0)):
        yield f"{path} = text", changed(path, "x", FULL)


def wrong_contents() -> Iterator[tuple[str, Document]]:
    """Every key with a text that its choices, its pattern or its length exclude."""
    texts = {
        "name": ["Big", "1st", "two words", "", "a-b"],
        "key": ["p", "p@", "@header", "p@Header", "zzz@header", "regime@orifice"],
        "date": ["31.03.2026", "2026-3-1", "", "soon"],
        "digits": [0, 13, -1],
        "value": ["", "bar", "x1 bar", "1 " + "x" * 80, "٣ bar"],
        "measured": ["", "kg", "1 " + "x" * 80],
        "text": ["a\u0007b", "x" * 2001],
        "fractions": [{}, {"air": "1"}, {"nitrogen": "much", "oxygen": "little"}],
    }
    for path, keys in TABLES:
        for key in keys.values():
            wrong = ["zzz", ""] if key.choices else texts[key.what]
            for content in [*wrong, *([" "] if key.required else [])]:
                name = f"{'.'.join(map(str, path))}.{key.name} = {str(content)[:20]!r}"
                yield name, changed((*path, key.name), content, FULL)


def unknown_and_missing() -> Iterator[tuple[str, Document]]:
    yield "unknown table", changed(("zzz",), {})
    for name in FORM.required:
        yield f"no {name}", changed((name,), None)
    for path, keys in TABLES:
        yield f"unknown key in {path}", changed((*path, "zzz"), "x", FULL)
        for key in keys.values():
            if key.required:
                yield f"no {key.name} in {path}", changed((*path, key.name), None, FULL)


def wrong_combinations() -> Iterator[tuple[str, Document]]:
    header = ("stations", "header", "p")
    yield "value and same_as", changed(header, {"value": "1 bar(g)", "same_as": "p@receiver"})
    yield "neither", changed(header, {"source": "DS-1"})
    for key, content in (("tolerance", "1 %"), ("status", "verified")):
        yield f"equality with {key}", changed(header, {"same_as": "p@receiver", key: content})
    yield "no gas", changed(("gas",), {})
    yield "by alone", changed(("gas",), {"name": "air", "by": "mole"})
    yield "source of no composition", changed(("gas",), {"name": "air", "source": "GC-1"})
    yield "status of no composition", changed(("gas",), {"name": "air", "status": "verified"})
    yield "no by", changed(("gas",), {"composition": MIXTURE["composition"]})
    yield "mixture and own", changed(("gas",), {"gamma": "1.4", **MIXTURE})
    yield "one gas mixed", changed(("gas",), {"by": "mole", "composition": {"air": "0.5"}})
    yield "reserved station", changed(("stations", "gas"), {})
    yield "capital station", changed(("stations", "Vent"), {})
    yield "orifice through", changed(("path", 0, "through"), "orifice")
    yield "let-down through nothing", changed(("path", 1, "through"), None)
    yield "regime of another", changed(("path", 1, "regime"), "choked")
    yield "regime of none", changed(("path", 0, "regime"), "shocked")
    yield "nothing wanted", changed(("wanted",), {})
    for key in ("mdot", "mdot@", "@orifice", "zzz@orifice", "mdot@Orifice"):
        yield f"wanted {key}", changed(("wanted", key), {})
    for key, content in (("unit", "1"), ("digits", 3), ("at_most", "1"), ("at_least", "1")):
        yield f"regime with {key}", changed(("wanted", "regime@orifice"), {key: content})
    yield "hold without owner", changed(("assumption", 0, "owner"), None)
    yield "hold with empty owner", changed(("assumption", 0, "owner"), "")


def names_of(documents: list[tuple[str, Document]]) -> list[str]:
    return [name for name, _ in documents]


RIGHT = [*whole_documents(), *one_key_at_a_time()]
WRONG = [*unknown_and_missing(), *wrong_combinations(), *wrong_contents(), *wrong_types()]


def test_the_published_schema_is_current() -> None:
    assert json.loads(PUBLISHED.read_text("utf-8")) == brief_schema()


def test_the_command_writes_the_published_bytes() -> None:
    command = [sys.executable, "-m", "calcsheets.brief.schema"]
    written = subprocess.run(command, capture_output=True, check=True, cwd=ROOT).stdout
    assert written == PUBLISHED.read_bytes()


def test_the_schema_is_one() -> None:
    jsonschema.Draft202012Validator.check_schema(brief_schema())


@pytest.mark.parametrize(("name", "document"), RIGHT, ids=names_of(RIGHT))
def test_schema_and_reader_accept_the_right_structure(name: str, document: Document) -> None:
    assert [error.message for error in CHECKER.iter_errors(document)] == []
    parse_brief(write_toml(document))


def test_schema_and_reader_refuse_the_same_wrong_structures() -> None:
    """One document after another, so that a disagreement lists all names that disagree."""
    assert len(WRONG) > 500
    verdicts = {n: (CHECKER.is_valid(d), reader_accepts(d)) for n, d in WRONG}
    assert {n: v for n, v in verdicts.items() if v != (False, False)} == {}
