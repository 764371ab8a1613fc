"""A fault shown where it stands: the line, and a caret under the place."""

from __future__ import annotations

from auditor.parse.blocks import Block

_WINDOW = 100  # columns of a long line shown around the place
_LEAD = 40


def caret(block: Block) -> str:
    """Place, message, source line and a caret under the fault of a block; empty without a fault.

    >>> from auditor.parse import parse_text
    >>> print(caret(parse_text("N10 G0 X10,5").blocks[0]))
    line 1, column 8: X10,5 has a comma inside its number (decimal comma? a decimal point is wanted)
        N10 G0 X10,5
               ^^^^^
    """
    fault = block.fault
    if fault is None:
        return ""
    first = max(0, fault.start - _LEAD) if len(block.text) > _WINDOW else 0
    shown = "".join(character if character.isprintable() else " " for character in block.text[first : first + _WINDOW])
    width = max(1, min(fault.end - fault.start, len(shown) - (fault.start - first)))
    hint = f" ({fault.hint})" if fault.hint else ""
    return (
        f"line {block.line}, column {fault.start + 1}: {fault.message}{hint}\n"
        f"    {shown}\n"
        f"    {' ' * (fault.start - first)}{'^' * width}"
    )
