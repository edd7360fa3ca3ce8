"""What all models of the file share: strictness, keys in plain words, texts as values, broken entries."""

from __future__ import annotations

from collections.abc import Callable, Collection, Iterable
from functools import reduce
from operator import or_
from typing import Annotated, Any, TypeAlias, TypeVar, get_args

from pydantic import BaseModel, ConfigDict, GetCoreSchemaHandler, GetJsonSchemaHandler
from pydantic.fields import ComputedFieldInfo, FieldInfo
from pydantic.json_schema import JsonSchemaValue
from pydantic_core import CoreSchema, PydanticCustomError, core_schema

from scatterbay.scenario.yaml_tree import Data, Path
from scatterbay.units import TextError

T = TypeVar("T")
V = TypeVar("V")
Names: TypeAlias = Collection[str]
"""Names of the materials a scenario defines: the context texts are read in."""

_WITH_HYPHEN = {"make_up": "make-up", "x_ray_tube": "x-ray tube", "half_value_layer": "half-value layer",
               "kerma_area_product": "kerma-area product"}  # fmt: skip


def file_key(name: str) -> str:
    """The key in the file for an attribute's name: ``use_factor`` is ``use factor``."""
    return _WITH_HYPHEN.get(name) or name.rstrip("_").replace("_", " ")


def _title(name: str, info: FieldInfo | ComputedFieldInfo) -> str:
    return file_key(name)


class Form(BaseModel):
    """A mapping in the file: nothing unknown, nothing converted behind the author's back."""

    model_config = ConfigDict(
        strict=True,
        extra="forbid",
        frozen=True,
        allow_inf_nan=False,
        arbitrary_types_allowed=True,
        defer_build=True,  # only the whole document is ever validated: its parts need no validator of their own
        alias_generator=file_key,
        field_title_generator=_title,
    )


class Broken:
    """Stands for an entry that could not be read, so that the rest of the file can still be checked."""


BROKEN = Broken()


class _MaybeBroken:
    """Lets ``BROKEN`` through where a value is expected."""

    def __get_pydantic_core_schema__(self, source: Any, handler: GetCoreSchemaHandler) -> CoreSchema:
        wanted = reduce(or_, [choice for choice in get_args(source) if choice is not Broken])
        inner = handler.generate_schema(wanted)
        return core_schema.no_info_wrap_validator_function(_let_broken_through, inner)


def _let_broken_through(value: Any, check: core_schema.ValidatorFunctionWrapHandler) -> Any:
    return value if value is BROKEN else check(value)


Maybe: TypeAlias = Annotated[T | Broken, _MaybeBroken()]
"""A value of the file, or ``BROKEN`` where it was refused."""


class ItemsError(TextError):
    """Problems in the items of a list or mapping, each with the path that leads to the item."""

    def __init__(self, problems: list[tuple[Path, TextError]]) -> None:
        super().__init__(problems[0][1].message, problems[0][1].hint)
        self.problems = problems


def each(items: Iterable[tuple[str | int, V]], read: Callable[[V], T]) -> list[T]:
    """Every item read; all items that cannot be read are reported together.

    Raises
    ------
    ItemsError : one or more items cannot be read.
    """
    found: list[T] = []
    problems: list[tuple[Path, TextError]] = []
    for key, item in items:
        try:
            found.append(read(item))
        except ItemsError as several:
            problems += [((key, *inside), problem) for inside, problem in several.problems]
        except TextError as problem:
            problems.append(((key,), problem))
    if problems:
        raise ItemsError(problems)
    return found


class FromText:
    """Reads a value of the file with a function of ours, and says in the schema what it looks like.

    Parameters
    ----------
    read : gives the value, or raises ``TextError``.
    schema : JSON Schema of what may be written.
    """

    def __init__(self, read: Callable[[Data, Names], object], schema: JsonSchemaValue) -> None:
        self.read = read
        self.schema = schema

    def __get_pydantic_core_schema__(self, source: Any, handler: GetCoreSchemaHandler) -> CoreSchema:
        return core_schema.with_info_plain_validator_function(self._check)

    def __get_pydantic_json_schema__(
        self, schema: CoreSchema, handler: GetJsonSchemaHandler
    ) -> JsonSchemaValue:
        return dict(self.schema)

    def _check(self, value: Any, info: core_schema.ValidationInfo) -> object:
        try:
            return self.read(value, info.context or ())
        except TextError as problem:
            raise PydanticCustomError("text", "unreadable", {"problem": problem}) from None
