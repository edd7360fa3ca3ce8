"""What `lists` prints: the shipped lists, each entry with its source and how that is known."""

from __future__ import annotations

import textwrap
from collections.abc import Mapping
from itertools import zip_longest
from typing import Any

from scatterbay import __version__
from scatterbay.report.cautions import CAUTIONS
from scatterbay.report.records import FORMAT
from scatterbay.report.screen import Screen
from scatterbay.scenario.lists import Listing
from scatterbay.units import significant


def basis(source: str) -> str:
    """How an entry is known: recalled, common practice, or as cited."""
    return next((word for word in ("recalled", "common practice") if word in source), "as cited")


def topic_rows(topics: Mapping[str, str]) -> list[dict[str, Any]]:
    """One row per topic."""
    return [{"topic": topic, "about": about} for topic, about in topics.items()]


def topics_record(topics: Mapping[str, str]) -> dict[str, Any]:
    """The topics as nested records."""
    return {**_head(), "topics": topic_rows(topics)}


def listing_rows(listing: Listing) -> list[dict[str, Any]]:
    """One row per entry."""
    names = [name for name, _, _ in listing.columns]
    return [
        {"topic": listing.topic, **dict(zip(names, row, strict=False)), "basis": basis(str(row[-1])),
         "source": row[-1]}
        for row in listing.rows
    ]  # fmt: skip


def listing_record(listing: Listing) -> dict[str, Any]:
    """A list as nested records."""
    return {
        **_head(),
        "topic": listing.topic,
        "about": listing.about,
        "remarks": [remark for remark in (listing.banner, *listing.remarks) if remark],
        "entries": listing_rows(listing),
    }


def show_topics(topics: Mapping[str, str], screen: Screen) -> None:
    """Print the topics."""
    _open("Lists to take names from", screen)
    screen.table(["topic", "what it holds"], [[topic, about] for topic, about in topics.items()], right=set())
    screen.line()
    screen.paragraph("One list: scatterbay lists stock")
    _close(screen)


def show_listing(listing: Listing, screen: Screen) -> None:
    """Print one list; sources are numbered in the table and written out beneath it."""
    _open(f"{listing.topic}: {listing.about}", screen)
    if listing.banner:
        screen.paragraph(listing.banner, style="bold")
    for remark in listing.remarks:
        screen.paragraph(remark, indent="  ", first="! ")
    screen.line()
    notes = dict.fromkeys(_note(listing, row) for row in listing.rows)
    numbers = {note: f"[{n}]" for n, note in enumerate(notes, 1)}
    shown = [k for k, (_, _, width) in enumerate(listing.columns) if width]
    widths = [*(listing.columns[k][2] for k in shown), len(f"[{len(numbers)}] practice")]
    cells: list[list[str]] = []
    for row in listing.rows:
        mark = f"{numbers[_note(listing, row)]} {_mark(str(row[-1]))}".strip()
        cells += _wrapped([*(_text(row[k]) for k in shown), mark], widths)
    numeric = {n for n, k in enumerate(shown) if not isinstance(listing.rows[0][k], str)}
    screen.table([*(listing.columns[k][1] for k in shown), "source"], cells, right=numeric)
    screen.line()
    for note, number in numbers.items():
        screen.paragraph(note, indent="       ", first=f"  {number:4} ")
    if listing.banner:
        screen.line()
        screen.paragraph(listing.banner, style="bold")
    _close(screen)


def _head() -> dict[str, Any]:
    return {"format": FORMAT, "program": f"scatterbay {__version__}", "cautions": list(CAUTIONS)}


def _open(title: str, screen: Screen) -> None:
    screen.line(title, "bold")
    _cautions(screen)
    screen.line()


def _close(screen: Screen) -> None:
    screen.line()
    _cautions(screen)


def _cautions(screen: Screen) -> None:
    for caution in CAUTIONS:
        screen.paragraph(caution, indent="  ", first="! ")


def _note(listing: Listing, row: tuple[str | float, ...]) -> str:
    """What stands beneath the table for an entry: what has no column there, and the source."""
    said = [str(value) for value, (_, _, width) in zip(row, listing.columns, strict=False) if not width]
    return f"{'; '.join(said)} ({row[-1]})" if said else str(row[-1])


def _mark(source: str) -> str:
    """How the source is known, in a word for the table."""
    return {"recalled": "recalled", "common practice": "practice", "as cited": ""}[basis(source)]


def _text(value: str | float) -> str:
    return (
        value if isinstance(value, str) else f"{value:d}" if isinstance(value, int) else significant(value, 4)
    )


def _wrapped(cells: list[str], widths: list[int]) -> list[list[str]]:
    """A row of cells as lines no wider than the columns; words are not broken."""
    columns = [
        textwrap.wrap(cell, width, break_long_words=False, break_on_hyphens=False)
        for cell, width in zip(cells, widths, strict=True)
    ]
    return [list(line) for line in zip_longest(*columns, fillvalue="")]
