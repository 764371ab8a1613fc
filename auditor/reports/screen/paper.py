"""The sheet a terminal report is written on: paragraphs that keep their margin, in as many signs as the screen has."""

from __future__ import annotations

import re
from io import StringIO

from rich.cells import cell_len, set_cell_size
from rich.console import Console
from rich.text import Text

from auditor.reports import View
from auditor.reports._figures import harmless, plain

Piece = str | tuple[str, str]  # text, or text with a style

_SIGNS = {
    "stop": ("■", "#"), "incomplete": ("◧", "%"), "review": ("▲", "^"), "note": ("·", "-"), "clear": ("○", "o"),
    "unreadable": ("✕", "x"), "sure": ("━", "="), "band": ("╌", "-"), "value": ("●", "o"), "limit": ("┃", "|"),
    "rule": ("─", "-"), "cut": ("…", ".."), "none": (" ", " "), "under": ("‾", "~"),
}
COLOURS = {
    "stop": "bold red", "incomplete": "bold magenta", "review": "bold yellow", "note": "cyan", "clear": "bold green",
    "unreadable": "bold red",
}

# A figure and its unit stay on one line: the blank between them is held by a sign that no clean text contains.
_UNIT = re.compile(r"(?<=\d) (?=(?:N m|N|kN|kW|mm|um|m|m/min|mm/rev|rpm|deg|min|s|%)(?![\w/]))")
_HELD = "\ue000"


def signs() -> str:
    """Every sign a full report may need beyond ASCII, for asking whether an encoding holds them."""
    return "".join(full for full, _ in _SIGNS.values())


class Paper:
    """Collects paragraphs; ``text()`` gives the sheet. Nothing on it is wider than the view."""

    def __init__(self, view: View) -> None:
        self.view = view
        self._file = StringIO()
        self._console = Console(
            file=self._file, width=view.width, force_terminal=view.colour, no_color=not view.colour,
            color_system="standard" if view.colour else None, legacy_windows=False, highlight=False, markup=False,
            emoji=False, soft_wrap=False, _environ={},
        )

    def sign(self, name: str) -> str:
        """The sign of that name on this screen."""
        return _SIGNS[name][self.view.plain]

    def clean(self, text: str) -> str:
        """Any text made fit for this screen."""
        safe = harmless(text.replace("\n", " "))
        return plain(safe) if self.view.plain else safe

    def quote(self, text: str) -> str:
        """The program's own line, sign by sign, so that marks below it stay in place."""
        safe = harmless(text)
        return safe.encode("ascii", "replace").decode("ascii") if self.view.plain else safe

    def paragraph(self, *pieces: Piece, margin: int = 0, hang: int | None = None) -> None:
        """A paragraph wrapped between its margin and the right edge; ``hang`` is the margin of its further lines."""
        text = Text()
        for piece in pieces:
            words, style = (piece, "") if isinstance(piece, str) else piece
            text.append(_UNIT.sub(_HELD, self.clean(words)), style=style)
        further = margin if hang is None else hang
        lines = text.wrap(self._console, self.view.width - max(margin, further))
        for number, line in enumerate(lines):
            line.rstrip()
            line.plain = line.plain.replace(_HELD, " ")
            self._write(Text(" " * (further if number else margin)) + line)

    def row(self, *pieces: Piece) -> None:
        """One line as it stands, cut at the right edge; its texts are taken to be clean."""
        text = Text()
        for piece in pieces:
            words, style = (piece, "") if isinstance(piece, str) else piece
            text.append(words, style=style)
        text.truncate(self.view.width, overflow="crop")
        text.rstrip()
        self._write(text)

    def gap(self) -> None:
        """An empty line."""
        self._file.write("\n")

    def text(self) -> str:
        """The sheet."""
        return self._file.getvalue()

    def fit(self, text: str, width: int, *, right: bool = False) -> str:
        """Clean text cut or filled to a column of that width."""
        clean = self.clean(text)
        if cell_len(clean) > width:
            cut = self.sign("cut")
            clean = set_cell_size(clean, max(0, width - cell_len(cut))).rstrip() + cut
        fill = " " * (width - cell_len(clean))
        return fill + clean if right else clean + fill

    def fit_path(self, path: str, width: int) -> str:
        """A path that keeps its end when it must be cut."""
        clean = self.clean(path)
        cut = self.sign("cut")
        if cell_len(clean) <= width:
            return clean
        while clean and cell_len(clean) > width - cell_len(cut):
            clean = clean[1:]
        return cut + clean

    def _write(self, text: Text) -> None:
        self._console.print(text, crop=False, no_wrap=True, overflow="ignore")
