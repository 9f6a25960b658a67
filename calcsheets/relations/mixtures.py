"""Properties of a mixture from its composition: relations made for the components at hand."""

from __future__ import annotations

from collections.abc import Sequence

from ..expressions import Expr, Sum, symbols
from .relation import Relation
from .sources import definition, textbook
from .thermodynamics import PERFECT

M_w, C_p, c_p, x, w = symbols("M_w C_p c_p x w")


def mixture_relations(components: Sequence[str], basis: str) -> tuple[Relation, ...]:
    """Return the relations of a mixture of perfect gases.

    Args:
        components: names of the component gases, each the role of its own quantities.
        basis: ``mole`` or ``mass``: what the fractions count.

    Returns:
        The sum of its fractions, and its molar mass and heat capacity from its components'.
    """
    if basis == "mole":
        return (
            _whole("Mole fractions", [x.of(name) for name in components]),
            _relation(
                "mixture_molar_mass",
                "Molar mass of a mixture from mole fractions",
                M_w,
                _sum([x.of(name) * M_w.of(name) for name in components]),
            ),
            _relation(
                "mixture_molar_heat",
                "Molar heat capacity of a mixture from mole fractions",
                C_p,
                _sum([x.of(name) * C_p.of(name) for name in components]),
            ),
        )
    return (
        _whole("Mass fractions", [w.of(name) for name in components]),
        _relation(
            "mixture_molar_mass",
            "Molar mass of a mixture from mass fractions",
            M_w,
            1 / _sum([w.of(name) / M_w.of(name) for name in components]),
        ),
        _relation(
            "mixture_specific_heat",
            "Specific heat of a mixture from mass fractions",
            c_p,
            _sum([w.of(name) * C_p.of(name) / M_w.of(name) for name in components]),
        ),
    )


def _whole(title: str, fractions: Sequence[Expr]) -> Relation:
    """The balance of a composition follows from it; where all are given it is a check."""
    return Relation(
        "composition",
        f"{title} add to one",
        _sum(fractions).equals(1),
        definition("Definition of fractions"),
        ("gas",),
        chapter="mixtures",
    )


def _relation(name: str, title: str, left: Expr, right: Expr) -> Relation:
    return Relation(
        name,
        title,
        left.equals(right),
        textbook("Mixing rule of perfect gases"),
        ("gas",),
        assumptions=(PERFECT, "the components do not react or condense"),
        chapter="mixtures",
    )


def _sum(terms: Sequence[Expr]) -> Expr:
    return Sum(tuple(terms))
