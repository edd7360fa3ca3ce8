"""What an unquoted word in the file means: the rules of YAML 1.2, not of 1.1.

So ``No`` is a word, ``12:30`` is a word, ``010`` is ten and ``1e3`` is a thousand.
"""

from __future__ import annotations

import re

Scalar = str | int | float | bool | None

_NULL = frozenset({"", "~", "null", "Null", "NULL"})
_TRUE = frozenset({"true", "True", "TRUE"})
_FALSE = frozenset({"false", "False", "FALSE"})
_INTEGER = re.compile(r"[-+]?[0-9]+", re.ASCII)
_OCTAL = re.compile(r"0o[0-7]+", re.ASCII)
_HEXADECIMAL = re.compile(r"0x[0-9a-fA-F]+", re.ASCII)
_FLOAT = re.compile(r"[-+]?(\.[0-9]+|[0-9]+(\.[0-9]*)?)([eE][-+]?[0-9]+)?", re.ASCII)
_SPECIAL = {".inf": "inf", "+.inf": "inf", "-.inf": "-inf", ".nan": "nan"}
_LONGEST_INTEGER = 300


def plain_scalar(text: str) -> Scalar:
    """The value of an unquoted scalar."""
    if text in _NULL:
        return None
    if text in _TRUE or text in _FALSE:
        return text in _TRUE
    if _INTEGER.fullmatch(text):
        return int(text) if len(text) <= _LONGEST_INTEGER else float(text)
    if _OCTAL.fullmatch(text):
        return int(text[2:], 8)
    if _HEXADECIMAL.fullmatch(text):
        return int(text[2:], 16)
    if _FLOAT.fullmatch(text):
        return float(text)
    if text.lower() in _SPECIAL:
        return float(_SPECIAL[text.lower()])
    return text
