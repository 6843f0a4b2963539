"""Walk an expression for its text: as a formula in names, or with the numbers of one row put in."""

from __future__ import annotations

from collections.abc import Callable

from audit.expression.nodes import Arithmetic, Call, Compare, Join, Name, Negative, Node, Not, Number, Truth

NOT_KNOWN = "not known"
EITHER_SERVES = ("greater", "lesser", "first_known")
Render = Callable[[str], str]
_SIGNS = {"*": "×", "/": "/", "+": "+", "-": "−", "<=": "≤", ">=": "≥", "==": "=", "!=": "≠", "<": "<", ">": ">"}
_STRENGTH = {"+": 1, "-": 1, "*": 2, "/": 2}


def plain_number(value: float) -> str:
    """Write a number as a person would: four significant digits, thousands separated, no needless zeros.

    >>> [plain_number(x) for x in (1020.0, 0.05, 12345.6, 1.7, float("inf"))]
    ['1,020', '0.05', '12,350', '1.7', 'no end']
    """
    if value != value:
        return "unknown"
    if value in (float("inf"), float("-inf")):
        return "no end"
    magnitude = abs(value)
    if magnitude >= 1000:
        return f"{float(f'{value:.4g}'):,.0f}"
    return f"{float(f'{value:.4g}'):g}" if magnitude >= 1e-4 or value == 0 else f"{value:.2g}"


def render(node: Node, name_of: Render, words: Callable[[str], str] = lambda function: function) -> str:
    """Write an expression; `name_of` says what to put for each name, `words` how a function reads.

    >>> from audit.expression.parse import parse
    >>> render(parse("1.7 * (a + b)"), {"a": "600 A", "b": "20 A"}.__getitem__)
    '1.7 × (600 A + 20 A)'
    """
    match node:
        case Number(value):
            return plain_number(value)
        case Truth(value):
            return "yes" if value else "no"
        case Name(name):
            return name_of(name)
        case Negative(operand):
            return f"−{render(operand, name_of, words)}"
        case Not(operand):
            return f"not ({render(operand, name_of, words)})"
        case Arithmetic(operator, left, right):
            first = _wrapped(left, operator, name_of, words, right_side=False)
            second = _wrapped(right, operator, name_of, words, right_side=True)
            return f"{first} {_SIGNS[operator]} {second}"
        case Compare(operator, left, right):
            return f"{render(left, name_of, words)} {_SIGNS[operator]} {render(right, name_of, words)}"
        case Join(operator, operands):
            inner = [render(o, name_of, words) for o in operands]
            return f" {operator} ".join(
                f"({t})" if isinstance(o, Join) else t for o, t in zip(operands, inner, strict=True)
            )
        case Call(function, operands):
            inner = [render(operand, name_of, words) for operand in operands]
            if function in EITHER_SERVES:
                # what is not known had no say where another operand was
                inner = [text for text in inner if NOT_KNOWN not in text] or inner
            return (
                inner[0] if len(inner) == 1 and function in EITHER_SERVES else f"{words(function)} ({'; '.join(inner)})"
            )


def _wrapped(node: Node, operator: str, name_of: Render, words: Callable[[str], str], *, right_side: bool) -> str:
    text = render(node, name_of, words)
    if isinstance(node, Arithmetic):
        weaker = _STRENGTH[node.operator] < _STRENGTH[operator]
        equal_right = right_side and _STRENGTH[node.operator] == _STRENGTH[operator] and operator in "-/"
        if weaker or equal_right:
            return f"({text})"
    return text
