"""Stock items that a scenario defines, and what make-ups count as."""

from __future__ import annotations

from scatterbay.scenario import parts
from scatterbay.scenario.build.findings import Findings, names_in
from scatterbay.scenario.least import least_notes
from scatterbay.scenario.make_ups import check_stock_name
from scatterbay.scenario.model.document import Document
from scatterbay.units import TextError


def check_stock(document: Document, findings: Findings) -> None:
    """Names that stock items can go by."""
    materials = names_in(document.materials) or ()
    for name in names_in(document.stock) or ():
        try:
            check_stock_name(name, materials)
        except TextError as problem:
            findings.wrong(("stock", name), problem.message, problem.hint, on_key=True)


def note_least(room: parts.Room, findings: Findings) -> None:
    """Say where layers count as less than their nominal."""
    make_ups = [(side.name, side.make_up) for side in room.sides]
    make_ups += [("ceiling", room.ceiling), ("floor", room.floor)]
    make_ups += [(one.name, one.make_up) for one in room.openings]
    make_ups += [(one.name, one.make_up) for one in room.screens]
    for panel in room.panels:
        make_ups += [
            (panel.name, up) for up in (panel.make_up, panel.inside, panel.outside) if up is not None
        ]
    for name, make_up in make_ups:
        for sentence in least_notes(make_up):
            findings.assume("least thickness", sentence, name)
