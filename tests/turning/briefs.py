"""Briefs for tests of supersonic turning."""

from __future__ import annotations

from calcsheets import calculate
from calcsheets.brief import parse_brief
from calcsheets.record import Record

_HEAD = """
[calculation]
number = "CS-0401"
revision = "A"
date = "2026-03-31"
title = "Turning of a supersonic stream"
purpose = "What stands behind the wave?"
originator = "A. Originator"

[gas]
gamma = "{gamma}"
R = "287.05 J/(kg*K)"
"""


def brief_text(body: str, wanted: str, gamma: str = "1.4") -> str:
    """A brief with stations and path in ``body`` and the keys that are wanted."""
    results = "\n".join(f'"{key}" = {{ digits = 7 }}' for key in wanted.split())
    return f"{_HEAD.format(gamma=gamma)}\n{body}\n[wanted]\n{results}\n"


def calculated(body: str, wanted: str, gamma: str = "1.4") -> Record:
    """The record of such a brief."""
    return calculate(parse_brief(brief_text(body, wanted, gamma), "turning.toml"))


def turning(process: str, given: str, own: str) -> str:
    """A path of one process from ``a`` to ``b``."""
    return (
        f"[stations.a]\n{given}\n[stations.b]\n"
        f'[[path]]\nname = "wave"\nfrom = "a"\nto = "b"\nprocess = "{process}"\n{own}\n'
    )
