"""A declared tool as an outline.

Canonical frame: ``x`` along the feed of the tool's style, ``y`` in the depth direction, away from the finished
surface. The main edge leaves the corner at kappa_r, the minor edge at kappa_r + epsilon_r; so the outline of
every indexable insert follows from its angles (ISO 1832, ISO 3002-1).
"""

from __future__ import annotations

import math

from auditor.declared.model import Tool
from auditor.interpret.compensation import TIP_VECTORS
from auditor.simulate.outline import Corner, Outline
from auditor.simulate.samples import Part

EDGE_LENGTH_WHEN_UNKNOWN = 15.0  # mm, when neither insert code nor length is declared
THREAD_FLANK = 2.8  # mm, flank of a thread tool: deep enough for 4 mm of lead, slim at a shoulder (common practice)
REACH = 60.0  # mm a grooving blade or a drill is followed behind its edge

Vertex = tuple[float, float]


def tool_outline(tool: Tool) -> Outline:
    """The outline of a tool relative to its programmed point."""
    if tool.kind == "drilling":
        return Outline(tool.number, _drill_corners(tool))
    if tool.shape == "R" and tool.kind not in ("grooving", "parting", "face grooving", "threading"):
        return _placed(tool, (_round_insert(tool),))
    vertices, sides = _blade(tool) if tool.width is not None and _is_blade(tool) else _insert(tool)
    vertices, sides = _oriented(tool, vertices, sides)
    radius = tool.nose_radius
    rounded = {0, len(vertices) - 1} if _is_blade(tool) and _mirrored(tool) else {0, 1} if _is_blade(tool) else {0}
    corners = _corners(vertices, sides, {index: radius for index in rounded})
    return _placed(tool, corners)


def _is_blade(tool: Tool) -> bool:
    return tool.kind in ("grooving", "parting", "face grooving") and tool.width is not None


def _blade(tool: Tool) -> tuple[list[Vertex], list[Part]]:
    """Parallel sides, front edge between two corners; the first corner is the one nearer the chuck or axis."""
    width = tool.width or 0.0
    front = [(0.0, 0.0), (width, 0.0), (width, REACH), (0.0, REACH)]
    if tool.kind == "face grooving":
        front = [(0.0, 0.0), (REACH, 0.0), (REACH, width), (0.0, width)]
        return front, [Part.MINOR, Part.BACK, Part.MINOR, Part.MAIN]
    return front, [Part.MAIN, Part.MINOR, Part.BACK, Part.MINOR]


def _insert(tool: Tool) -> tuple[list[Vertex], list[Part]]:
    """The insert's polygon with the active corner first, counter-clockwise in (x, y), mapped to (z, r)."""
    length = tool.edge_length or (THREAD_FLANK if tool.kind == "threading" else EDGE_LENGTH_WHEN_UNKNOWN)
    epsilon = math.radians(tool.included_angle)
    turns = _turns(tool.shape, epsilon)
    lengths = [length] * len(turns)
    if tool.minor_edge_length is not None and len(turns) == 4:
        lengths = [length, tool.minor_edge_length] * 2
    heading = math.radians(tool.cutting_edge_angle)
    x = y = 0.0
    outline: list[Vertex] = []
    for turn, step in zip(turns, lengths, strict=True):
        outline.append((x, y))
        x, y = x + step * math.cos(heading), y + step * math.sin(heading)
        heading += turn
    sides = [Part.MAIN, *[Part.BACK] * (len(turns) - 2), Part.MINOR]
    if tool.edge_faces_end:
        return [(py, -px) for px, py in outline], sides
    # side styles: x is -z, which turns the polygon over
    return _reversed([(-px, py) for px, py in outline], sides)


def _turns(shape: str | None, epsilon: float) -> list[float]:
    """How far the outline turns at each corner behind the first edge, ISO 1832 shapes, rad."""
    if shape == "W":
        return [math.radians(20.0), math.radians(100.0)] * 3
    if shape in ("T", "S", "H", "O", "P"):
        count = round(math.tau / (math.pi - epsilon))
        return [math.tau / count] * count
    return [epsilon, math.pi - epsilon] * 2


def _reversed(vertices: list[Vertex], sides: list[Part]) -> tuple[list[Vertex], list[Part]]:
    """The mirrored polygon in counter-clockwise order again, first corner kept first."""
    return [vertices[0], *vertices[:0:-1]], sides[::-1]


def _signs(tool: Tool) -> tuple[float, float]:
    """Where the nose points: (z, r), from the tip number, else from kind and hand."""
    z, r = TIP_VECTORS[tool.tip]
    return (
        z or (1 if tool.hand == "left" else -1),
        r or (1 if tool.kind == "boring" else -1),
    )


def _mirrored(tool: Tool) -> bool:
    sign_z, sign_r = _signs(tool)
    return sign_z * sign_r < 0


def _oriented(tool: Tool, vertices: list[Vertex], sides: list[Part]) -> tuple[list[Vertex], list[Part]]:
    """From the canonical corner towards the chuck and the axis to where the nose really points."""
    sign_z, sign_r = _signs(tool)
    turned = [(-z * sign_z, -r * sign_r) for z, r in vertices]
    return _reversed(turned, sides) if _mirrored(tool) else (turned, sides)


def _round_insert(tool: Tool) -> Corner:
    return Corner((0.0, 0.0), tool.nose_radius, 0.0, math.tau, Part.NOSE)


def _drill_corners(tool: Tool) -> tuple[Corner, ...]:
    radius = (tool.diameter or 0.0) / 2.0
    point = radius / math.tan(math.radians(tool.point_angle) / 2.0)
    vertices = [(0.0, 0.0), (point + REACH * 4, 0.0), (point + REACH * 4, radius), (point, radius)]
    return _corners(vertices, [Part.BACK, Part.BACK, Part.MINOR, Part.MAIN], {})


def _corners(vertices: list[Vertex], sides: list[Part], rounding: dict[int, float]) -> tuple[Corner, ...]:
    count = len(vertices)
    corners = []
    for index, (z, r) in enumerate(vertices):
        before, behind = vertices[index - 1], vertices[(index + 1) % count]
        begin = _normal_angle(before, (z, r))
        turn = (_normal_angle((z, r), behind) - begin) % math.tau
        radius = rounding.get(index, 0.0)
        # the centre lies inside, on the bisector of the two outward normals
        reach = radius / math.cos(turn / 2.0)
        middle = begin + turn / 2.0
        centre = (z - reach * math.cos(middle), r - reach * math.sin(middle))
        corners.append(Corner(centre, radius, begin, begin + turn, sides[index]))
    return tuple(corners)


def _normal_angle(start: Vertex, end: Vertex) -> float:
    """Angle of the outward normal of a counter-clockwise side."""
    return math.atan2(-(end[0] - start[0]), end[1] - start[1])


def _placed(tool: Tool, corners: tuple[Corner, ...]) -> Outline:
    """Shift so that the programmed point, ``nose centre + radius * tip vector``, is the origin."""
    nose = corners[0]
    vector = TIP_VECTORS[tool.tip]
    point = (nose.centre[0] + nose.radius * vector[0], nose.centre[1] + nose.radius * vector[1])
    return Outline(
        tool.number,
        tuple(
            Corner((c.centre[0] - point[0], c.centre[1] - point[1]), c.radius, c.begin, c.end, c.side)
            for c in corners
        ),
    )
