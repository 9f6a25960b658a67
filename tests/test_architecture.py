"""The layout shows the architecture: stages import one way, and the code keeps its own rules."""

from __future__ import annotations

import ast
from pathlib import Path

import pytest

from tests.conftest import ROOT

PACKAGE = ROOT / "calcsheets"
MODULES = tuple(sorted(PACKAGE.rglob("*.py")))

# Each stage may import those before it. What stands on one line stands on one level.
ORDER = (
    ("errors", "files"),
    ("quantities",),
    ("expressions",),
    ("gases",),
    ("relations",),
    ("brief",),
    ("planning",),
    ("solving",),
    ("record",),
    ("calculation",),
    ("sheets",),
    ("checking",),
    ("package",),
    ("cli",),
    ("__main__",),
)
LEVEL = {name: index for index, names in enumerate(ORDER) for name in names}


def stage_of(path: Path) -> str:
    return path.relative_to(PACKAGE).parts[0].removesuffix(".py")


def imported_stages(path: Path) -> set[str]:
    """Stages that a module imports, from relative and absolute imports."""
    parts = path.relative_to(PACKAGE).with_suffix("").parts
    found = set()
    for node in ast.walk(ast.parse(path.read_text())):
        if isinstance(node, ast.ImportFrom) and node.level:
            base = parts[: len(parts) - node.level]
            target = (*base, *(node.module or "").split("."))
            names = [target[0]] if target[0] else [alias.name for alias in node.names]
            found.update(names)
        elif isinstance(node, ast.ImportFrom) and (node.module or "").startswith("calcsheets."):
            found.add(node.module.split(".")[1])
    return found


@pytest.mark.parametrize("path", MODULES, ids=lambda path: str(path.relative_to(PACKAGE)))
def test_a_stage_imports_only_stages_before_it(path: Path) -> None:
    stage = stage_of(path)
    if stage == "__init__":
        return
    later = {name for name in imported_stages(path) if LEVEL[name] > LEVEL[stage]}
    assert later == set()


def test_checking_shares_no_code_with_solving() -> None:
    for path in (PACKAGE / "checking").glob("*.py"):
        assert "solving" not in imported_stages(path), path.name


def test_sheets_read_the_record_and_neither_plan_nor_solve() -> None:
    for path in (PACKAGE / "sheets").rglob("*.py"):
        assert not imported_stages(path) & {"planning", "solving", "brief"}, path.name


@pytest.mark.parametrize("path", MODULES, ids=lambda path: str(path.relative_to(PACKAGE)))
def test_code_keeps_the_rules(path: Path) -> None:
    """No evaluation of text, no run-time assertion, no bare except, no global, no star import."""
    for node in ast.walk(ast.parse(path.read_text())):
        assert not isinstance(node, ast.Assert | ast.Global), ast.unparse(node)
        assert not (isinstance(node, ast.ExceptHandler) and node.type is None), path
        if isinstance(node, ast.ImportFrom):
            assert all(alias.name != "*" for alias in node.names)
        if isinstance(node, ast.Call) and isinstance(node.func, ast.Name):
            assert node.func.id not in {"eval", "exec", "compile", "__import__"}, path
        if isinstance(node, ast.Attribute):
            assert node.attr not in {"sympify", "parse_expr", "lambdify"}, path


@pytest.mark.parametrize("path", MODULES, ids=lambda path: str(path.relative_to(PACKAGE)))
def test_files_and_functions_stay_small(path: Path) -> None:
    source = path.read_text()
    assert source.count("\n") <= 500
    for node in ast.walk(ast.parse(source)):
        if isinstance(node, ast.FunctionDef):
            doc = ast.get_docstring(node, clean=False) or ""
            length = (node.end_lineno or 0) - node.lineno + 1 - doc.count("\n")
            assert length <= 60, f"{node.name} has {length} lines"


def test_every_dataclass_but_errors_and_running_state_is_frozen() -> None:
    """Definitions and results are frozen values."""
    loose = []
    for path in MODULES:
        for node in ast.walk(ast.parse(path.read_text())):
            if not isinstance(node, ast.ClassDef):
                continue
            for decorator in node.decorator_list:
                text = ast.unparse(decorator)
                if text.startswith("dataclass") and "frozen=True" not in text:
                    loose.append((stage_of(path), node.name))
    assert {stage for stage, _ in loose} <= {"errors", "solving"}
    assert [name for stage, name in loose if stage == "solving"] == ["Run"]
