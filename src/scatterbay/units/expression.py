"""Reads compound units such as ``mGy m2/(mA min)``."""

from __future__ import annotations

import re
from dataclasses import dataclass

from scatterbay.units.problem import TextError, nearest
from scatterbay.units.table import ONE, REFUSED, UNITS, Unit

_TOKEN = re.compile(
    r"\s*(?:(?P<symbol>[A-Za-z°%]+)(?:\^?(?P<power>-?[1-9](?!\d)))?|(?P<sign>[/()])|(?P<times>[*.]))(?P<gap>\s*)",
    re.ASCII,
)
_PLAIN = str.maketrans({"µ": "u", "μ": "u", "·": "*", "⋅": "*", "×": "*", "²": "2", "³": "3"})
_PLAIN |= str.maketrans({"−": "-", "\u00a0": " ", "\u202f": " ", "\u2009": " "})


def plain(text: str) -> str:
    """The text with typographic characters replaced one for one, so that offsets stay true."""
    return text.translate(_PLAIN)


@dataclass(frozen=True)
class _Token:
    """``what`` is a symbol, ``/``, ``*``, ``(`` or ``)``."""

    what: str
    power: int
    start: int


def parse_unit(text: str) -> Unit:
    """The unit that a text names.

    A space, ``*`` and ``.`` multiply, ``/`` and ``per`` divide, parentheses group, ``m2`` and ``m^2`` are
    squares. A product after ``/`` must stand in parentheses, because people read ``mGy/mA min`` both ways.

    Raises
    ------
    TextError : unknown or refused unit, or an expression that cannot be read.
    """
    ready = re.sub(r"\bper\b", "/  ", plain(text))
    return _Reader(_tokens(ready), text).whole()


def _tokens(text: str) -> list[_Token]:
    found: list[_Token] = []
    at = 0
    while at < len(text.rstrip()):
        match = _TOKEN.match(text, at)
        if match is None:
            start = at + len(text[at:]) - len(text[at:].lstrip())
            raise TextError(
                f"'{text[start]}' cannot stand in a unit", "write units like mGy m2/(mA min)", start
            )
        start = match.start() + len(match[0]) - len(match[0].lstrip())
        what = match["symbol"] or match["sign"] or "*"
        if found and what not in "/*)" and found[-1].what not in ("/", "*", "("):
            found.append(_Token("*", 1, start))
        found.append(_Token(what, int(match["power"] or 1), start))
        at = match.end()
    return found


class _Reader:
    """Recursive descent over the tokens of one unit."""

    def __init__(self, tokens: list[_Token], text: str) -> None:
        self.tokens = tokens
        self.text = text.strip()
        self.at = 0
        self.end = len(text.rstrip())

    def whole(self) -> Unit:
        unit = self.product()
        if self.at < len(self.tokens):
            raise self.wrong(f"'{self.text}': a parenthesis is closed that was never opened")
        return unit

    def product(self) -> Unit:
        unit = self.factor()
        divided = False
        while self.peek() in ("*", "/"):
            power = -1 if self.peek() == "/" else 1
            if divided and power == 1:
                raise self.wrong(
                    f"'{self.text}' can be read in two ways: is what follows divided by as well?",
                    "put all that is divided by in parentheses, as in mGy m2/(mA min)",
                )
            divided = divided or power == -1
            self.at += 1
            unit = unit.times(self.factor(), power)
        return unit

    def factor(self) -> Unit:
        what = self.peek()
        if what in (None, "*", "/", ")"):
            raise self.wrong(f"'{self.text}': a unit is missing")
        token = self.tokens[self.at]
        self.at += 1
        if what != "(":
            return ONE.times(_look_up(token), token.power)
        unit = self.product()
        if self.peek() != ")":
            raise self.wrong(f"'{self.text}': a parenthesis is not closed")
        self.at += 1
        return unit

    def peek(self) -> str | None:
        return self.tokens[self.at].what if self.at < len(self.tokens) else None

    def wrong(self, message: str, hint: str = "write units like mGy m2/(mA min)") -> TextError:
        start = self.tokens[self.at].start if self.at < len(self.tokens) else self.end
        return TextError(message, hint, start)


def _look_up(token: _Token) -> Unit:
    symbol = token.what
    if symbol in UNITS:
        return UNITS[symbol]
    if symbol in REFUSED:
        message, hint = REFUSED[symbol]
        raise TextError(message.format(symbol=symbol), hint, token.start)
    near = nearest(symbol, UNITS)
    hint = f"did you mean '{near}'?" if near else f"units known here: {', '.join(_common())}"
    raise TextError(f"'{symbol}' is not a known unit", hint, token.start)


def _common() -> list[str]:
    words = (
        "kV",
        "keV",
        "mA",
        "mm",
        "m",
        "in",
        "ft",
        "s",
        "min",
        "h",
        "week",
        "year",
        "Bq",
        "Ci",
        "Gy",
        "Sv",
        "deg",
    )
    return [word for word in words if word in UNITS]
