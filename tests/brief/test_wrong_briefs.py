"""Wrong briefs are refused with the whole sentence: place, value, limit and what to do."""

from __future__ import annotations

import re
import tomllib
from pathlib import Path

import pytest

from calcsheets import calculate
from calcsheets.brief import parse_brief, read_brief
from calcsheets.brief.reader import LARGEST_FILE
from calcsheets.errors import BriefError, CalcsheetsError, OutputError
from calcsheets.relations import load_library

HERE = Path(__file__).parent
GOOD = "good.toml"
LONG = "{2001 letters}"  # stands in a data file for a text that is too long to print there


def cases(name: str) -> list[dict[str, str]]:
    found: list[dict[str, str]] = tomllib.loads((HERE / name).read_text("utf-8"))["case"]
    return found


WRONG = cases("wrong.toml")
UNSOLVABLE = cases("unsolvable.toml")


def case_name(case: dict[str, str]) -> str:
    return case["name"]


def text_of(case: dict[str, str]) -> tuple[str, str]:
    """Return the changed brief of a case, and its file name."""
    file = case.get("brief", GOOD)
    text = (HERE / file).read_text("utf-8")
    if "old" not in case:
        return text, file
    assert case["old"] in text, "the good brief has changed, and this case no longer"
    new = case["new"].replace(LONG, "x" * 2001)
    return text.replace(case["old"], new, 1), file


PROCESSES = str(len(load_library().processes))


@pytest.mark.parametrize("file", [GOOD, "orifice.toml"])
def test_the_briefs_that_the_cases_change_are_good(file: str) -> None:
    assert calculate(read_brief(HERE / file)).results


def test_there_are_enough_wrong_briefs_and_no_two_are_one() -> None:
    assert len(WRONG) >= 50
    names = [case["name"] for case in (*WRONG, *UNSOLVABLE)]
    assert len(set(names)) == len(names)


@pytest.mark.parametrize("case", WRONG, ids=case_name)
def test_a_wrong_brief_is_refused_with_its_message(case: dict[str, str]) -> None:
    with pytest.raises(BriefError) as refused:
        parse_brief(*text_of(case))
    assert str(refused.value) == case["message"].replace("{processes}", PROCESSES)


@pytest.mark.parametrize("case", WRONG, ids=case_name)
def test_the_message_points_at_a_line_that_is_there(case: dict[str, str]) -> None:
    text, _ = text_of(case)
    with pytest.raises(BriefError) as refused:
        parse_brief(text)
    problem = refused.value
    lines = text.split("\n")
    assert 0 <= problem.line <= len(lines)
    key = re.split(r"[.\[\]]", problem.where)[-1]
    if problem.line and key in case.get("new", "") and key.isidentifier():
        assert key in lines[problem.line - 1]


@pytest.mark.parametrize("case", WRONG, ids=case_name)
def test_the_message_is_whole_sentences_without_unprintable_characters(
    case: dict[str, str],
) -> None:
    message = case["message"]
    assert message.endswith((".", "?"))
    assert message.isprintable()
    assert not re.search(r"\.\.$|\?\.|: \.|  |\bNone\b", message.replace('"..."', ""))


@pytest.mark.parametrize("case", UNSOLVABLE, ids=case_name)
def test_a_brief_that_cannot_be_calculated_is_refused_with_its_message(
    case: dict[str, str],
) -> None:
    brief = parse_brief(*text_of(case))
    with pytest.raises(CalcsheetsError) as refused:
        calculate(brief)
    assert type(refused.value).__name__ == case["error"]
    assert str(refused.value) == case["message"]


def test_a_missing_file_is_named(tmp_path: Path) -> None:
    path = tmp_path / "no-such-brief.toml"
    with pytest.raises(OutputError) as refused:
        read_brief(path)
    assert str(refused.value) == f"{path}: no such file or directory. Check the name of the brief."


def test_a_folder_is_no_brief(tmp_path: Path) -> None:
    with pytest.raises(OutputError) as refused:
        read_brief(tmp_path)
    assert str(refused.value) == f"{tmp_path}: is a directory. Check the name of the brief."


def test_a_text_that_is_not_utf_8_is_refused_with_its_line(tmp_path: Path) -> None:
    path = tmp_path / "latin.toml"
    text = (HERE / GOOD).read_text("utf-8")
    path.write_bytes(text.encode("latin-1"))
    line = text[: text.index("°")].count("\n") + 1
    with pytest.raises(BriefError) as refused:
        read_brief(path)
    assert str(refused.value) == (
        f"latin.toml:{line}: the text is not UTF-8. Save the file as UTF-8."
    )


def test_a_file_that_is_too_large_is_refused(tmp_path: Path) -> None:
    path = tmp_path / "large.toml"
    path.write_bytes(b"#" * (LARGEST_FILE + 1))
    with pytest.raises(BriefError) as refused:
        read_brief(path)
    assert str(refused.value) == (
        "large.toml: the file has 1000001 bytes, the limit is 1000000. "
        "A brief is a short text; check that this is one."
    )


def test_an_empty_file_is_asked_for_its_first_table() -> None:
    with pytest.raises(BriefError) as refused:
        parse_brief("", "empty.toml")
    assert str(refused.value) == "empty.toml: the table [calculation] is missing. Add it."


@pytest.mark.parametrize("mark", ["\ufeff", ""], ids=["with", "without"])
@pytest.mark.parametrize("end", ["\r\n", "\n"], ids=["CRLF", "LF"])
def test_byte_order_mark_and_line_ends_of_an_editor_do_not_matter(
    tmp_path: Path, mark: str, end: str
) -> None:
    path = tmp_path / "good.toml"
    text = (HERE / GOOD).read_text("utf-8")
    path.write_bytes((mark + text.replace("\n", end)).encode("utf-8"))
    assert read_brief(path).given == read_brief(HERE / GOOD).given


def test_deep_nesting_is_refused_and_does_not_crash() -> None:
    for opened in ("[" * 5000, "[\n" * 5000, "{ a = " * 5000):
        with pytest.raises(BriefError, match="nest"):
            parse_brief(f"a = {opened}")


def test_lines_of_many_digits_are_indexed_in_linear_time() -> None:
    digits = "1" * 4000
    with pytest.raises(BriefError, match="unknown table"):
        parse_brief(f"numbers = [\n{digits},\n{digits},\n]")
