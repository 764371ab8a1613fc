"""Units, absolute or incremental words, plane, compensation side: how the words of a block are read."""

from __future__ import annotations

from auditor.interpret.registry import Phase, modal
from auditor.interpret.run import Run
from auditor.interpret.travel import close_chain, settle
from auditor.interpret.words import BlockWords


@modal(Phase.READING, "inch", "metric")
def units(run: Run, words: BlockWords) -> None:
    """Inch or metric words from here on."""
    inch = words.calls("inch")
    if run.moved and inch != run.state.inch:
        settle(run)
        run.remark("units-switched", "the unit changes after motion: words change their size, offsets do not", "G")
    run.state.inch = inch
    run.units_said = True


@modal(Phase.READING, "absolute", "incremental")
def absolute(run: Run, words: BlockWords) -> None:
    """Systems B and C: whether X and Z are points or distances."""
    run.state.absolute = not words.calls("incremental")


@modal(Phase.READING, "return to initial level", "return to R level")
def return_level(run: Run, words: BlockWords) -> None:
    """Systems B and C: where a drilling cycle ends."""
    run.state.return_to_initial = words.calls("return to initial level")


@modal(Phase.MODE, "plane XY", "plane ZX", "plane YZ")
def plane(run: Run, words: BlockWords) -> None:
    """The plane of arcs; turning knows ZX alone."""
    run.state.plane = next(name for name in reversed(words.functions) if name.startswith("plane "))


@modal(Phase.MODE, "compensation left", "compensation right")
def compensation_on(run: Run, words: BlockWords) -> None:
    """G41 and G42: the next move with motion starts the compensated path."""
    close_chain(run)
    left = words.calls("compensation left") != (run.control.arcs == "mirrored")
    side = "left" if left else "right"
    state = run.state
    if state.compensation not in ("off", side):
        run.remark(
            "compensation-change",
            "the side of compensation changes without G40 between",
            "G",
            remedy="cancel with G40 in a move of its own first",
        )
        settle(run)
    if state.compensation == "off" and run.compensated.open:
        settle(run)
    state.compensation = "left" if side == "left" else "right"
    tool = run.tool
    if tool is not None and tool.tip in (0, 9):
        run.remark(
            "compensation-tip",
            f"tool {tool.number} has tip number {tool.tip}: the programmed point is the "
            "nose centre; touched off at the edge, the path is shifted by the nose radius",
            "G",
        )


@modal(Phase.MODE, "compensation off")
def compensation_off(run: Run, words: BlockWords) -> None:
    """G40: the next move with motion ends on its programmed point again."""
    if run.state.compensation == "off":
        return
    close_chain(run)
    run.state.compensation = "off"
    run.compensated.cancelling = run.compensated.open
