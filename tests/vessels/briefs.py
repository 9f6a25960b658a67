"""Briefs of one vessel that is let down or filled through an orifice, for many tests."""

from __future__ import annotations

import calcsheets
from calcsheets.record import Record

_HEAD = """
[calculation]
number = "T-9"
revision = "0"
date = "2026-01-02"
title = "One vessel"
purpose = "How long?"
originator = "A"

[gas]
gamma = "1.4"
R = "296.8 J/(kg*K)"
"""

_LET_DOWN = """
[stations.receiver]
kind = "vessel"
V = "3.2 m3"
T_0 = "298.15 K"
p_1

[stations.header]
p_b

[stations.emptied]
kind = "vessel"
p_2

[[path]]
name = "orifice"
from = "receiver"
to = "header"
process = "orifice"
C_d = "0.82"
A

[[path]]
name = "change"
from = "receiver"
to = "emptied"
process = "let-down, KIND"
through = "orifice"
t

[wanted]
wanted
"""

_FILLING = """
[stations.supply]
T_0 = "310 K"
p_b

[stations.receiver]
kind = "vessel"
V = "3.2 m3"
T_0 = "298.15 K"
p_1

[stations.filled]
kind = "vessel"
p_2

[[path]]
name = "orifice"
from = "supply"
to = "receiver"
process = "orifice"
C_d = "0.82"
A

[[path]]
name = "change"
from = "receiver"
to = "filled"
process = "filling, KIND"
through = "orifice"
t

[wanted]
wanted
"""

LET_DOWN = {
    "p_1": "p_0 = '13 bar(a)'",
    "p_2": "p_0 = '1.3 bar(a)'",
    "p_b": "p = '1.2 bar(a)'",
    "A": "A = '50 mm2'",
    "t": "",
    "wanted": "'t@change' = { unit = 's', digits = 12 }",
}
FILLING = {**LET_DOWN, "p_1": "p_0 = '1 bar(a)'", "p_2": "p_0 = '7.9 bar(a)'",
           "p_b": "p_0 = '8 bar(a)'"}  # fmt: skip


def let_down(kind: str, **lines: str) -> str:
    """A let-down; each line of ``LET_DOWN`` may be given anew."""
    return _filled(_HEAD + _LET_DOWN, kind, {**LET_DOWN, **lines})


def filling(kind: str, **lines: str) -> str:
    """A filling; each line of ``FILLING`` may be given anew."""
    return _filled(_HEAD + _FILLING, kind, {**FILLING, **lines})


def _filled(text: str, kind: str, lines: dict[str, str]) -> str:
    text = text.replace("KIND", kind)
    return "\n".join(lines.get(line, line) for line in text.split("\n"))


def calculated(text: str, **inputs: str) -> Record:
    return calcsheets.calculate(calcsheets.parse_brief(text), inputs)


def result(record: Record, number: int = 1) -> float:
    value = record.results[number - 1].value
    assert value is not None
    return value
