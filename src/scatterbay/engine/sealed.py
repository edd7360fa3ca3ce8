"""The output of a sealed source: lines of its nuclide, its activity, and how that falls with time."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date

from scatterbay.errors import OutOfRangeError, UsageError
from scatterbay.physics import dose
from scatterbay.physics.nuclide import below, decayed, mean_over_cycle, nuclide_spectrum
from scatterbay.physics.slab.grid import HIGHEST_KEV
from scatterbay.physics.spectrum import Spectrum
from scatterbay.scenario.parts import Assumption, SealedSource
from scatterbay.tables.nuclides import Nuclide, nuclide

DAY = 86400.0


@dataclass(frozen=True)
class SealedOutput:
    """What a sealed source sends out, per steradian and decay; see ``Output`` for the rest."""

    spectrum: Spectrum
    drive: float
    assumptions: tuple[Assumption, ...]
    tolerance: float
    annual: float
    survey: float | None


def sealed_output(source: SealedSource) -> SealedOutput:
    """The output of a source as the scenario describes it.

    Raises
    ------
    OutOfRangeError : lines above barrier transport that matter; dates in the wrong order.
    """
    found = nuclide(source.nuclide)
    activity = source.activity.value
    if source.activity_date and source.assessed_date:
        activity = _decayed_to(activity, found, source.activity_date, source.assessed_date)
    spectrum, notes = _within_transport(nuclide_spectrum(found), source)
    notes.append(
        Assumption(
            "nuclide spectra",
            f"source '{source.name}': lines of {source.nuclide} below 20 keV are taken as stopped in the capsule; "
            "the capsule's and the source's own absorption of the rest are left out",
        )
    )
    scale = _scale(source, spectrum, notes)
    annual, survey = 1.0, None
    if source.exchange_days is not None:
        annual = mean_over_cycle(found.half_life, DAY * source.exchange_days)
        text = (
            f"loaded with {source.activity.text}; the annual figure counts {annual:.3f} of it, its mean over "
        )
        text += f"{source.exchange_days:g} days"
        notes.append(Assumption("exchange cycle", f"source '{source.name}': {text}"))
    if source.survey_date and source.activity_date:
        on_the_day = _decayed_to(source.activity.value, found, source.activity_date, source.survey_date)
        survey = on_the_day / activity
    tolerance = source.activity.tolerance / source.activity.value
    return SealedOutput(spectrum.scaled(scale), activity, tuple(notes), tolerance, annual, survey)


def _scale(source: SealedSource, spectrum: Spectrum, notes: list[Assumption]) -> float:
    """The user's own output over the table's."""
    if source.rate_constant is not None:
        given, text = source.rate_constant, source.rate_constant.text
        own = spectrum.dose_at_1_m()[_row(given.kind)]
    elif source.certificate is not None:
        given, text = source.certificate, source.certificate.text
        own = source.activity.value * spectrum.dose_at_1_m()[_row(given.kind)]
    else:
        return 1.0
    scale = given.value / float(own)
    notes.append(
        Assumption(
            "source output",
            f"source '{source.name}': the stated {text} replaces the table's output, {scale:.3f} times as much",
        )
    )
    return scale


def _row(kind: str) -> int:
    return dose.QUANTITIES.index(dose.AIR_KERMA if "kerma" in kind else dose.AMBIENT)


def _decayed_to(activity: float, found: Nuclide, start: str, end: str) -> float:
    return decayed(activity, found.half_life, DAY * (_date(end) - _date(start)).days)


def _within_transport(spectrum: Spectrum, source: SealedSource) -> tuple[Spectrum, list[Assumption]]:
    """The lines that barrier transport covers, and a note on those it does not.

    Raises
    ------
    OutOfRangeError : the lines above carry more than a thousandth of the energy.
    """
    try:
        kept, share = below(spectrum, HIGHEST_KEV)
    except OutOfRangeError as error:
        raise OutOfRangeError(f"source '{source.name}' ({source.nuclide}): {error}") from None
    if share == 0.0:
        return kept, []
    text = f"lines of {source.nuclide} above {HIGHEST_KEV:g} keV, {share:.0e} of its energy, are left out"
    return kept, [Assumption("nuclide spectra", f"source '{source.name}': {text}")]


def _date(text: str) -> date:
    try:
        return date.fromisoformat(text)
    except ValueError:
        raise UsageError(f"'{text}' is not a date like 2031-05-20") from None
