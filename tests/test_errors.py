"""Errors are part of the interface: one base, facts in fields, a sentence that says what to do."""

from __future__ import annotations

import inspect
import pickle

import pytest

from calcsheets import errors
from calcsheets.errors import (
    AmbiguousRegime,
    BriefError,
    CalcsheetsError,
    CheckError,
    ContradictoryInputs,
    DefinitionError,
    NoRoot,
    NotEnoughInputs,
    OutputError,
    OutsideLimit,
    PlanningError,
    SeveralRoots,
    SolvingError,
    UndecidedRoots,
    UnitError,
    UnknownGas,
    UntabulatedIntegral,
)

CASES: list[tuple[CalcsheetsError, str]] = [
    (
        DefinitionError("relation x", "its sides differ"),
        "definition of relation x: its sides differ",
    ),
    (
        UnknownGas("nitrogn", ("nitrogen",)),
        'the gas "nitrogn" is not known. Did you mean nitrogen? See calcsheets gases, or give '
        "gamma and M_w of your own.",
    ),
    (
        UnknownGas("zzz", ()),
        'the gas "zzz" is not known. See calcsheets gases, or give gamma and M_w of your own.',
    ),
    (
        BriefError("a.toml", 7, "gas.name", "it is wrong", "Correct it"),
        "a.toml:7: gas.name: it is wrong. Correct it.",
    ),
    (
        BriefError("a.toml", 0, "", "the file is empty", "Write a brief"),
        "a.toml: the file is empty. Write a brief.",
    ),
    (
        NotEnoughInputs("t@x", "time, x", (("p@a",), ("T@a", "rho@a"))),
        "t@x (time, x) does not follow from the inputs. Give also: p@a; or T@a and rho@a.",
    ),
    (
        NotEnoughInputs("t@x", "time, x", ()),
        "t@x (time, x) does not follow from the inputs: no relation offered by the path gives it. "
        "Add the process that determines it to [[path]], or correct the name.",
    ),
    (
        NotEnoughInputs("t@x", "time, x", (), ("The regime of x is b.",)),
        "t@x (time, x) does not follow from the inputs. The regime of x is b. Change these "
        "inputs, or leave it out.",
    ),
    (
        ContradictoryInputs("R@gas", "287", "296.8", "Constant", ("M_w@gas",), -0.0325),
        "R@gas is 287, but M_w@gas leads to 296.8 (relation: Constant); the two sides differ by "
        "3.250%. Remove one of these inputs, or correct it.",
    ),
    (
        AmbiguousRegime("nozzle", ("choked", "not choked"), ("choked", "not choked")),
        "process nozzle: the inputs agree with more than one regime (choked and not choked). "
        'Which is meant? State it as regime = "choked" in its [[path]] entry.',
    ),
    (
        AmbiguousRegime("nozzle", ("a", "b"), ("a", "b", "c"), ("p@x = 1 Pa", "p@x = 2 Pa")),
        "process nozzle: the inputs agree with more than one regime (a: p@x = 1 Pa; b: p@x = "
        '2 Pa). Which is meant? State it as regime = "a" in its [[path]] entry.',
    ),
    (
        AmbiguousRegime("nozzle", (), ("choked", "not choked")),
        "process nozzle: each regime was tried (choked, not choked) and none agrees with its own "
        "test. Check the inputs of this process.",
    ),
    (
        NoRoot("Area and Mach number", "M@x", "0 to 1", "1 to 9", "0.5", ("too small",)),
        "Area and Mach number: no M@x within 0 to 1 satisfies it; there the relation reaches "
        "1 to 9, asked is 0.5. Check the inputs of this step. Limit not met: too small.",
    ),
    (
        SeveralRoots("Area and Mach number", "M@x", ("0.3", "2.2"), (), "stations.x"),
        "Area and Mach number: M@x may be 0.3 or 2.2. Which is meant? Give M@x, or an input that "
        "decides it.",
    ),
    (
        UntabulatedIntegral("y", 128),
        "the integral over y: a sum over 128 places does not give it to the digits of a workbook. "
        "Check the inputs of this step: the integrand may be without bound at a limit, or change "
        "sharply between them.",
    ),
    (
        OutsideLimit("Normal shock", "p@b", "a shock stands only in supersonic flow"),
        "Normal shock, for p@b: a shock stands only in supersonic flow, and the inputs lead to "
        "values outside that. Check the inputs of this step.",
    ),
    (
        OutsideLimit("Oblique shock", "beta@b", "the shock detaches", "θ is 40°, allowed is 30°"),
        "Oblique shock, for beta@b: the shock detaches, and the inputs lead to values outside "
        "that: θ is 40°, allowed is 30°. Check the inputs of this step.",
    ),
    (
        ContradictoryInputs("p@a", "2 Pa", "no value", "Bernoulli", ("p@b",), float("inf")),
        "p@a is 2 Pa, but p@b leads to no value (relation: Bernoulli); with these values one of "
        "its sides has none. Remove one of these inputs, or correct it.",
    ),
    (
        UndecidedRoots("A relation", "M@x", "0 to 1"),
        "A relation: the search for M@x within 0 to 1 did not come to an end, so nothing is known "
        "about its roots. Give M@x, or other inputs.",
    ),
    (
        CheckError("IronCalc", "Inputs, row 5, column 7", "1.0", "2.0"),
        "Inputs, row 5, column 7: the program computed 1.0, IronCalc finds 2.0. The workbook was "
        "not written; report this as a fault of the program.",
    ),
    (
        OutputError("out/a.pdf", "no space left on device", "Free space"),
        "out/a.pdf: no space left on device. Free space.",
    ),
]


@pytest.mark.parametrize(
    ("error", "sentence"), CASES, ids=[f"{type(e).__name__}-{i}" for i, (e, _) in enumerate(CASES)]
)
def test_an_error_says_where_what_and_what_to_do(error: CalcsheetsError, sentence: str) -> None:
    assert str(error) == sentence
    assert sentence.endswith(".") or isinstance(error, DefinitionError)


def test_a_unit_that_is_not_understood_names_the_text_and_the_remedy() -> None:
    error = UnitError("3 mil", "mil is said for two things", "Write thou or mm")
    assert str(error).startswith('"3 mil": mil is said for two things.')
    assert str(error).endswith("Write thou or mm.")


def classes() -> list[type[CalcsheetsError]]:
    found = [item for _, item in inspect.getmembers(errors, inspect.isclass)]
    return [item for item in found if issubclass(item, CalcsheetsError)]


def test_one_base_class_holds_them_all_and_the_module_draws_the_tree() -> None:
    drawing = inspect.getdoc(errors) or ""
    for item in classes():
        assert item.__name__ in drawing, item
        assert inspect.getdoc(item)
    assert issubclass(NoRoot, SolvingError)
    assert issubclass(NotEnoughInputs, PlanningError)


def test_every_class_of_error_has_its_wording_tested() -> None:
    abstract = {CalcsheetsError, PlanningError, SolvingError}
    assert {type(error) for error, _ in CASES} | {UnitError} | abstract == set(classes())


def test_errors_keep_their_facts_through_a_process_boundary() -> None:
    for error, sentence in CASES:
        again = pickle.loads(pickle.dumps(_Carried(error))).restored()
        assert str(again) == sentence


class _Carried:
    """The facts of an error, as another process would get them."""

    def __init__(self, error: CalcsheetsError) -> None:
        self.kind, self.facts = type(error), dict(vars(error))

    def restored(self) -> CalcsheetsError:
        return self.kind(**self.facts)  # type: ignore[call-arg]


def test_an_error_can_be_raised_through_a_context_manager() -> None:
    """Frozen exceptions break here: their traceback is set by the context manager."""
    from contextlib import contextmanager

    @contextmanager
    def around():  # type: ignore[no-untyped-def]
        yield

    with pytest.raises(OutputError), around():
        raise OutputError("a", "b", "c")
