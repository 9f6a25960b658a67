"""Reading the published values, and one relation solved for them."""

from __future__ import annotations

import tomllib
from collections.abc import Iterator, Mapping
from decimal import Decimal
from fractions import Fraction
from pathlib import Path
from typing import Any

from calcsheets.relations import load_library
from calcsheets.solving import Question, exact_ball, midpoint, solve, working_precision

FOLDER = Path(__file__).parent
PROVENANCES = {"read in the source", "library", "common practice", "from memory"}
RELATIONS = {relation.name: relation for relation in load_library().relations}

Row = Mapping[str, Any]


def rows(name: str) -> Iterator[Row]:
    """The rows of one file, each with its provenance."""
    table = tomllib.loads((FOLDER / f"{name}.toml").read_text("utf-8"))
    for row in table["row"]:
        yield {"provenance": table["source"].get("provenance", ""), **row}


def half_unit(printed: str) -> Decimal:
    """Half a unit of the last printed digit."""
    exponent = Decimal(printed).as_tuple().exponent
    assert isinstance(exponent, int)
    return Decimal(1).scaleb(exponent) / 2


def tolerance(row: Row, column: str) -> Decimal:
    """The tolerance that the row states for a column, else half a unit of the last digit."""
    stated = row.get(f"tolerance_{column}", row.get("tolerance"))
    return Decimal(stated) if stated else half_unit(row[column])


def solved(relation: str, unknown: str, branch: str = "", **values: str) -> float:
    """One relation solved for one unknown.

    Args:
        relation: name of the relation.
        unknown: symbol, with its role behind a double underscore: ``p__2``.
        branch: stated branch, empty for none.
        values: decimals of the other symbols, written alike.
    """
    item = RELATIONS[relation]
    named = {str(symbol).replace(".", "__"): symbol for symbol in item.symbols}
    with working_precision():
        known = {named[name]: exact_ball(Fraction(text)) for name, text in values.items()}
        question = Question(item, named[unknown], known, branch, unknown, "the table")
        return midpoint(solve(question).value)


def near(found: float, printed: str, allowed: Decimal) -> bool:
    """Whether a value lies within a tolerance of what is printed; not more than counts."""
    return abs(Decimal(found) - Decimal(printed)) <= allowed * Decimal("1.0000001")
