"""The JSON Schema of the scenario file."""

from __future__ import annotations

from typing import Any

from scatterbay.scenario.model.document import Document

DIALECT = "https://json-schema.org/draft/2020-12/schema"


def file_schema() -> dict[str, Any]:
    """JSON Schema (2020-12) of the file: titles, help, patterns and examples for every key."""
    found = Document.model_json_schema(by_alias=True)
    return {
        "$schema": DIALECT,
        "title": "Scenario file, format 1",
        **{k: v for k, v in found.items() if k != "title"},
    }
