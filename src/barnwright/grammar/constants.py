"""The value of a part of a text that holds numbers only."""

from __future__ import annotations

import math

from barnwright.grammar.tree import Binary, Call, Name, Negation, Node, Number, Operator


def constant_of(node: Node) -> float | None:
    """The value of numbers and operators; None where a name or a function takes part.

    Worked out in floats and without recursion: infinite where it overflows or divides by 0, not a number where it is
    not real.
    """
    values: list[float] = []
    waiting: list[tuple[Node, bool]] = [(node, False)]
    while waiting:
        current, ready = waiting.pop()
        match current:
            case Name() | Call():
                return None
            case Number(value=value):
                values.append(value)
            case Negation(operand=operand) if not ready:
                waiting += [(current, True), (operand, False)]
            case Negation():
                values.append(-values.pop())
            case Binary(left=left, right=right) if not ready:
                waiting += [(current, True), (right, False), (left, False)]
            case Binary(operator=operator):
                second, first = values.pop(), values.pop()
                values.append(_worked_out(operator, first, second))
    return values.pop()


def _worked_out(operator: Operator, first: float, second: float) -> float:
    try:
        match operator:
            case "+":
                return first + second
            case "-":
                return first - second
            case "*":
                return first * second
            case "/":
                return first / second
        power = first**second
    except (OverflowError, ZeroDivisionError):
        return math.inf
    return power if isinstance(power, float) else math.nan
