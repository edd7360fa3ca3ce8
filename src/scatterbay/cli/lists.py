"""`scatterbay lists [TOPIC]`."""

from __future__ import annotations

from typing import Annotated

import typer


def command(
    topic: Annotated[
        str,
        typer.Argument(
            help="stock, rules, occupancy, containers, receptors, materials or nuclides; none: names the topics."
        ),
    ] = "",
    json: Annotated[bool, typer.Option("--json", help="Print JSON.")] = False,
    csv: Annotated[bool, typer.Option("--csv", help="Print CSV: a row per entry.")] = False,
) -> int:
    """Lists to take names from: stock, rule sets, occupancy, containers, receptors, materials, nuclides.

    Every entry stands beside its source; most are recalled and say so. Local rules prevail over all of them.

    Example: scatterbay lists stock
    """
    from scatterbay.cli.output import one_format, put
    from scatterbay.report import lists as report
    from scatterbay.scenario.lists import listing, topics

    one_format(json, csv)
    if not topic:
        found = topics()
        put(
            json,
            csv,
            lambda: report.topics_record(found),
            lambda: report.topic_rows(found),
            lambda s: report.show_topics(found, s),
        )
        return 0
    entries = listing(topic)
    put(
        json,
        csv,
        lambda: report.listing_record(entries),
        lambda: report.listing_rows(entries),
        lambda s: report.show_listing(entries, s),
    )
    return 0
