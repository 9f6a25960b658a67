"""Published tables of compressible flow against the relations, forwards and backwards.

How each table is known stands in its file: two were read in the source, one in course notes,
and those of NACA Report 1135 are from memory, cross-checked.
"""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterable

import pytest

from tests.published.witnesses import PROVENANCES, Row, half_unit, near, rows, solved, tolerance

ISENTROPIC = tuple(
    (name, row)
    for name in (
        "naca_1135_isentropic",
        "data_book_isentropic",
        "textbook_appendix_isentropic",
        "course_notes_isentropic",
    )
    for row in rows(name)
)
SHOCK = tuple(rows("naca_1135_normal_shock"))

# Column: relation, unknown whose value is the ratio, and the quantity that it is a ratio to.
# The tables print static over stagnation values; the relation is solved for the static one.
ISENTROPIC_COLUMNS = {
    "T_ratio": ("stagnation_temperature", "T", {"T_0": "1"}),
    "p_ratio": ("stagnation_pressure", "p", {"p_0": "1"}),
    "rho_ratio": ("stagnation_density", "rho", {"rho_0": "1"}),
    "area_ratio": ("area_mach", "A", {"A_cr": "1"}),
    "V_ratio": ("velocity_ratio", "M_cr", {}),
}
DYNAMIC_PRESSURE = "q_ratio"  # over the stagnation pressure: two relations, see below
NOT_RELATED = {"beta"}  # the square root of |1 - M²|, a figure of thin-aerofoil theory
SHOCK_COLUMNS = {
    "p_ratio": ("shock_pressure", "p__2", {"p__1": "1"}),
    "rho_ratio": ("shock_density", "rho__2", {"rho__1": "1"}),
    "T_ratio": ("shock_temperature", "T__2", {"T__1": "1"}),
    "M2": ("shock_mach", "M__2", {}),
    "p_t_ratio": ("shock_stagnation_pressure", "p_0__2", {"p_0__1": "1"}),
    "p1_over_p_t2": ("rayleigh_pitot", "p__1", {"p_0__2": "1"}),
}


def name_of(row: Row) -> str:
    return f"M={row.get('M') or row['M1']}"


@pytest.mark.parametrize(
    ("name", "row"), ISENTROPIC, ids=[f"{name}-{name_of(row)}" for name, row in ISENTROPIC]
)
def test_every_isentropic_ratio_is_as_printed(name: str, row: Row) -> None:
    for column, (relation, unknown, other) in ISENTROPIC_COLUMNS.items():
        if column in row:
            found = solved(relation, unknown, gamma=row["gamma"], M=row["M"], **other)
            assert near(found, row[column], tolerance(row, column)), (column, found)
    if DYNAMIC_PRESSURE in row:
        given = {"gamma": row["gamma"], "M": row["M"]}
        static = repr(solved("stagnation_pressure", "p", p_0="1", **given))
        found = solved("dynamic_pressure", "q_dyn", p=static, **given)
        assert near(found, row[DYNAMIC_PRESSURE], tolerance(row, DYNAMIC_PRESSURE)), found


@pytest.mark.parametrize("row", SHOCK, ids=name_of)
def test_every_shock_ratio_is_as_printed(row: Row) -> None:
    for column, (relation, unknown, other) in SHOCK_COLUMNS.items():
        if column in row:
            found = solved(relation, unknown, gamma=row["gamma"], M__1=row["M1"], **other)
            assert near(found, row[column], tolerance(row, column)), (column, found)


@pytest.mark.parametrize(
    ("name", "row"), ISENTROPIC, ids=[f"{name}-{name_of(row)}" for name, row in ISENTROPIC]
)
def test_a_printed_ratio_leads_back_to_its_mach_number(name: str, row: Row) -> None:
    """The Mach number found reproduces the printed ratio, and lies on the table's branch.

    Ratios that print as 1 are left out: rounding may put them on the side that cannot occur.
    """
    branch = "subsonic" if float(row["M"]) <= 1 else "supersonic"
    for column, (relation, static, other) in ISENTROPIC_COLUMNS.items():
        if column not in row or float(row[column]) == 1:
            continue
        given = {"gamma": row["gamma"], static: row[column], **other}
        mach = solved(relation, "M", branch if column == "area_ratio" else "", **given)
        again = solved(relation, static, gamma=row["gamma"], M=repr(mach), **other)
        assert near(again, row[column], tolerance(row, column))
        assert (mach <= 1) == (branch == "subsonic") or float(row["M"]) == 1


@pytest.mark.parametrize("row", SHOCK, ids=name_of)
def test_a_printed_shock_ratio_leads_back_to_its_mach_number(row: Row) -> None:
    for column, (relation, ratio, other) in SHOCK_COLUMNS.items():
        if column not in row:
            continue
        given = {"gamma": row["gamma"], ratio: row[column], **other}
        mach = solved(relation, "M__1", **given)
        again = solved(relation, ratio, gamma=row["gamma"], M__1=repr(mach), **other)
        assert near(again, row[column], tolerance(row, column)), (column, mach)
        assert mach >= 1


def values_of(table: Iterable[Row], columns: Iterable[str]) -> Counter[str]:
    """How many values the tests above compare, by how each is known."""
    counted = tuple(columns)
    return Counter(row["provenance"] for row in table for column in counted if column in row)


def test_the_tables_are_large_enough_to_tell() -> None:
    assert len(ISENTROPIC) >= 60
    assert len(SHOCK) >= 30
    isentropic = values_of((row for _, row in ISENTROPIC), (*ISENTROPIC_COLUMNS, DYNAMIC_PRESSURE))
    assert isentropic == {"read in the source": 383, "from memory": 159}
    assert values_of(SHOCK, SHOCK_COLUMNS) == {"from memory": 212}


def test_every_column_is_compared_or_stands_for_something_else() -> None:
    keys = {"gamma", "M", "M1", "provenance", "remark"}
    for row in (*(row for _, row in ISENTROPIC), *SHOCK):
        columns = ISENTROPIC_COLUMNS if "M" in row else SHOCK_COLUMNS
        others = {key for key in row if key.startswith("tolerance")}
        known = {*keys, *others, *columns, DYNAMIC_PRESSURE, *NOT_RELATED}
        assert set(row) <= known, name_of(row)
        assert row["provenance"] in PROVENANCES


def test_the_pressure_of_choking_is_the_handbook_value() -> None:
    """0.528 for γ = 1.4 (common practice)."""
    found = solved("critical_pressure", "p_cr", gamma="1.4", p_0="1")
    assert near(found, "0.528", half_unit("0.528"))
