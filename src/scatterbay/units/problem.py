"""What is wrong with a piece of text, and where in it."""

from __future__ import annotations

from collections.abc import Iterable

from scatterbay.errors import UsageError


class TextError(UsageError):
    """A text that cannot be used.

    Parameters
    ----------
    message : what is wrong, naming the offending text.
    hint : what is allowed, the nearest name, or what to do instead.
    start : offset in the text where the trouble starts, counted from 0.
    outside_model : the text is understood but lies outside the data or the model.
    """

    def __init__(self, message: str, hint: str = "", start: int = 0, outside_model: bool = False) -> None:
        self.message = message
        self.hint = hint
        self.start = start
        self.outside_model = outside_model
        if outside_model:
            self.exit_code = 3
        super().__init__(f"{message}; {hint}" if hint else message)

    def moved(self, offset: int) -> TextError:
        """The same problem in a longer text in which this one starts at ``offset``."""
        return TextError(self.message, self.hint, self.start + offset, self.outside_model)


def nearest(name: str, known: Iterable[str]) -> str | None:
    """The known name that looks most like this one, letter case aside first; None when nothing is near."""
    from difflib import get_close_matches

    names = list(known)
    for candidate in names:
        if candidate.lower() == name.lower():
            return candidate
    lowered = {candidate.lower(): candidate for candidate in names}
    found = get_close_matches(name.lower(), lowered, n=1, cutoff=0.6)
    return lowered[found[0]] if found else None
