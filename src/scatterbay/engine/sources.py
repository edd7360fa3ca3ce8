"""The output of a source: its spectrum per unit of output, how much of it a second, and what was assumed."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from datetime import date

from scatterbay.errors import OutOfRangeError, UsageError
from scatterbay.physics.nuclide import below, decayed, nuclide_spectrum
from scatterbay.physics.slab.grid import HIGHEST_KEV
from scatterbay.physics.spectrum import Filter, Spectrum
from scatterbay.physics.tube import filter_for_half_value_layer, tube_spectrum
from scatterbay.scenario.parts import Assumption, SealedSource, Source, XrayTube
from scatterbay.tables.materials import Material, material
from scatterbay.tables.nuclides import nuclide


@dataclass(frozen=True)
class Output:
    """What a source sends out.

    ``spectrum``: per steradian and unit of output (coulomb or decay), as it leaves towards the field.
    ``bare``: inside the housing, before added filters. ``drive``: output per second while on.
    """

    spectrum: Spectrum
    bare: Spectrum
    drive: float
    assumptions: tuple[Assumption, ...]


def output_of(source: Source, defined: Iterable[Material] = ()) -> Output:
    """The output of a source as the scenario describes it.

    Raises
    ------
    OutOfRangeError : a voltage or a half-value layer outside the tube model.
    """
    return _tube(source, defined) if isinstance(source, XrayTube) else _sealed(source)


def _tube(tube: XrayTube, defined: Iterable[Material]) -> Output:
    voltage, angle = tube.voltage.value, tube.anode_angle.value
    filters: tuple[Filter, ...] = tuple(
        (material(layer.material, defined), layer.thickness.value) for layer in tube.filtration.layers
    )
    notes = []
    if tube.half_value_layer is not None:
        named = material(tube.half_value_layer.material, defined)
        matched = filter_for_half_value_layer(voltage, named, tube.half_value_layer.thickness.value, angle)
        filters = ((named, matched),)
        notes.append(
            Assumption(
                "tube spectra",
                f"source '{tube.name}': the stated half-value layer is matched by {1e3 * matched:.2f} mm of "
                f"{named.name} as total filtration",
            )
        )
    bare = tube_spectrum(voltage, (), angle)
    spectrum = bare.filtered(filters).thinned(1e-9)
    model = spectrum.kerma_at_1_m
    if tube.output is None:
        notes.append(
            Assumption(
                "tube output",
                f"source '{tube.name}': no measured output given; the model's {60.0 * model:.3g} mGy m2/(mA min) "
                "is used (compared within 30 % with common practice, 60 to 120 kV)",
            )
        )
    else:
        spectrum = spectrum.scaled(tube.output.value / model)
        notes.append(
            Assumption(
                "tube output",
                f"source '{tube.name}': the stated output is {tube.output.value / model:.2f} times the model's",
            )
        )
    return Output(spectrum, bare, tube.current.value, tuple(notes))


def _sealed(source: SealedSource) -> Output:
    found = nuclide(source.nuclide)
    activity = source.activity.value
    if source.activity_date and source.assessed_date:
        days = (_date(source.assessed_date) - _date(source.activity_date)).days
        activity = decayed(activity, found.half_life, 86400.0 * days)
    spectrum, left_out = _within_transport(nuclide_spectrum(found), source)
    notes = (
        *left_out,
        Assumption(
            "nuclide spectra",
            f"source '{source.name}': lines of {source.nuclide} below 20 keV are taken as stopped in the capsule; "
            "the capsule's and the source's own absorption of the rest are left out",
        ),
    )
    return Output(spectrum, spectrum, activity, notes)


def _within_transport(spectrum: Spectrum, source: SealedSource) -> tuple[Spectrum, tuple[Assumption, ...]]:
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
        return kept, ()
    text = f"lines of {source.nuclide} above {HIGHEST_KEV:g} keV, {share:.0e} of its energy, are left out"
    return kept, (Assumption("nuclide spectra", f"source '{source.name}': {text}"),)


def _date(text: str) -> date:
    try:
        return date.fromisoformat(text)
    except ValueError:
        raise UsageError(f"'{text}' is not a date like 2031-05-20") from None
