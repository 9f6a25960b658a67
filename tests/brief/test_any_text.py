"""Whatever text stands in a brief, reading it gives a brief or a sentence, and nothing else."""

from __future__ import annotations

import tomllib
from pathlib import Path
from typing import Any

from hypothesis import example, given, settings
from hypothesis import strategies as st

from calcsheets.brief import Brief, parse_brief
from calcsheets.errors import BriefError
from tests.brief.toml_writer import write_toml

HERE = Path(__file__).parent
TEXT = (HERE / "good.toml").read_text("utf-8")
LINES = TEXT.split("\n")
GOOD: dict[str, Any] = tomllib.loads(TEXT)

scalars = (
    st.booleans()
    | st.integers()
    | st.floats(allow_nan=False, allow_infinity=False)
    | st.text(st.characters(codec="utf-8"), max_size=20)
    | st.sampled_from(["1 bar(g)", "p@header", "balance", "0.5", "2026-03-31", "orifice", "air"])
)
contents = st.recursive(
    scalars,
    lambda inner: (
        st.lists(inner, max_size=3)
        | st.dictionaries(
            st.sampled_from(["value", "same_as", "unit", "zzz", "p", ""]), inner, max_size=3
        )
    ),
    max_leaves=5,
)


def places(document: Any, path: tuple[Any, ...] = ()) -> list[tuple[Any, ...]]:
    """Every place in a document, as the keys that lead to it."""
    items: list[tuple[Any, Any]] = []
    if isinstance(document, dict):
        items = list(document.items())
    elif isinstance(document, list):
        items = list(enumerate(document))
    return [p for key, inner in items for p in ((*path, key), *places(inner, (*path, key)))]


def with_content(document: Any, path: tuple[Any, ...], content: Any) -> Any:
    if not path:
        return content
    changed: Any = list(document) if isinstance(document, list) else dict(document)
    changed[path[0]] = with_content(document[path[0]], path[1:], content)
    return changed


def read_or_refuse(text: str) -> None:
    try:
        found = parse_brief(text)
    except BriefError as problem:
        message = str(problem)
        assert message.isprintable()
        assert 0 <= problem.line <= text.count("\n") + 1
    else:
        assert isinstance(found, Brief)


@settings(deadline=None)
@given(text=st.text(max_size=200))
@example("\x00")
@example("a = 1e999999999")
@example("[a]\n[a.b]\n[a]")
@example("a.a = 1\na.a.a = 1")
@example("[wanted.'mdot@x']\n[calculation]\n[gas]\n")
def test_any_text_is_read_or_refused(text: str) -> None:
    read_or_refuse(text)


@settings(max_examples=200, deadline=None)
@given(data=st.data())
def test_a_brief_with_a_line_changed_is_read_or_refused(data: st.DataObject) -> None:
    number = data.draw(st.integers(0, len(LINES) - 1))
    other = data.draw(st.sampled_from(LINES) | st.text(max_size=40))
    read_or_refuse("\n".join([*LINES[:number], other, *LINES[number + 1 :]]))


@settings(max_examples=200, deadline=None)
@given(data=st.data())
def test_a_brief_with_characters_cut_or_put_in_is_read_or_refused(data: st.DataObject) -> None:
    start = data.draw(st.integers(0, len(TEXT)))
    length = data.draw(st.integers(0, 40))
    put_in = data.draw(st.text(max_size=5))
    read_or_refuse(TEXT[:start] + put_in + TEXT[start + length :])


@settings(max_examples=300, deadline=None)
@given(place=st.sampled_from(places(GOOD)), content=contents)
def test_a_brief_with_any_content_anywhere_is_read_or_refused(
    place: tuple[Any, ...], content: Any
) -> None:
    read_or_refuse(write_toml(with_content(GOOD, place, content)))


@settings(deadline=None)
@given(composition=st.dictionaries(st.sampled_from(["air", "N2", "oxygen", "argon", "x"]),
       st.sampled_from(["balance", "0.5", "50 %", "1e-3", "Infinity", "-0.1", "0_5", ".5"])
       | st.text(max_size=8), max_size=4))  # fmt: skip
def test_any_composition_is_read_or_refused(composition: dict[str, str]) -> None:
    gas = {"by": "mole", "composition": composition}
    read_or_refuse(write_toml({**GOOD, "gas": gas}))
