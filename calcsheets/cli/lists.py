"""The commands that show what the program knows."""

from __future__ import annotations

import typer

from ..errors import UnknownGas
from ..gases import Gas, find_gas, gases
from ..quantities import Unit, all_units
from ..relations import Relation, load_library
from ..sheets.typesetting import plain_text, unit_text
from .app import DONE
from .output import print_json, print_table


def relations(word: str, json: bool) -> int:
    """List relations that a word finds; show one whole if it is named or the only one."""
    found = [relation for relation in load_library().relations if _matches(relation, word)]
    named = [relation for relation in found if relation.name == word] or found
    if json:
        print_json({"relations": [_relation_facts(relation) for relation in named]})
        return DONE
    if len(named) == 1:
        _print_relation(named[0])
        return DONE
    rows = [(r.name, r.title, plain_text(r.published)) for r in named]
    print_table("Relations", ("name", "title", "equation"), rows)
    return DONE


def _matches(relation: Relation, word: str) -> bool:
    wanted = word.casefold()
    symbols = {symbol.quantity for symbol in relation.symbols}
    text = f"{relation.name} {relation.title} {relation.chapter} {relation.source}".casefold()
    return word in symbols or wanted in text


def _print_relation(relation: Relation) -> None:
    typer.echo(f"{relation.title} ({relation.name}, chapter {relation.chapter})")
    typer.echo(f"  {plain_text(relation.published)}")
    typer.echo(f"  source: {relation.source}")
    for symbol in relation.symbols:
        unit = unit_text(symbol.definition.unit)
        typer.echo(f"  {symbol}: {symbol.definition.title}{f', {unit}' if unit else ''}")
    for limit in relation.limits:
        typer.echo(f"  limit: {plain_text(limit.condition)}: {limit.reason}")
    for assumption in relation.assumptions:
        typer.echo(f"  assumes: {assumption}")
    for caution in relation.cautions:
        typer.echo(f"  caution: {caution}")
    if relation.errs:
        typer.echo(f"  errs: {relation.errs}")


def _relation_facts(relation: Relation) -> dict[str, object]:
    return {
        "name": relation.name,
        "title": relation.title,
        "chapter": relation.chapter,
        "equation": plain_text(relation.published),
        "source": str(relation.source),
        "symbols": [str(symbol) for symbol in relation.symbols],
    }


def gases_known(word: str, json: bool) -> int:
    """List the gases whose name a word is part of."""
    found = [gas for gas in gases().values() if _names(gas, word)]
    if not found:
        raise UnknownGas(word, _near(word))
    if json:
        print_json({"gases": [_gas_facts(gas) for gas in found]})
        return DONE
    rows = [
        (gas.key, gas.formula, gas.molar_mass.value.text, gas.molar_heat.value.text, gas.title)
        for gas in found
    ]
    print_table("Gases at 25 °C", ("name", "formula", "molar mass", "heat capacity", "title"), rows)
    return DONE


def _names(gas: Gas, word: str) -> bool:
    names = (gas.key, gas.title, gas.formula, *gas.aliases)
    return any(word.casefold() in name.casefold() for name in names)


def _near(word: str) -> tuple[str, ...]:
    try:
        return (find_gas(word).key,)
    except UnknownGas as problem:
        return problem.near


def _gas_facts(gas: Gas) -> dict[str, object]:
    return {
        "name": gas.key,
        "title": gas.title,
        "formula": gas.formula,
        "molar_mass": gas.molar_mass.value.text,
        "molar_mass_source": gas.molar_mass.source,
        "molar_heat_capacity": gas.molar_heat.value.text,
        "molar_heat_capacity_source": gas.molar_heat.source,
        "range": [gas.low.text, gas.high.text],
    }


def units_known(word: str, json: bool) -> int:
    """List the units whose name or alias a word is part of."""
    wanted = word.casefold()
    found = [
        unit
        for unit in all_units()
        if any(wanted in name.casefold() for name in (unit.name, *unit.aliases))
    ]
    if json:
        print_json({"units": [_unit_facts(unit) for unit in found]})
        return DONE
    rows = [
        (u.name, ", ".join(alias for alias in u.aliases if alias), u.kind.value, str(u.dimension))
        for u in found
    ]
    print_table("Units", ("unit", "also written", "kind", "in SI base units"), rows)
    return DONE


def _unit_facts(unit: Unit) -> dict[str, object]:
    return {
        "unit": unit.name,
        "aliases": list(unit.aliases),
        "kind": unit.kind.value,
        "dimension": str(unit.dimension),
        "factor": str(unit.factor),
        "reference": unit.reference,
    }
