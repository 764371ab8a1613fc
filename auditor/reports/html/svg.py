"""Writing pictures: a few marks of SVG, every text escaped, every number short."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from contextlib import contextmanager

from markupsafe import Markup, escape

from auditor.reports._figures import harmless

Number = float | int
Point = tuple[float, float]


def short(value: Number) -> str:
    """A coordinate with as many decimals as an eye can see.

    >>> short(12.0), short(-0.04), short(3.14159)
    ('12', '0', '3.1')
    """
    text = f"{value:.1f}"
    text = text.removesuffix(".0")
    return "0" if text == "-0" else text


def polyline(points: Iterable[Point], *, closed: bool = False) -> str:
    """Path data through points.

    >>> polyline([(0, 0), (10, 5.25)], closed=True)
    'M0 0L10 5.2z'
    """
    data = "L".join(f"{short(x)} {short(y)}" for x, y in points)
    return f"M{data}{'z' if closed else ''}" if data else ""


_CAMELS = ("viewBox", "patternUnits", "patternTransform")


class Drawing:
    """Collects elements; ``svg()`` gives the picture with its title and description for those who cannot see it."""

    def __init__(self, name: str, width: Number, height: Number, title: str, description: str) -> None:
        self.name, self.width, self.height = name, width, height
        self.title, self.description = title, description
        self._parts: list[str] = []

    def add(self, tag: str, **attributes: object) -> None:
        """One element; ``class_`` and ``stroke_width`` stand for ``class`` and ``stroke-width``."""
        self._parts.append(f"<{tag}{_written(attributes)}/>")

    def path(self, points: Iterable[Point], style: str, *, closed: bool = False, **attributes: object) -> None:
        """A line through points."""
        self.add("path", **{"d": polyline(points, closed=closed), "class_": style, **attributes})

    def text(self, x: Number, y: Number, words: str, style: str = "label", **attributes: object) -> None:
        """Words at a place."""
        head = _written({"x": x, "y": y, "class_": style, **attributes})
        self._parts.append(f"<text{head}>{_safe(words)}</text>")

    def hint(self, words: str) -> None:
        """What a reader is told who stays on the element that holds it."""
        self._parts.append(f"<title>{_safe(words)}</title>")

    @contextmanager
    def inside(self, tag: str, **attributes: object) -> Iterator[None]:
        """Everything added meanwhile stands inside this element."""
        self._parts.append(f"<{tag}{_written(attributes)}>")
        yield
        self._parts.append(f"</{tag}>")

    def raw(self, markup: Markup) -> None:
        """Markup that is known to be sound."""
        self._parts.append(str(markup))

    def svg(self, style: str = "", *, linked: bool = False) -> Markup:
        """The picture; ``linked`` when it holds links, which a mere image would hide from a screen reader."""
        head = _written({
            "id": self.name, "class_": style or None, "viewBox": f"0 0 {short(self.width)} {short(self.height)}",
            "role": "group" if linked else "img", "aria_labelledby": f"{self.name}-t {self.name}-d",
            "xmlns": "http://www.w3.org/2000/svg",
        })
        told = (
            f'<title id="{escape(self.name)}-t">{_safe(self.title)}</title>'
            f'<desc id="{escape(self.name)}-d">{_safe(self.description)}</desc>'
        )
        return Markup(f"<svg{head}>{told}{''.join(self._parts)}</svg>")


def _safe(text: str) -> Markup:
    return escape(harmless(text))


def _written(attributes: dict[str, object]) -> str:
    written = []
    for key, value in attributes.items():
        if value is None:
            continue
        name = key if key in _CAMELS else key.rstrip("_").replace("_", "-")
        told = short(value) if isinstance(value, (int, float)) else str(value)
        written.append(f' {name}="{_safe(told)}"')
    return "".join(written)
