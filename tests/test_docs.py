"""The pages in docs/ are current, their briefs can be calculated, their links lead somewhere."""

from __future__ import annotations

import re
import subprocess
import sys
import tomllib
from pathlib import Path
from typing import Any

import pytest

from calcsheets import calculate
from calcsheets.brief import brief_form, parse_brief
from calcsheets.brief.document import brief_page
from calcsheets.gases import gases
from calcsheets.quantities import all_units
from tests.brief.toml_writer import write_toml
from tests.conftest import ROOT

PAGES = (*sorted(ROOT.glob("*.md")), *sorted((ROOT / "docs").glob("*.md")))
EXAMPLE = (ROOT / "calcsheets" / "brief" / "example.toml").read_text("utf-8")
GENERATED = {
    "brief.md": "calcsheets.brief.document",
    "units.md": "calcsheets.quantities.document",
    "gases.md": "calcsheets.gases.document",
    "relations.md": "calcsheets.sheets.library_page",
    "brief.schema.json": "calcsheets.brief.schema",
}


def blocks() -> list[tuple[str, str]]:
    """Every fenced TOML block with the page and the number that it has there."""
    return [
        (f"{page.name}-{number}", text)
        for page in PAGES
        for number, text in enumerate(
            re.findall(r"^```toml\n(.*?)^```", page.read_text("utf-8"), re.MULTILINE | re.DOTALL), 1
        )
    ]


BLOCKS = blocks()


@pytest.mark.parametrize(("page", "module"), GENERATED.items())
def test_a_page_is_what_its_command_writes(page: str, module: str) -> None:
    command = [sys.executable, "-m", module]
    written = subprocess.run(command, capture_output=True, check=True, cwd=ROOT).stdout
    assert written == (ROOT / "docs" / page).read_bytes(), f"run python -m {module} > docs/{page}"


def test_the_python_of_the_readme_runs(tmp_path: Path) -> None:
    text = (ROOT / "README.md").read_text("utf-8")
    (code,) = re.findall(r"^```python\n(.*?)^```", text, re.MULTILINE | re.DOTALL)
    code = code.replace("packages/trial", str(tmp_path / "trial"))
    done = subprocess.run([sys.executable, "-c", code], cwd=ROOT, capture_output=True, text=True)
    assert done.returncode == 0, done.stderr
    assert done.stdout.endswith(" kilogram / hour\n")
    assert len(list((tmp_path / "trial").iterdir())) == 4


def test_the_page_of_the_brief_holds_the_example_and_parts_of_one() -> None:
    assert EXAMPLE in [text for _, text in BLOCKS]
    assert len(BLOCKS) >= 4


@pytest.mark.parametrize(("name", "text"), BLOCKS, ids=[name for name, _ in BLOCKS])
def test_a_brief_in_the_docs_can_be_calculated(name: str, text: str) -> None:
    """A part of a brief stands in place of the same tables of the example."""
    part: dict[str, Any] = tomllib.loads(text)
    whole: dict[str, Any] = tomllib.loads(EXAMPLE)
    for table, content in part.items():
        whole[table] = {**whole[table], **content} if table == "stations" else content
    assert calculate(parse_brief(write_toml(whole), name)).results


def test_the_example_shows_every_table_and_every_key_of_a_value() -> None:
    example = tomllib.loads(EXAMPLE)
    form = brief_form()
    assert set(example) == set(form.tables)
    for keys in (form.value, form.wanted, form.assumption):
        missing = [name for name in keys if not re.search(rf"\b{name} = ", EXAMPLE)]
        assert missing == []


def test_the_page_of_the_brief_lists_every_key() -> None:
    form, page = brief_form(), brief_page()
    tables = (form.calculation, form.site, form.gas, form.station, form.leg, form.value)
    for keys in (*tables, form.wanted, form.assumption, form.reference, form.caution):
        assert [name for name in keys if f"| `{name}`" not in page] == []


def test_the_pages_list_every_unit_and_every_gas() -> None:
    units, known = ((ROOT / "docs" / name).read_text("utf-8") for name in ("units.md", "gases.md"))
    assert [unit.name for unit in all_units() if f"| `{unit.name}` |" not in units] == []
    assert [gas for gas in gases() if f"| `{gas}` |" not in known] == []


@pytest.mark.parametrize("page", PAGES, ids=lambda page: page.name)
def test_links_between_pages_lead_to_files(page: Path) -> None:
    links = re.findall(r"\]\(([^)#:]+)(?:#[^)]*)?\)", page.read_text("utf-8"))
    assert [link for link in links if not (page.parent / link).exists()] == []
