"""A programmer's hand: writes blocks in system A, B or C, in many spellings, and notes the steps they mean."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, field
from random import Random
from typing import Any

from tests.interpret.reference.roughing import Contour
from tests.interpret.reference.steps import Piece, Step

CODES = {
    "box": ("G90", "G77", "G20"),
    "thread": ("G92", "G78", "G21"),
    "face": ("G94", "G79", "G24"),
    "stroke": ("G32", "G33", "G33"),
    "finish": ("G70", "G70", "G72"),
    "rough": ("G71", "G71", "G73"),
    "rough face": ("G72", "G72", "G74"),
    "pattern": ("G73", "G73", "G75"),
    "peck z": ("G74", "G74", "G76"),
    "peck x": ("G75", "G75", "G77"),
    "passes": ("G76", "G76", "G78"),
    "preset": ("G50", "G92", "G92"),
    "per rev": ("G99", "G95", "G95"),
    "per min": ("G98", "G94", "G94"),
    "inch": ("G20", "G20", "G70"),
    "metric": ("G21", "G21", "G71"),
}
SWAPPED = {"G2": "G3", "G3": "G2", "G41": "G42", "G42": "G41"}
INCH = 25.4


@dataclass
class Pen:
    """Lengths are in the program's own unit; `noted` turns them into mm at the end."""

    rng: Random
    system: str = "A"
    inch: bool = False
    increments: bool = False  # numbers without a point are counts of the least increment
    radius: bool = False  # X words are radius values
    mirrored: bool = False
    untidy: bool = True
    settings: dict[str, Any] = field(default_factory=dict)
    nose: float = 0.0
    tip: int = 3
    lines: list[str] = field(default_factory=list)
    steps: list[tuple[int, Step]] = field(default_factory=list)
    x: float = 0.0
    z: float = 0.0
    incremental: bool = False  # G91, systems B and C
    feed: float = 0.0  # in force
    feeds: list[float | None] = field(default_factory=list)  # F words of the pieces of the contour written last

    # numbers ------------------------------------------------------------------------------------------------

    def size(self, low: float, high: float, grid: float = 0.1) -> float:
        """A random length in the program's unit; bounds in mm."""
        if self.inch:
            low, high, grid = low / 25, high / 25, max(0.001, grid / 25)
        return round(round(self.rng.uniform(low, high) / grid) * grid, 6)

    def mm(self, value: float) -> float:
        """A length known in mm."""
        return value / INCH if self.inch else value

    def number(self, value: float) -> str:
        """A length in one of its spellings."""
        value = round(value, 6)
        digits = 4 if self.inch else 3
        text = f"{abs(value):.{digits}f}"
        whole, part = text.split(".")
        part = part.rstrip("0")
        sign = "-" if value < 0 and float(text) else self.rng.choice(["", "", "+"]) if self.untidy else ""
        forms = [f"{whole}.{part}"]
        if self.untidy:
            forms += [f"{whole}.{part}0", f"0{whole}.{part}"]
            if whole == "0" and part:
                forms.append(f".{part}")
            if self.increments:
                forms.append(str(round(float(text) * 10**digits)))
            elif not part:
                forms.append(whole)
        return sign + self.rng.choice(forms)

    def counted(self, value: float) -> str:
        """A length as a count of the least increment (P, Q, D of the cycles)."""
        return str(round(value * (10000 if self.inch else 1000)))

    def x_word(self, value: float, letter: str = "X") -> str:
        return letter + self.number(value / 2 if self.radius else value)

    # words ----------------------------------------------------------------------------------------------------

    def g(self, name: str) -> str:
        """A code: by name from the tables of the systems, or as given."""
        code = CODES[name]["ABC".index(self.system)] if name in CODES else name
        if self.mirrored:
            code = SWAPPED.get(code, code)
        if self.untidy and len(code) == 2:
            return self.rng.choice([code, "G0" + code[1], "G00" + code[1]])
        return code

    def feed_word(self, value: float) -> str:
        """F, in force from now on. It carries its point: without one its meaning is a setting of its own."""
        self.feed = value
        return "F" + f"{value:.5f}".rstrip("0")

    def axes(
        self, x: float | None = None, z: float | None = None, steady: bool = False, always: bool = False
    ) -> list[str]:
        """Words for a move to a place, which becomes the present one.

        `steady` keeps to absolute words, `always` names G90 or G91 even where it is in force.
        """
        words = []
        if self.system == "A":
            if x is not None:
                inc = not steady and self.rng.random() < 0.3
                words.append(self.x_word(x - self.x, "U") if inc else self.x_word(x))
            if z is not None:
                inc = not steady and self.rng.random() < 0.3
                words.append("W" + self.number(z - self.z) if inc else "Z" + self.number(z))
        else:
            words += self._mode(steady, always)
            base_x, base_z = (self.x, self.z) if self.incremental else (0.0, 0.0)
            if x is not None:
                words.append(self.x_word(x - base_x))
            if z is not None:
                words.append("Z" + self.number(z - base_z))
        self.x = self.x if x is None else x
        self.z = self.z if z is None else z
        return words

    def _mode(self, steady: bool, always: bool) -> list[str]:
        wanted = self.incremental if self.rng.random() < 0.7 else not self.incremental
        wanted = wanted and not steady
        if wanted == self.incremental and not always:
            return []
        self.incremental = wanted
        return ["G91" if wanted else "G90"]

    def absolute(self) -> list[str]:
        """The word that is needed so that X and Z are absolute."""
        if not self.incremental:
            return []
        self.incremental = False
        return ["G90"]

    # blocks ---------------------------------------------------------------------------------------------------

    def write(self, *words: str, n: int | None = None) -> None:
        """One block of words."""
        head = [] if n is None else [f"N{n:04d}" if self.untidy and self.rng.random() < 0.3 else f"N{n}"]
        self.lines.append(self._styled([*head, *(word for word in words if word)]))

    def _styled(self, words: Sequence[str]) -> str:
        if not self.untidy:
            return " ".join(words)
        gap = self.rng.choice([" ", " ", "", "\t", "  "])
        text = gap.join(words)
        if self.rng.random() < 0.15:
            text = text.lower()
        if self.rng.random() < 0.15:
            place = self.rng.randrange(len(words))
            pieces = [*words[: place + 1], "(X1. Z-99. G0; /%)", *words[place + 1 :]]
            text = gap.join(pieces)
        return text + self.rng.choice(["", "", "", ";", "  ", " (END)", " ; NOTE"])

    def note(self, *steps: Step) -> None:
        """The steps that the block written last means; what cuts without a feed of its own has the one in force."""
        for step in steps:
            fed = step if step.kind == "R" or step.feed is not None else step._replace(feed=self.feed)
            self.steps.append((len(self.lines), fed))

    def note_finish(self, *blocks: Sequence[Step]) -> None:
        """The steps of a finishing cycle: way in, those of each piece with the feed of its block, way back."""
        feeds = [None, *self.feeds, None]
        for steps, feed in zip(blocks, feeds, strict=True):
            self.feed = self.feed if feed is None else feed
            self.note(*steps)

    def here(self) -> tuple[float, float]:
        """Present place: z, r."""
        return self.z, self.x / 2

    def start(self, x: float, z: float) -> None:
        """Preamble and the first rapid."""
        self.write(self.g("inch" if self.inch else "metric"))
        self.write("G97", "S800", "M3")
        self.write(self.g("per rev"), self.feed_word(0.2 if not self.inch else 0.008))
        self.rapid(x, z, steady=True)

    def rapid(self, x: float | None = None, z: float | None = None, steady: bool = False, always: bool = False) -> None:
        words = self.axes(x, z, steady, always)
        self.write(self.g("G0"), *words)
        self.note(Step("R", self.x, self.z))

    def arc_words(self, piece: Piece) -> list[str]:
        """R, or I and K from the start where they come out even."""
        i, k, digits = piece.cr - piece.r0, piece.cz - piece.z0, 4 if self.inch else 3
        if self.rng.random() < 0.5 and abs(i - round(i, digits)) + abs(k - round(k, digits)) < 1e-9:
            return ["I" + self.number(i), "K" + self.number(k)]
        return ["R" + self.number(piece.radius)]

    def contour(
        self,
        contour: Contour,
        numbers: tuple[int, int],
        with_z: bool,
        with_x: bool,
        first: Sequence[str] = (),
        last: Sequence[str] = (),
    ) -> None:
        """Blocks ns..nf; `with_z`, `with_x`: which axes ns carries."""
        code = self.g("G0" if contour.mode == "R" else "G1")
        words = self.axes(2 * contour.r if with_x else None, contour.z if with_z else None, always=True)
        self.write(code, *first, *words, n=numbers[0])
        modal = "G0" if contour.mode == "R" else "G1"
        before = self.feed
        self.feeds = []
        for number, piece in enumerate(contour.pieces):
            name = {"F": "G1", "CW": "G2", "CCW": "G3"}[piece.kind]
            code = "" if name == modal and self.rng.random() < 0.8 else self.g(name)
            modal = name
            final = number == len(contour.pieces) - 1
            x = None if abs(piece.r1 - piece.r0) < 1e-9 and self.rng.random() < 0.8 else 2 * piece.r1
            z = None if abs(piece.z1 - piece.z0) < 1e-9 and self.rng.random() < 0.8 else piece.z1
            if x is None and z is None:
                z = piece.z1
            centre = self.arc_words(piece) if piece.is_arc else []
            feed = [self.feed_word(self.size(0.05, 0.15, 0.01))] if self.rng.random() < 0.2 else []
            self.feeds.append(self.feed if feed else None)
            self.write(code, *(last if final else ()), *self.axes(x, z), *centre, *feed,
                       n=numbers[1] if final else None)  # fmt: skip
        self.feed = before

    # what it all means ----------------------------------------------------------------------------------------

    def text(self) -> str:
        return "\n".join(self.lines) + "\n"

    def noted(self) -> list[tuple[int, Step]]:
        """The steps in mm."""
        scale = INCH if self.inch else 1.0
        return [(line, _scaled(step, scale)) for line, step in self.steps]

    def control(self) -> dict[str, Any]:
        """What has to be declared so that the text is read as it was meant."""
        return {
            "system": self.system,
            "whole_numbers": "increments" if self.increments else "units",
            "x_words": "radius" if self.radius else "diameter",
            "arcs": "mirrored" if self.mirrored else "standard",
            "settings": self.settings,
        }


def _scaled(step: Step, scale: float) -> Step:
    rest: Iterable[float | None] = (None if v is None else v * scale for v in (step.cx, step.cz, step.feed))
    return Step(step.kind, step.x * scale, step.z * scale, *rest)
