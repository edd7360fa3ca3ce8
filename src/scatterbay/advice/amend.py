"""The scenario file with panels added: the author's text, comments and all, and the new lines."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import yaml

from scatterbay.advice.linings import INSIDE, Lining, whole
from scatterbay.errors import UsageError


@dataclass(frozen=True)
class Addition:
    """A panel to be written: its name, where it goes, and the make-up as it is ordered."""

    name: str
    lining: Lining
    layers: str


def amended_text(text: str, additions: Sequence[Addition]) -> str:
    """The text of a scenario with panels added to its room.

    Raises
    ------
    UsageError : the text has no room section that can be added to.
    """
    for addition in additions:
        text = _with_one(text, addition)
    return text


def panel_line(addition: Addition) -> str:
    """The panel as a line of the file: its name, and where it goes."""
    lining = addition.lining
    parts = [f"on: {_quoted(lining.surface.host)}"]
    if lining.where != whole(lining.surface):
        parts += _position(lining)
    parts.append(f"add {lining.face}: {_quoted(addition.layers)}")
    return f"{_quoted(addition.name)}: {{{', '.join(parts)}}}"


def _position(lining: Lining) -> list[str]:
    (left, low), (right, high) = lining.where.low, lining.where.high
    surface = lining.surface
    if surface.kind in ("ceiling", "floor"):
        return [f"from: [{left:.4g}, {low:.4g}]", f"to: [{right:.4g}, {high:.4g}]"]
    start = surface.low[0] if surface.host != surface.face else 0.0
    return [
        f"from: {left - start:.4g} m", f"to: {right - start:.4g} m", f"bottom: {low:.4g} m", f"top: {high:.4g} m"
    ]  # fmt: skip


def _quoted(text: str) -> str:
    plain = all(c.isalnum() or c in " .-/_" for c in text) and text == text.strip() and not text[:1].isdigit()
    return text if plain else '"' + text.replace("\\", "\\\\").replace('"', '\\"') + '"'


def _with_one(text: str, addition: Addition) -> str:
    root = yaml.compose(text, Loader=yaml.SafeLoader)
    room = _value(root, "room")
    if not isinstance(room, yaml.MappingNode) or not room.value:
        raise UsageError("the scenario has no room that a panel can be added to")
    panels = _value(room, "panels")
    line = panel_line(addition)
    if isinstance(panels, yaml.MappingNode) and panels.value:
        return _into(text, panels, line)
    return _into(text, room, f"panels: {{{line}}}" if room.flow_style else f"panels:\n  {line}")


def _into(text: str, node: yaml.MappingNode, entry: str) -> str:
    """An entry as the last of a mapping, in the style it is written in."""
    end = _end(node)
    if node.flow_style:
        close = node.end_mark.index - 1
        return f"{text[:close].rstrip()}, {entry}{text[close:]}"
    indent = " " * node.value[0][0].start_mark.column
    newline = text.find("\n", end)
    at = len(text) if newline < 0 else newline + 1
    lines = "".join(f"{indent}{one}\n" for one in entry.split("\n"))
    before = text[:at] if text[:at].endswith("\n") else text[:at] + "\n"
    return before + lines + text[at:]


def _end(node: yaml.Node) -> int:
    """Where the last thing that is really written in a node ends."""
    if isinstance(node, yaml.MappingNode) and not node.flow_style and node.value:
        return _end(node.value[-1][1])
    if isinstance(node, yaml.SequenceNode) and not node.flow_style and node.value:
        return _end(node.value[-1])
    return int(node.end_mark.index)


def _value(node: yaml.Node | None, key: str) -> yaml.Node | None:
    if not isinstance(node, yaml.MappingNode):
        return None
    return next((value for name, value in node.value if name.value == key), None)


def words(lining: Lining) -> str:
    """Where a lining goes, in words that can go on a drawing."""
    surface, where = lining.surface, lining.where
    face = "inner" if lining.face == INSIDE else "outer"
    if surface.kind == "screen":
        face = "left" if lining.face == INSIDE else "right"
    if where == whole(surface):
        return f"all over the {face} face of {surface.host}"
    (left, low), (right, high) = where.low, where.high
    if surface.kind in ("ceiling", "floor"):
        return f"on the {face} face of the {surface.host}, x {left:.2f} to {right:.2f} m, y {low:.2f} to {high:.2f} m"
    return (
        f"on the {face} face of {surface.host}, from {left:.2f} to {right:.2f} m from {surface.corner}, "
        f"from {low:.2f} to {high:.2f} m above the floor"
    )
