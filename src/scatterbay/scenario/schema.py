"""The JSON Schema of the scenario file."""

from __future__ import annotations

from typing import Any

from scatterbay.scenario.model.document import Document

DIALECT = "https://json-schema.org/draft/2020-12/schema"


def file_schema() -> dict[str, Any]:
    """JSON Schema (2020-12) of the file: titles, help, patterns and examples for every key."""
    found = _as_written(Document.model_json_schema(by_alias=True))
    return {"$schema": DIALECT, **found, "title": "Scenario file, format 1"}


def _as_written(node: Any) -> Any:
    """The schema without the nothings that stand for keys left out: the file itself may not hold them."""
    if isinstance(node, list):
        return [_as_written(item) for item in node if item != {"type": "null"}]
    if not isinstance(node, dict):
        return node
    kept = {key: _as_written(item) for key, item in node.items() if not _empty(key, item)}
    choices = kept.get("anyOf")
    if isinstance(choices, list) and len(choices) == 1:
        kept = {**choices[0], **{key: item for key, item in kept.items() if key != "anyOf"}}
    return kept


def _empty(key: str, item: Any) -> bool:
    return (key == "default" and item in (None, {})) or (key == "examples" and item == [])
