"""The words of a block with their expressions worked out."""

from __future__ import annotations

from dataclasses import dataclass

from auditor.declared.control_settings import choice
from auditor.interpret.cycles.call import INCH
from auditor.interpret.run import Run
from auditor.interpret.statements import calculator, named
from auditor.interpret.words import BlockWords, Value, least_increment, ready_words
from auditor.parse.blocks import Block, Number, Word


@dataclass
class UnknownValues(Exception):  # noqa: N818 - not an error: the block is left out and said so
    """Words of a block rest on variables whose values only the control knows."""

    words: BlockWords  # the words that are known
    letters: tuple[str, ...]  # those that are not
    variables: frozenset[int]

    @property
    def named(self) -> str:
        """The variables as a person writes them."""
        return named(set(self.variables))

    def __str__(self) -> str:
        return f"{self.named} is not known"


def read_block(run: Run, block: Block) -> BlockWords:
    """The words of a block; a word with a null value is left out.

    Raises
    ------
    ExpressionFault
        When an expression has no value.
    UnknownValues
        When a word rests on a variable that only the control knows.
    """
    line, label = run.flow.place(block)
    values: list[Value] = []
    unknown: dict[str, set[int]] = {}
    for word in block.words:
        if isinstance(word.value, Number):
            values.append(Value(word.letter, word.value, word.start, word.end))
            continue
        value = _worked_out(run, word)
        if run.variables.unknown:
            unknown[word.letter] = run.variables.take_unknown()
        elif value is None:
            text = f"{word.letter} has a variable without a value: the word is left out"
            run.remark("unknown-variable", text, word.letter)
        else:
            number = Number(value, True, f"{value:.10g}")
            values.append(Value(word.letter, number, word.start, word.end, computed=True))
    words = ready_words(line, label, block.text, values, run.system)
    if unknown:
        raise UnknownValues(words, tuple(unknown), frozenset().union(*unknown.values()))
    return words


def _worked_out(run: Run, word: Word) -> float | None:
    """The value of a word; ROUND goes to the least increment, in the unit of the program."""
    if choice(run.control, "round_in_word") == "integer":
        return calculator(run).value(word.value)
    step = least_increment(run.control, inch=run.state.inch) / (INCH if run.state.inch else 1.0)
    return calculator(run, increment=step).value(word.value)
