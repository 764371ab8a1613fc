"""Names of the facts an interpreter can notice about a program, grouped by the check that judges them.

A check selects the remarks whose topic stands in its group; the level is the check's business.
"""

from __future__ import annotations

TOPICS: dict[str, frozenset[str]] = {
    "not-understood": frozenset({
        "syntax", "unknown-g", "unknown-m", "unsupported", "unknown-variable", "position-unknown",
        "axis-not-modelled", "arithmetic", "text-after-end", "encoding", "comment-unclosed", "alarm", "earlier-part",
        "code-system-conflict",
    }),
    "speed-unclamped": frozenset({"clamp-missing", "clamp-too-high", "speed-mode-without-speed"}),
    "feed-missing": frozenset({"feed-missing", "feed-zero", "feed-mode-without-feed", "feed-implausible"}),
    "spindle-off": frozenset({"spindle-off", "speed-missing"}),
    "tool-undeclared": frozenset({"tool-undeclared", "tool-ambiguous"}),
    "offset-missing": frozenset({"offset-cancelled", "offset-missing", "offset-foreign"}),
    "plain-number": frozenset({"plain-number", "too-many-decimals", "blank-in-number"}),
    "units-mixed": frozenset({"units-missing", "units-switched", "code-systems-mixed"}),
    "arc-ends": frozenset({"arc-impossible", "arc-ends-differ", "arc-over-half", "arc-sense-suspect"}),
    "nose-compensation": frozenset({
        "compensation-left-on", "compensation-in-arc", "compensation-side", "compensation-too-small",
        "compensation-blank-blocks", "compensation-tip", "compensation-missing", "compensation-change",
    }),
    "cycle-faults": frozenset({
        "cycle-profile-missing", "cycle-profile-bad", "cycle-profile-far", "cycle-not-monotonic",
        "cycle-allowance-sign", "cycle-stored-value", "cycle-depth", "cycle-start", "cycle-corner", "cycle-peck",
        "cycle-relief", "cycle-word-with-point", "cycle-shift-with-pocket", "cycle-groove-step",
    }),
    "thread-passes": frozenset({"speed-in-thread"}),
    "program-flow": frozenset({
        "end-missing", "program-not-called", "subprogram-missing", "target-missing", "endless", "repeats-main",
        "number-repeated", "return-through-point", "word-repeated", "code-group-repeated", "m-codes-many",
        "travel-limit", "spindle-left-on", "coolant", "dwell", "block-skip", "stop-unattended", "preset",
        "work-zero-changed", "local-shift", "data-input", "home-unknown", "paren", "semicolon",
        "tool-in-motion", "safe-start",
    }),
}
