"""Results as pandas tables."""

from __future__ import annotations

from typing import TYPE_CHECKING

from scatterbay.exposure.results import Assessment
from scatterbay.report.barrier import BarrierReport, barrier_rows
from scatterbay.report.cautions import CAUTIONS
from scatterbay.report.records import assessment_rows
from scatterbay.report.source import SourceReport, spectrum_rows

if TYPE_CHECKING:
    import pandas as pd


def frame(result: Assessment | BarrierReport | SourceReport) -> pd.DataFrame:
    """The rows of a result; cautions, and what was assumed, in ``attrs``."""
    import pandas as pd

    if isinstance(result, Assessment):
        made = pd.DataFrame(assessment_rows(result))
        made.attrs["assumptions"] = [a.text for a in result.assumptions]
    elif isinstance(result, BarrierReport):
        made = pd.DataFrame(barrier_rows(result))
        made.attrs["assumptions"] = list(result.notes)
    else:
        made = pd.DataFrame(spectrum_rows(result))
        made.attrs["assumptions"] = list(result.facts)
    made.attrs["cautions"] = list(CAUTIONS)
    return made
