"""The page of relations, made from the library: ``python -m calcsheets.sheets.library_page``."""

from __future__ import annotations

from collections.abc import Iterator

from ..expressions import Symbol
from ..relations import INTERVALS, Chapter, Course, Relation, load_library
from ..relations.roles import ROLE_TITLES
from .typesetting import plain_text, symbol_text, unit_text


def relations_page() -> str:
    """Return the page as Markdown."""
    library = load_library()
    return "\n".join(["# Relations", "", *_intro(len(library.relations)), *_chapters()]) + "\n"


def _intro(count: int) -> Iterator[str]:
    yield (
        f"{count} relations, from the library of the program. "
        "*From memory* means that the source was not open when the relation was written down: "
        "confirm the clause in the source before you rely on it. "
        "Roles: 1 and 2 are the stations of a process, s and b the stations upstream and "
        "downstream of an orifice."
    )
    yield ""


def _chapters() -> Iterator[str]:
    for chapter in load_library().chapters:
        yield from _chapter(chapter)


def _chapter(chapter: Chapter) -> Iterator[str]:
    yield f"## {chapter.title}"
    yield ""
    for process in chapter.processes:
        through = "; names the orifice that the gas passes" if process.needs_through else ""
        yield f"- process `{process.name}`: {process.title}{through}"
    if chapter.processes:
        yield ""
    for relation in chapter.relations:
        yield from _relation(relation)
    for regime in chapter.regimes:
        yield f"### {regime.title}"
        yield ""
        for condition, outcome in regime.cases:
            yield f"    {outcome} if {plain_text(condition)}"
        yield f"    {regime.otherwise} if not"
        yield ""
        yield f"- regime test `{regime.name}`: the first line that holds"
        yield f"- offered by: {', '.join(regime.offered_by)}"
        yield f"- source: {regime.source}; known: {regime.source.known}"
        yield ""
    for course in chapter.courses:
        yield from _course(course)


def _course(course: Course) -> Iterator[str]:
    yield f"### {course.title}"
    yield ""
    for statement in course.statements:
        yield f"    {plain_text(statement)}"
    yield ""
    yield f"- course `{course.name}`: {symbol_text(course.running)} in {INTERVALS} intervals"
    yield f"- offered by: {', '.join(course.offered_by)}"
    yield f"- source: {course.source}; known: {course.source.known}"
    yield ""


def _relation(relation: Relation) -> Iterator[str]:
    yield f"### {relation.title}"
    yield ""
    yield f"    {plain_text(relation.published)}"
    yield ""
    yield f"- name: `{relation.name}`"
    yield f"- quantities: {'; '.join(_symbol(symbol) for symbol in relation.symbols)}"
    yield f"- offered by: {', '.join(relation.offered_by)}"
    regimes = [
        " or ".join(outcomes) + (f" {ROLE_TITLES[role]}" if role else "")
        for role, outcomes in relation.uses
    ]
    if regimes:
        yield f"- regime: {'; '.join(regimes)}"
    yield f"- source: {relation.source}; known: {relation.source.known}"
    for limit in relation.limits:
        yield f"- limit: {plain_text(limit.condition)}: {limit.reason}"
    for assumption in relation.assumptions:
        yield f"- assumes: {assumption}"
    for caution in relation.cautions:
        yield f"- caution: {caution}"
    if relation.errs:
        yield f"- errs: {relation.errs}"
    yield ""


def _symbol(symbol: Symbol) -> str:
    unit = unit_text(symbol.definition.unit)
    return f"{symbol_text(symbol)} = {symbol.definition.title}{f', {unit}' if unit else ''}"


if __name__ == "__main__":
    print(relations_page(), end="")
