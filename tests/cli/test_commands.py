"""The command line as a person or another program meets it."""

from __future__ import annotations

import json
import os
import subprocess
import sys
from pathlib import Path

import pytest

from tests.conftest import ROOT

ORIFICE = """
[calculation]
number = "T/3"
revision = "0"
date = "2026-01-02"
title = "Orifice"
purpose = "What flows?"
originator = "A"

[gas]
gamma = "1.4"
M_w = "28.97 g/mol"

[stations.upstream]
p_0 = "3 bar(a)"
T_0 = "20 °C"

[stations.downstream]
p = "1 bar(a)"

[[path]]
name = "orifice"
from = "upstream"
to = "downstream"
process = "orifice"
d = "10 mm"
C_d = "0.8"

[wanted]
"mdot@orifice" = { unit = "kg/h", at_least = "LIMIT kg/h" }
"""


def run(*arguments: str, folder: Path | None = None) -> subprocess.CompletedProcess[str]:
    return subprocess.run(
        [sys.executable, "-c", "from calcsheets.cli import main; main()", *arguments],
        cwd=folder or ROOT,
        env={**os.environ, "PYTHONPATH": str(ROOT)},
        capture_output=True,
        text=True,
        timeout=120,
    )


@pytest.fixture(scope="module")
def package(tmp_path_factory: pytest.TempPathFactory) -> Path:
    folder = tmp_path_factory.mktemp("package")
    (folder / "brief.toml").write_text(ORIFICE.replace("LIMIT", "100"))
    done = run("prepare", "brief.toml", "--out", "out", folder=folder)
    assert done.returncode == 0, done.stderr
    return folder / "out"


@pytest.mark.parametrize("command", ["prepare", "check", "relations", "gases", "units"])
def test_every_command_has_help_with_an_example(command: str) -> None:
    done = run(command, "--help")
    assert done.returncode == 0
    assert f"Example: calcsheets {command}" in " ".join(done.stdout.split())


def test_a_package_holds_record_workbook_pdf_and_brief(package: Path) -> None:
    names = {path.name for path in package.iterdir()}
    assert names == {"T-3-0.json", "T-3-0.xlsx", "T-3-0.pdf", "T-3-0.toml"}


def test_a_package_just_made_passes_its_check(package: Path) -> None:
    done = run("check", str(package))
    assert done.returncode == 0, done.stdout
    assert " passed" in done.stdout.splitlines()[-1].split(";")[0]


def test_an_altered_record_fails_its_check(package: Path, tmp_path: Path) -> None:
    for path in package.iterdir():
        (tmp_path / path.name).write_bytes(path.read_bytes())
    record = tmp_path / "T-3-0.json"
    record.write_bytes(record.read_bytes().replace(b'"value":300000', b'"value":300001'))
    done = run("check", str(tmp_path), "--json")
    assert done.returncode == 1
    verdicts = {f["part"]: f["verdict"] for f in json.loads(done.stdout)["findings"]}
    assert "failed" in verdicts.values()


def test_a_missed_criterion_is_exit_code_1_and_the_package_is_there(tmp_path: Path) -> None:
    (tmp_path / "brief.toml").write_text(ORIFICE.replace("LIMIT", "1000"))
    done = run("prepare", "brief.toml", "--json", folder=tmp_path)
    assert done.returncode == 1
    facts = json.loads(done.stdout)
    assert facts["all_met"] is False
    assert facts["results"][0]["verdict"] == "not met"
    assert all((tmp_path / path).is_file() for path in facts["files"].values())


@pytest.mark.parametrize(
    ("arguments", "message"),
    [
        (
            ("prepare", "nowhere.toml"),
            "calcsheets: nowhere.toml: no such file or directory. Check the name of the brief.",
        ),
        (
            ("prepare", "examples/receiver-letdown.toml", "--paper", "A3"),
            "calcsheets: --paper A3: no such paper. Choose A4 or letter.",
        ),
        (
            ("check", "templates"),
            "calcsheets: templates: there is no package here: 0 files *.json, 0 files *.xlsx. "
            "Name the folder that calcsheets prepare wrote.",
        ),
        (
            ("gases", "nitrogn"),
            'calcsheets: the gas "nitrogn" is not known. Did you mean nitrogen? '
            "See calcsheets gases, or give gamma and M_w of your own.",
        ),
    ],
)
def test_what_cannot_be_done_is_one_line_and_exit_code_2(
    arguments: tuple[str, ...], message: str
) -> None:
    done = run(*arguments)
    assert (done.returncode, done.stdout) == (2, "")
    assert done.stderr == message + "\n"


def test_a_wrong_brief_leaves_nothing_behind(tmp_path: Path) -> None:
    (tmp_path / "brief.toml").write_text(ORIFICE.replace("3 bar(a)", "3 bar"))
    done = run("prepare", "brief.toml", folder=tmp_path)
    assert done.returncode == 2
    assert done.stderr.startswith("calcsheets: brief.toml:15: stations.upstream.p_0:")
    assert [path.name for path in tmp_path.iterdir()] == ["brief.toml"]


def test_a_folder_that_cannot_be_made_is_said_in_one_line(tmp_path: Path) -> None:
    (tmp_path / "brief.toml").write_text(ORIFICE.replace("LIMIT", "100"))
    (tmp_path / "taken").write_text("a file")
    done = run("prepare", "brief.toml", "--out", "taken", folder=tmp_path)
    assert done.returncode == 2
    assert done.stderr == (
        "calcsheets: taken: file exists. Free space or choose another folder with --out.\n"
    )


def test_relations_are_found_by_word_symbol_and_name() -> None:
    assert "choked_mass_flow" in run("relations", "choked").stdout
    assert "impulse_function" in run("relations", "F_i").stdout
    whole = run("relations", "area_mach").stdout
    assert "A/A* = (1/M)·((2/(γ + 1))·(1 + ((γ − 1)/2)·M²))^((γ + 1)/(2·(γ − 1)))" in whole
    assert "limit: A/A* ≥ 1: no area is smaller than the critical one" in whole


def test_lists_are_json_where_another_program_asks() -> None:
    assert len(json.loads(run("gases", "--json").stdout)["gases"]) >= 15
    assert len(json.loads(run("relations", "--json").stdout)["relations"]) >= 45
    names = {unit["unit"] for unit in json.loads(run("units", "psi", "--json").stdout)["units"]}
    assert names == {"psi", "psi(a)", "psi(g)", "psi(d)"}


def test_help_does_not_load_what_it_does_not_need() -> None:
    code = (
        "import sys, calcsheets.cli.app as app\n"
        "heavy = {'weasyprint', 'openpyxl', 'sympy', 'pint', 'xlsxwriter', 'ziamath'}\n"
        "print(sorted(heavy & set(sys.modules)))"
    )
    done = subprocess.run(
        [sys.executable, "-c", code], cwd=ROOT, capture_output=True, text=True, check=True
    )
    assert done.stdout.strip() == "[]"


def test_the_package_runs_as_a_module() -> None:
    done = subprocess.run(
        [sys.executable, "-m", "calcsheets", "--help"], capture_output=True, text=True, check=True
    )
    assert "prepare" in done.stdout
