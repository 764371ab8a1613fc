"""What has to be in force before a cut: feed, turning spindle, a known speed, a tool with its offset."""

from __future__ import annotations

from auditor.interpret.run import Run

COARSE_FEED = 2.0  # mm/rev, beyond it a feed per revolution looks like a feed per minute; common practice
SLOW_FEED = 5.0  # mm/min, below it a feed per minute looks like a feed per revolution; common practice


def check_cut(run: Run, *, thread: bool = False) -> None:
    """Remark on what is missing for a cut, each thing once as long as nothing about it changes."""
    if run.collected is not None and not run.profile_is_cut:
        return
    _check_feed(run, thread)
    _check_spindle(run, thread)
    _check_tool(run)


def _check_feed(run: Run, thread: bool) -> None:
    feed = run.state.feed
    if not feed.certain:
        return
    tool_line = run.state.tool.line
    if feed.value is None:
        if run.log.first_time("feed-missing", tool_line):
            run.remark("feed-missing", "no feed has been programmed before this cut")
        return
    if feed.value <= 0.0:
        if run.log.first_time("feed-zero", feed.line):
            run.remark("feed-zero", f"a feed of {feed.value:g} moves nothing", "F", value=feed.value)
        return
    changed = feed.given_in != feed.mode and not thread
    if changed and run.log.first_time("feed-mode-without-feed", feed.line, feed.mode):
        given, now = _feed_text(feed.given_in, feed.value), _feed_text(feed.mode, feed.value)
        run.remark(
            "feed-mode-without-feed",
            f"the feed was given as {given} and now counts as {now}",
            value=feed.value,
            unit=f"mm/{feed.mode}",
            remedy="give F again in the block that changes the feed mode",
        )
    implausible = (feed.mode == "rev" and feed.value > COARSE_FEED) or (feed.mode == "min" and feed.value < SLOW_FEED)
    if implausible and not thread and run.log.first_time("feed-implausible", feed.line, feed.mode):
        run.remark(
            "feed-implausible",
            f"{_feed_text(feed.mode, feed.value)} in a cut: is the feed mode the one meant?",
            "F",
            value=feed.value,
            limit=COARSE_FEED if feed.mode == "rev" else SLOW_FEED,
            unit=f"mm/{feed.mode}",
        )


def _feed_text(mode: str, value: float) -> str:
    return f"{value:g} mm per {'revolution' if mode == 'rev' else 'minute'}"


def _check_spindle(run: Run, thread: bool) -> None:
    spindle = run.state.spindle
    if not spindle.certain:
        return
    if spindle.direction == 0:
        touches = run.tool is not None and run.tool.kind == "stop"
        if not touches and run.log.first_time("spindle-off", spindle.stopped_line, run.state.tool.line):
            run.remark("spindle-off", "the spindle stands: no M3 or M4 before this cut")
        return
    if spindle.speed_mode_line is not None:
        mode = "a surface speed" if spindle.mode == "surface" else "a spindle speed"
        known = "nothing is known" if spindle.value is None else f"the last value {spindle.value:.4g} acts"
        run.remark(
            "speed-mode-without-speed",
            f"line {spindle.speed_mode_line} changed to {mode} without a new S: {known}",
            remedy="give S in the block that changes the speed mode",
        )
        spindle.speed_mode_line = None
    elif spindle.value is None and run.log.first_time("speed-missing", spindle.stopped_line):
        run.remark("speed-missing", "the spindle was started but no S has been programmed before this cut")
    if thread and spindle.mode == "surface":
        run.remark(
            "speed-in-thread",
            "a thread under constant surface speed: the speed, and with it the start of the thread, shifts with X",
            remedy="call a spindle speed before threading",
        )


def _check_tool(run: Run) -> None:
    tool = run.state.tool
    if not tool.certain:
        return
    if tool.number is not None:
        cooled = run.log.wet_tools if run.state.coolant else run.log.dry_tools
        cooled.setdefault(tool.number, run.words.line)
    if tool.number is None:
        if run.log.first_time("no tool"):
            run.remark("offset-missing", "no tool has been called before this cut")
    elif tool.offset == 0 and run.log.first_time("offset-cancelled", tool.line):
        run.remark(
            "offset-cancelled",
            f"tool {tool.number} cuts with its offset cancelled",
            remedy=f"call the offset with T before the cut (tool word in line {tool.line})",
        )
