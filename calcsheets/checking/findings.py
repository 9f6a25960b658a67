"""Every step of a record evaluated again, in other arithmetic, into its published form."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from fractions import Fraction
from typing import Any

from ..expressions import Equation, Expr, Number, Sum, Symbol
from ..record import (
    LARGEST_DIFFERENCE,
    InputRecord,
    IntegralRecord,
    LimitRecord,
    Record,
    ResultRecord,
    RouteRecord,
    StepRecord,
)
from .courses import check_course
from .decimals import COMPARE, evaluate_decimal, holds_decimal
from .finding import Finding

_TOLERANCE = 1e-12
_LAST_DIGIT = 2.0**-52


def check_record(record: Record) -> tuple[Finding, ...]:
    """Check the conversions, steps, limits and results of a record from the record alone.

    Args:
        record: the record, as read from its file.

    Returns:
        One finding for each input, step, result and course.
    """
    findings = [_check_input(item) for item in record.inputs]
    for step in record.steps:
        findings += _check_step(record, step)
    findings += [_check_result(record, result) for result in record.results]
    findings += [check_course(course) for course in record.courses]
    for route in record.routes:
        findings += _check_route(record, route)
    return tuple(findings)


def _check_input(item: InputRecord) -> Finding:
    import mpmath

    with mpmath.workdps(50):
        exact = Fraction(item.number_typed) * Fraction(item.factor) + Fraction(item.offset)
        value = mpmath.mpf(exact.numerator) / exact.denominator * mpmath.pi**item.pi_power
    return _compared(f"input {item.number}", item.key, value, item.value, "conversion to SI")


def _check_step(record: Record, step: StepRecord) -> Iterator[Finding]:
    import mpmath

    part = f"step {step.number}"
    operands = (*step.operands, *step.limit_operands, *step.dropped)
    stale = [operand.key for operand in operands if operand.value != _value_of(record, operand.key)]
    if stale:
        yield Finding(part, step.key, "failed", f"{stale[0]} is not the value of its origin")
        return
    values = {operand.symbol: mpmath.mpf(operand.value) for operand in step.operands}
    published = record.relation(step.relation).published
    if step.test is not None:
        yield _check_test(part, step, values)
        return
    if not isinstance(published, Equation) or step.value is None:
        yield Finding(part, step.key, "not possible", "the record holds no equation or value")
        return
    values[step.symbol] = mpmath.mpf(step.value)
    yield _check_equation(part, step.key, published, values)
    yield from _check_members(record, part, step, values)
    for item in step.integrals:
        yield _check_integral(part, step, item, values)
    values |= {operand.symbol: mpmath.mpf(operand.value) for operand in step.limit_operands}
    for limit in step.limits:
        yield _check_limit(part, step, limit, values)


def _check_members(
    record: Record, part: str, step: StepRecord, values: Mapping[Symbol, Any]
) -> Iterator[Finding]:
    """Each relation of a coupled set, with the values that the whole set came to."""
    import mpmath

    inside = {**values, **{o.symbol: mpmath.mpf(o.value) for o in step.dropped}}
    for member in step.combination:
        value = _value_of(record, member.key) if member.key else None
        if member.symbol is not None and value is not None:
            inside[member.symbol] = mpmath.mpf(value)
    for member in step.combination:
        if not set(member.published.symbols) <= set(inside):
            reason = f"{member.relation} needs a value that the record does not hold"
            yield Finding(part, step.key, "failed", reason)
            continue
        yield _check_equation(part, step.key, member.published, inside)


def _check_integral(
    part: str, step: StepRecord, item: IntegralRecord, values: Mapping[Symbol, Any]
) -> Finding:
    """The sum over places is made again, and the integral computed by another quadrature."""
    import mpmath

    weighted = mpmath.fsum(mpmath.mpf(node.weight) * node.height for node in item.nodes)
    again = (mpmath.mpf(item.high) - item.low) * weighted
    if abs(again - item.total) > _TOLERANCE * abs(item.total) + abs(item.total_error):
        return Finding(part, step.key, "failed", "an integral is not the sum of its places")
    same = Equation(item.integral, Number(Fraction(item.total)))
    return _check_equation(part, step.key, same, values, "an integral and its sum")


def _check_limit(
    part: str, step: StepRecord, limit: LimitRecord, values: Mapping[Symbol, Any]
) -> Finding:
    if not set(limit.condition.symbols) <= set(values):
        reason = f"limit needs a value that the calculation does not hold: {limit.reason}"
        verdict = "not possible" if limit.holds is None else "failed"
        return Finding(part, step.key, verdict, reason)
    verdict = "passed" if holds_decimal(limit.condition, values) == limit.holds else "failed"
    return Finding(part, step.key, verdict, f"limit evaluated again: {limit.reason}")


def _check_test(part: str, step: StepRecord, values: Mapping[Symbol, Any]) -> Finding:
    test = step.test
    if test is None:
        return Finding(part, step.key, "not possible", "no regime test")
    holds = (holds_decimal(case.condition, values, test.equal_within) for case in test.cases)
    found = (case.outcome for case, true in zip(test.cases, holds, strict=True) if true)
    expected = next(found, test.otherwise)
    verdict = "passed" if expected == test.outcome else "failed"
    return Finding(part, step.key, verdict, f"regime test evaluated again: {expected}")


def _check_equation(
    part: str,
    key: str,
    published: Equation,
    values: Mapping[Symbol, Any],
    what: str = "sides of the published form",
) -> Finding:
    """The value is put into the published form.

    The record keeps doubles, so both sides may differ by what the rounding of each value to a
    double makes of them, besides the tolerance.
    """
    apart = _apart(published, values)
    scale = _size(published.left, values) + _size(published.right, values)
    rounding = sum(_effect(published, values, symbol, apart) for symbol in values)
    allowed = _TOLERANCE * scale + rounding
    difference = 0.0 if scale == 0 else float(abs(apart) / scale)
    verdict = "passed" if abs(apart) <= allowed else "failed"
    return Finding(part, key, verdict, f"{what} differ by {difference:.1e}")


def _effect(published: Equation, values: Mapping[Symbol, Any], symbol: Symbol, apart: Any) -> Any:
    """What the last digit of one double can change; a side may end at the edge of its domain."""
    changes = []
    for factor in (1 + _LAST_DIGIT, 1 - _LAST_DIGIT):
        try:
            moved = _apart(published, {**values, symbol: values[symbol] * factor})
        except ArithmeticError:
            continue
        changes.append(abs(moved - apart))
    return max(changes, default=0)


def _apart(published: Equation, values: Mapping[Symbol, Any]) -> Any:
    return evaluate_decimal(published.left, values) - evaluate_decimal(published.right, values)


def _size(side: Expr, values: Mapping[Symbol, Any]) -> Any:
    """Added terms count each, so that a side that cancels to zero still has a size."""
    terms = side.terms if isinstance(side, Sum) else (side,)
    return sum(abs(evaluate_decimal(term, values)) for term in terms)


def _check_result(record: Record, result: ResultRecord) -> Finding:
    import mpmath

    part = f"result {result.number}"
    if result.value is None:
        step = record.steps[result.step - 1]
        outcome = step.test.outcome if step.test else ""
        verdict = "passed" if outcome == result.state else "failed"
        return Finding(part, result.key, verdict, "state as in its step")
    with mpmath.workdps(50):
        si = mpmath.mpf(_value_of(record, result.key))
        factor, offset = Fraction(result.factor), Fraction(result.offset)
        shifted = si - mpmath.mpf(offset.numerator) / offset.denominator
        value = shifted * factor.denominator / factor.numerator / mpmath.pi**result.pi_power
    for criterion in result.criteria:
        if COMPARE[criterion.comparison](result.value, criterion.limit) != criterion.holds:
            return Finding(part, result.key, "failed", f"criterion {criterion.typed}")
    return _compared(part, result.key, value, result.value, "conversion to the wanted unit")


def _check_route(record: Record, route: RouteRecord) -> Iterator[Finding]:
    """Every step of another route, and where it leads against the calculation."""
    import mpmath

    part = f"other route to result {route.result}"
    if route.value is None:
        yield Finding(part, route.key, "not possible", route.reason)
        return
    own: dict[str, float] = {}
    for step in route.steps:
        known = {o.key: own.get(o.key, _value_of(record, o.key)) for o in step.operands}
        stale = [o.key for o in step.operands if o.value != known[o.key]]
        published = record.relation(step.relation).published
        if stale or not isinstance(published, Equation):
            yield Finding(part, step.key, "failed", f"{stale} is not the value of its origin")
            return
        values = {o.symbol: mpmath.mpf(o.value) for o in step.operands}
        values[step.symbol] = mpmath.mpf(step.value)
        yield _check_equation(part, step.key, published, values)
        own[step.key] = step.value
    first = _value_of(record, route.key)
    if own.get(route.key) != route.value or first is None:
        yield Finding(part, route.key, "failed", "it does not end with its own value")
        return
    scale = max(abs(first), abs(route.value))
    difference = 0.0 if scale == 0 else (route.value - first) / scale
    agrees = abs(difference) <= LARGEST_DIFFERENCE and difference == route.difference
    reason = f"both routes differ by {difference:.1e}"
    yield Finding(part, route.key, "passed" if agrees else "failed", reason)


def _compared(part: str, key: str, value: Any, stored: float, what: str) -> Finding:
    scale = max(abs(float(value)), 1e-300)
    difference = float(abs(value - stored)) / scale
    verdict = "passed" if difference <= _TOLERANCE else "failed"
    return Finding(part, key, verdict, f"{what} differs by {difference:.1e}")


def _value_of(record: Record, key: str) -> float | None:
    for item in record.inputs:
        if item.key == key:
            return item.value
    return next((step.value for step in record.steps if step.key == key), None)
