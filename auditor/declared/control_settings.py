"""The points on which controls differ: one table of settings that a job may put into ``[control]``.

Whoever reads a program for a control asks here, by name, and gets the declared value or the usual one.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from auditor.declared.model import Control

SettingValue = str | float | bool
Dimension = Literal["length", "angle", "number"]


@dataclass(frozen=True, slots=True)
class ControlSetting:
    """One point on which controls differ: what it is called, what it may be, what it changes."""

    name: str
    default: SettingValue  # lengths in mm, angles in degrees
    touches: str  # what of the program text reads differently
    choices: tuple[str, ...] = ()  # words it may be; empty for numbers, quantities and switches
    dimension: Dimension | None = None  # what kind of number it is
    low: float = 0.0  # least value allowed, numbers and quantities
    high: float = float("inf")  # greatest value allowed

    @property
    def wanted(self) -> str:
        """What a person may write there."""
        if self.choices:
            return " or ".join(f'"{word}"' for word in self.choices)
        if isinstance(self.default, bool):
            return "true or false"
        if self.dimension == "length":
            return 'a length like "0.5 mm"'
        if self.dimension == "angle":
            return 'an angle like "45 deg"'
        if self.high == float("inf"):
            return f"a number from {self.low:g}"
        return f"a number from {self.low:g} to {self.high:g}"


def _choice(name: str, choices: tuple[str, ...], touches: str) -> ControlSetting:
    return ControlSetting(name, choices[0], touches, choices=choices)


def _length(name: str, default: float, touches: str) -> ControlSetting:
    return ControlSetting(name, default, touches, dimension="length")


def _number(name: str, default: float, low: float, high: float, touches: str) -> ControlSetting:
    return ControlSetting(name, default, touches, dimension="number", low=low, high=high)


def _switch(name: str, default: bool, touches: str) -> ControlSetting:
    return ControlSetting(name, default, touches)


_TEXT = (
    _choice("semicolon", ("comment", "end of block"), "what follows a ; on the same line"),
    _switch("nested_comments", False, "whether ( ( ) ) closes at the first or at the last bracket"),
    _choice("corner_words", ("comma", "comma or plain"), "whether C, R, A break a corner in G1 without a comma too"),
    _length("feed_increment", 1.0, "F per revolution without a point under whole_numbers = increments: what F1 feeds"),
    _choice("cycle_words_with_point", ("accept", "refuse"), "P, Q, D of the cycles written with a decimal point"),
    _choice("cycle_depth_word", ("increments", "units"), "D without a point in one-block cycles: 0.001 mm or mm"),
    _choice("repeated_words", ("last", "refuse"), "the same address twice in a block"),
    _number("m_codes_per_block", 3, 1, 10, "how many M words a block may carry"),
    _choice("sequence_search", ("forward", "from start"), "where the search for a P, Q or GOTO number begins"),
    _choice("round_in_word", ("least increment", "integer"), "ROUND inside a word"),
    _choice("atan_range", ("0 to 360", "-180 to 180"), "the angle that ATAN returns"),
)
_MOTION = (
    _length("arc_tolerance", 0.02, "how far start and end radius of an arc may differ"),
    _choice("negative_arc_radius", ("refuse", "over half"), "R below zero in G2/G3"),
    _choice("arc_centres", ("incremental", "absolute"), "I and K"),
    _choice("rapid_path", ("dogleg", "straight"), "the path of a rapid in both axes"),
    _choice("machine_position_move", ("rapid", "active"), "whether G53 moves at rapid or by the code in force"),
    _choice("surface_speed_in_rapid", ("end point", "continuous"), "spindle speed under G96 during a rapid"),
    _choice("dwell", ("seconds", "revolutions"), "X or U of G4 under feed per revolution"),
    _number("offset_digits", 2, 1, 4, "how many last digits of the T word are the offset"),
    _choice("short_tool_word", ("tool and its offset", "offset"), "a T word with no more digits than the offset has"),
    _switch("offset_in_d_word", False, "whether D calls the offset instead of the T word"),
    _choice("offset_acts", ("next move", "at once"), "when a T word's offset moves the axes"),
    _choice("compensation_start", ("perpendicular", "intersection"), "the end of the first move under G41/G42"),
    _choice("compensation_corner", ("line", "arc"), "the link round an acute outside corner under G41/G42"),
)
_ROUGHING = (
    _length("rough_retract", 0.5, "retract of the roughing cycles when the program gives none"),
    _choice("rough_levels_from", ("shifted start", "start"), "the point from which roughing depths are counted"),
    _choice("rough_last_layer", ("profile pass", "own pass"), "who takes the last layer of a roughing cycle"),
    _choice("rough_escape", ("rapid", "feed"), "the 45 degree retract after each roughing cut"),
    _choice("pocket_order", ("depth first", "level by level"), "the order of the pockets in roughing of type II"),
    _choice("pocket_wall", ("follow", "leave"), "whether type II roughing goes up the wall behind each cut"),
    _switch("rough_compensation", False, "whether G41/G42 acts in the roughing cycles"),
    _choice("pattern_first_pass", ("full shift", "one step in"), "where pattern repeating begins"),
    _choice("taper_letter", ("R", "I or K"), "the taper word of the single cycles"),
    _switch("taper_stays", True, "whether the taper word of a single cycle holds for the blocks after it"),
)
_THREADING = (
    _number("thread_run_out", 0.0, 0, 12.7, "run-out of thread cycles in leads when the program gives none"),
    ControlSetting("thread_run_out_angle", 45.0, "angle of the run-out", dimension="angle", low=1.0, high=89.0),
    _choice("thread_shift", ("lead", "root", "none"), "how the start moves along Z with the depth (flank infeed)"),
    _number("thread_method", 1, 1, 4, "infeed law of the one-block thread cycle when P is not given"),
    _number("thread_finish_passes", 1, 1, 99, "passes at full depth in the one-block thread cycle"),
    _length("thread_least_infeed", 0.0, "smallest infeed of the one-block thread cycle"),
    _length("thread_finish_allowance", 0.0, "left for the finishing pass in the one-block thread cycle"),
)
_DRILLING = (
    _choice("peck", ("chip-break", "full retract"), "how far a drill is drawn back after each peck"),
    _length("drill_retract", 0.5, "drawing back, or distance above the last depth, in peck drilling"),
    _length("peck_retract", 0.5, "drawing back in the pecking cycles along Z and X when the program gives none"),
    _choice("drill_level", ("by system", "incremental", "absolute"), "R of the drilling cycles"),
    _number("bore_out_factor", 2.0, 0.1, 10, "feed out over feed in, boring cycle"),
)

SETTINGS: dict[str, ControlSetting] = {
    entry.name: entry for entry in (*_TEXT, *_MOTION, *_ROUGHING, *_THREADING, *_DRILLING)
}


def setting(control: Control, name: str) -> SettingValue:
    """The value in force: declared in ``[control]``, else the usual one. An unknown name is a KeyError."""
    return control.settings.get(name, SETTINGS[name].default)


def choice(control: Control, name: str) -> str:
    """A setting that is one of several words.

    Example
    -------
    >>> choice(Control(), "rapid_path")
    'dogleg'
    """
    value = setting(control, name)
    if not isinstance(value, str):
        raise TypeError(f"{name} is no choice of words")
    return value


def amount(control: Control, name: str) -> float:
    """A setting that is a number: mm, degrees or plain.

    Example
    -------
    >>> amount(Control(settings={"rough_retract": 0.3}), "rough_retract")
    0.3
    """
    value = setting(control, name)
    if isinstance(value, str | bool):
        raise TypeError(f"{name} is no number")
    return float(value)


def switch(control: Control, name: str) -> bool:
    """A setting that is on or off.

    Example
    -------
    >>> switch(Control(), "taper_stays")
    True
    """
    value = setting(control, name)
    if not isinstance(value, bool):
        raise TypeError(f"{name} is no switch")
    return value
