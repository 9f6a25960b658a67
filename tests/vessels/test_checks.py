"""An integral is checked by another quadrature, and printed with what is proved of it."""

from __future__ import annotations

import re
from dataclasses import replace

import pytest

from calcsheets.checking import check_record
from calcsheets.record import IntegralRecord, Record, read_record, record_bytes
from calcsheets.sheets.pdf import render_html
from tests.vessels.briefs import calculated, let_down


@pytest.fixture(scope="module")
def record() -> Record:
    return calculated(let_down("adiabatic"))


def with_integral(record: Record, **changes: object) -> Record:
    step = record.steps[-1]
    (item,) = step.integrals
    changed: IntegralRecord = replace(item, **changes)  # type: ignore[arg-type]
    return replace(record, steps=(*record.steps[:-1], replace(step, integrals=(changed,))))


def reasons(record: Record) -> list[str]:
    return [finding.reason for finding in check_record(record) if finding.verdict == "failed"]


def test_the_record_of_an_integral_is_read_back(record: Record) -> None:
    assert read_record(record_bytes(record)) == record
    assert reasons(record) == []


def test_a_changed_sum_is_found(record: Record) -> None:
    (item,) = record.steps[-1].integrals
    planted = with_integral(record, total=item.total * (1 + 1e-9))
    assert reasons(planted) == ["an integral is not the sum of its places"]


def test_a_changed_place_is_found(record: Record) -> None:
    (item,) = record.steps[-1].integrals
    first = replace(item.nodes[0], height=item.nodes[0].height * 1.001)
    assert reasons(with_integral(record, nodes=(first, *item.nodes[1:]))) == [
        "an integral is not the sum of its places"
    ]


def test_a_sum_that_is_not_the_integral_is_found(record: Record) -> None:
    (item,) = record.steps[-1].integrals
    scaled = tuple(replace(n, height=n.height * (1 + 1e-9)) for n in item.nodes)
    planted = with_integral(record, nodes=scaled, total=item.total * (1 + 1e-9))
    (reason,) = reasons(planted)
    assert reason == "an integral and its sum differ by 5.0e-10"


def test_the_sheet_says_what_is_proved_of_the_integral(record: Record) -> None:
    html = re.sub(r"<[^>]+>", "", render_html(record)).replace("\u202f", "")
    assert "15 digits of the integral are certified." in html
    assert "The workbook sums 16 places; its sum differs by" in html
    assert "velocity over maximum velocity" in html
    assert "Holds when: unchoked at the end (change), choked (orifice)." in html
