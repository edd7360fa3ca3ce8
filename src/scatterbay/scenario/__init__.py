"""The scenario file: read, checked, and handed on as plain records in base units.

Importing this is cheap: YAML and pydantic are imported when a file is read.
"""

from __future__ import annotations

from collections.abc import Collection
from pathlib import Path
from typing import Any

from scatterbay.scenario.parts import Field, Layer, MakeUp, Scenario

__all__ = ["beam_field", "layer", "load", "loads", "make_up", "schema"]


def load(path: str | Path) -> Scenario:
    """The scenario in a file.

    Raises
    ------
    ScenarioError : the file cannot be read, or anything in it cannot be used: all problems at once, in line
        order; exit code 3 where all of them are understood but lie outside the model.
    """
    from scatterbay.scenario.reading import read_file

    return read_file(path)


def loads(text: str, name: str = "scenario") -> Scenario:
    """The scenario in a text; ``name`` stands for the file in errors.

    Raises
    ------
    ScenarioError : as for ``load``.
    """
    from scatterbay.scenario.reading import read_text

    return read_text(text, name)


def make_up(text: str, materials: Collection[str] = ()) -> MakeUp:
    """The make-up in a text such as ``gypsum board 12.5 mm + lead 1.5 mm``.

    Parameters
    ----------
    text : layers from the inside to the outside, joined by ``+``, or ``open``. A layer is a material and an amount, or
        a stock item such as ``lead code 4``.
    materials : names known beside the shipped materials; a ``known.Known`` brings stock items as well.

    Raises
    ------
    TextError : unknown material or stock item, missing or impossible amount.
    """
    from scatterbay.scenario import make_ups

    return make_ups.make_up(text, materials)


def layer(text: str, materials: Collection[str] = ()) -> Layer:
    """The single layer in a text such as ``aluminium 3.2 mm``.

    Raises
    ------
    TextError : as for ``make_up``, or more than one layer.
    """
    from scatterbay.scenario import make_ups

    return make_ups.one_layer(text, materials)


def beam_field(text: str) -> Field:
    """The field in a text such as ``200 mm x 300 mm at 700 mm``, ``cone 40 deg`` or ``all round``.

    Raises
    ------
    TextError : none of these forms, or a size that cannot be.
    """
    from scatterbay.scenario import field_text

    return field_text.beam_field(text)


def schema() -> dict[str, Any]:
    """The JSON Schema (2020-12) of the scenario file, with help for every key."""
    from scatterbay.scenario.schema import file_schema

    return file_schema()
