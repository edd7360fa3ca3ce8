"""The cautions every output carries."""

from __future__ import annotations

HEADLINE = "DRAFT for a qualified expert: an estimate, not a survey and not an approval."

CAUTIONS = (
    HEADLINE,
    "Local regulations and licensed practice prevail over everything printed here.",
    "Have it checked by a qualified expert before anything is built or relied on, and measure afterwards.",
    "Verdicts say below, above or too close to call: for this estimate and these inputs, nothing more.",
)

LOCAL_RULES = "Rule sets shipped here are recalled and general: local rules prevail, and may be stricter."

NOT_COVERED = (
    "Not covered yet: scatter from walls, floor and ceiling (mazes, open doors, sky above a thin roof), joints and "
    "ducts that are not entered, scatter of a source on its way, faults of interlocks or equipment.",
)
"""What the estimate leaves out, in a sentence."""
