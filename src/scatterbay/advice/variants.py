"""Variants that a scenario names: the file's text with other values in a few places."""

from __future__ import annotations

import yaml

from scatterbay.errors import UsageError
from scatterbay.scenario import loads
from scatterbay.scenario.parts import Scenario
from scatterbay.units import nearest


def variants_of(scenario: Scenario) -> list[Scenario]:
    """Every variant that a scenario names, as scenarios of their own; none where it names none.

    Raises
    ------
    UsageError : a value that does not stand in the file. ScenarioError : a variant that cannot be used.
    """
    root = yaml.compose(scenario.text, Loader=yaml.SafeLoader)
    named = _value(root, ["variants"])
    if not isinstance(named, yaml.MappingNode):
        return []
    found = []
    for key, values in named.value:
        text = scenario.text
        for where, new in values.value:
            text = replaced(text, str(where.value), str(new.value), str(key.value))
        found.append(loads(text, f"{scenario.path}: {key.value}"))
    return found


def replaced(text: str, where: str, new: str, variant: str) -> str:
    """The text with another plain value where one stands, ``where`` being its keys joined by dots."""
    root = yaml.compose(text, Loader=yaml.SafeLoader)
    node = _value(root, where.split("."))
    if not isinstance(node, yaml.ScalarNode):
        near = nearest(where, _places(root))
        hint = f"; did you mean '{near}'?" if near else ""
        raise UsageError(f"variant '{variant}': no single value stands at '{where}'{hint}")
    quoted = '"' + new.replace("\\", "\\\\").replace('"', '\\"') + '"'
    return text[: node.start_mark.index] + quoted + text[node.end_mark.index :]


def _value(node: yaml.Node | None, keys: list[str]) -> yaml.Node | None:
    for key in keys:
        if not isinstance(node, yaml.MappingNode):
            return None
        node = next((value for name, value in node.value if name.value == key), None)
    return node


def _places(node: yaml.Node | None, path: str = "") -> list[str]:
    if isinstance(node, yaml.MappingNode):
        return [
            found
            for key, value in node.value
            for found in _places(value, f"{path}.{key.value}" if path else key.value)
        ]
    return [path]
