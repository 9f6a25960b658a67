"""The page of the brief, made from its form: ``python -m calcsheets.brief.document``."""

from __future__ import annotations

import sys
from collections.abc import Iterator
from importlib.resources import files

from ..relations import Process, load_library
from .form import Key, Keys, brief_form

_INTRODUCTION = """\
# The brief

A brief says what is known, where it came from, and what is wanted. It is a text in TOML
(https://toml.io), a page of tables and keys that any editor opens. An editor that reads JSON
Schema completes and checks it with [brief.schema.json](brief.schema.json).

Nothing is guessed. An unknown key, a unit that is not understood, a pressure without `(g)` or
`(a)` where it matters: each stops with file and line, the reason and what to do.

## A whole example

```toml
{example}```

`calcsheets prepare` makes the sheets of it.
"""

_VALUES = """\
## Values

A quantity is a text of number and unit, or a table with the source beside the value:

```toml
[stations.receiver]
kind = "vessel"
p_0 = "7.0 bar(g)"
T_0 = {{ value = "25 °C", source = "DS-7 rev 0, p. 1", tolerance = "5 K", status = "verified" }}
V = "1.5 m3"
```

A number keeps its digits as typed, so it stands in quotes. Units: see [units](units.md). A gauge
pressure stands under the same key as an absolute one; a volume flow at a reference state may
stand under `mdot`, and such a volume under `m`. `same_as` states that two quantities are equal
instead of giving the value twice: `p = {{ same_as = "p_atm@site" }}`. The `@` names the place: a
station, a process, `gas` or `site`.

{keys}
"""

_GAS = """\
## [gas]

By name (see [gases](gases.md)), by composition, or by properties of its own. Properties that
the table gives replace the data of the program, all of them.

```toml
[gas]
by = "mole"
composition = {{ nitrogen = "79 %", oxygen = "balance" }}
```

```toml
[gas]
name = "process gas"
gamma = {{ value = "1.31", source = "Gas analysis GA-2" }}
M_w = {{ value = "18.2 g/mol", source = "Gas analysis GA-2" }}
```

{keys}
"""

_STATIONS = """\
## [stations.NAME]

A station is a named place in the flow path: small letters, digits and `_`. It holds whatever
quantities are known there.

{keys}
"""

_PATH = """\
## [[path]]

Each entry is one process from one station to another. Its own quantities (a diameter, a
discharge coefficient, a time) stand in its entry. A let-down or filling names in `through` the
orifice that the gas passes; that orifice is an entry before it.

{keys}

The processes:

{processes}
"""

_WANTED = """\
## [wanted]

Each key is a quantity at a place in quotation marks, such as `"mdot@orifice"`. Its value is a
table, empty (`{{}}`) if SI units and no criterion will do. A criterion has the datum and the
reference state of the unit of its result. `"regime@orifice"` asks for a state in words, and has
neither unit nor criterion.

{keys}
"""


def brief_page() -> str:
    """Return the page as Markdown."""
    form = brief_form()
    example = files(__package__).joinpath("example.toml").read_text("utf-8")
    processes = load_library().processes.values()
    sections = [
        _INTRODUCTION.format(example=example),
        "## [calculation]\n\nIdentity and purpose.\n\n" + _table(form.calculation),
        _VALUES.format(keys=_table(form.value)),
        "## [site]\n\nThe local atmosphere, and a reference state of your own.\n\n"
        + _table(form.site),
        _GAS.format(keys=_table(form.gas)),
        _STATIONS.format(keys=_table(_words(form.station))),
        _PATH.format(keys=_table(_words(form.leg)), processes="\n".join(map(_process, processes))),
        _WANTED.format(keys=_table(form.wanted)),
        "## [[assumption]]\n\n" + _table(form.assumption),
        "## [[reference]]\n\nA document that the calculation rests on.\n\n"
        + _table(form.reference),
        "## [[caution]]\n\nWhat can hurt someone.\n\n" + _table(form.caution),
        "## Quantities of stations and processes\n\n" + _table(_values(form.station)),
    ]
    return "\n\n".join(section.rstrip() for section in sections) + "\n"


def _words(keys: Keys) -> Keys:
    return {name: key for name, key in keys.items() if key.what != "value"}


def _values(keys: Keys) -> Keys:
    return {name: key for name, key in keys.items() if key.what == "value"}


def _table(keys: Keys) -> str:
    return "\n".join(["| key | holds |", "|---|---|", *_rows(keys)]) + "\n"


def _rows(keys: Keys) -> Iterator[str]:
    for key in keys.values():
        yield f"| `{key.name}`{' (required)' if key.required else ''} | {_holds(key)} |"


def _holds(key: Key) -> str:
    if not key.choices or key.name == "process":  # the processes are listed below their table
        return key.about
    return f"{key.about} {' or '.join(f'`{choice}`' for choice in key.choices)}."


def _process(process: Process) -> str:
    through = " Needs `through`." if process.needs_through else ""
    return f"- `{process.name}`: {process.title}.{through}"


if __name__ == "__main__":
    sys.stdout.write(brief_page())
