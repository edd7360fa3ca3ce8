"""What a room is for, and kinds of space: what is accepted, and what is refused by name."""

from __future__ import annotations

import re

from scatterbay.scenario.rules import occupancy_suggestion
from scatterbay.units import TextError, nearest

PURPOSES = ("radiography", "industrial X-ray", "industrial gamma")
NOT_VALIDATED = {
    "CT": r"CT|C\.T\.|[Cc]omputed tomography|[Tt]omograph\w*|CBCT",
    "fluoroscopy": r"[Ff]luoroscop\w*|[Aa]ngiograph\w*|[Cc]ath(?:eter)? lab\w*|C[- ]?arms?|[Ii]nterventional",
    "mammography": r"[Mm]ammo\w*",
    "dental": r"[Dd]ental|[Dd]entist\w*|[Cc]ephalometr\w*",
}
"""Kinds of rooms that are refused by name, as nothing here was validated for them, and how they are written."""


def not_validated(text: str) -> str | None:
    """The kind of room that a text speaks of and that nothing was validated for; None where it speaks of none."""
    for kind, pattern in NOT_VALIDATED.items():
        if re.search(rf"\b(?:{pattern})\b", text):
            return kind
    return None


def purpose(text: str) -> str:
    """What a room is for.

    Raises
    ------
    TextError : not one of those known; those that are not validated are refused by name.
    """
    said = " ".join(text.split())
    if said in PURPOSES:
        return said
    kind = not_validated(said) or not_validated(said.upper()) or not_validated(said.lower())
    if kind is not None:
        message = f"rooms for {kind} are refused: nothing here was validated for them"
        raise TextError(message, f"what is: {', '.join(PURPOSES)}", outside_model=True)
    near = nearest(said, PURPOSES)
    hint = f"did you mean '{near}'? " if near else ""
    raise TextError(f"'{text}' is not a purpose that is known", f"{hint}known: {', '.join(PURPOSES)}")


def space(text: str) -> str:
    """A kind of space for which an occupancy factor is suggested.

    Raises
    ------
    TextError : none is.
    """
    return occupancy_suggestion(text).space
