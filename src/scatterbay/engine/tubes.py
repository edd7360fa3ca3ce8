"""The output of an X-ray tube: model spectra, scaled to a measured output where there is one."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from scatterbay.physics.spectrum import Filter, Spectrum, mixed
from scatterbay.physics.tube import filter_for_half_value_layer, tube_spectrum
from scatterbay.scenario.parts import Assumption, XrayTube
from scatterbay.tables.materials import Material, material


@dataclass(frozen=True)
class TubeOutput:
    """What a tube sends out, per steradian and coulomb; ``scale``: measured output over the model's."""

    spectrum: Spectrum
    bare: Spectrum
    drive: float
    assumptions: tuple[Assumption, ...]
    scale: float
    tolerance: float
    anode_angle: float

    def bare_at(self, voltage_kv: float) -> Spectrum:
        """The spectrum inside the housing at another voltage."""
        return tube_spectrum(voltage_kv, (), self.anode_angle).scaled(self.scale)


def tube_output(tube: XrayTube, defined: Sequence[Material]) -> TubeOutput:
    """The output of a tube at its voltage, or spread over its voltages.

    Raises
    ------
    OutOfRangeError : a voltage or a half-value layer outside the tube model.
    """
    angle = tube.anode_angle.value
    filters, notes = _filters(tube, defined)
    spread = tube.voltages or ((tube.voltage, 1.0),)
    shares = [share for _, share in spread]
    bare = mixed([tube_spectrum(voltage.value, (), angle) for voltage, _ in spread], shares)
    measured_at = (tube.output_at or tube.voltage).value
    model = tube_spectrum(measured_at, filters, angle).kerma_at_1_m
    scale, tolerance = 1.0, 0.0
    if tube.output is None:
        own = bare.filtered(filters).kerma_at_1_m
        text = (
            f"no measured output given; the model's {60.0 * own:.3g} mGy m2/(mA min) is used (compared within 30 % "
            "with common practice, 60 to 120 kV)"
        )
    else:
        scale, tolerance = tube.output.value / model, tube.output.tolerance / tube.output.value
        text = f"the stated output is {scale:.2f} times the model's"
        if tube.voltages or tube.output_at is not None:
            text += f" at {measured_at:g} kV; the model is scaled by that at every voltage"
    notes.append(Assumption("tube output", f"source '{tube.name}': {text}"))
    bare = bare.scaled(scale)
    spectrum = bare.filtered(filters).thinned(1e-9)
    return TubeOutput(spectrum, bare, tube.current.value, tuple(notes), scale, tolerance, angle)


def _filters(tube: XrayTube, defined: Sequence[Material]) -> tuple[tuple[Filter, ...], list[Assumption]]:
    """The filters as stated, or matched to the stated half-value layer."""
    if tube.half_value_layer is None:
        layers = tube.filtration.layers
        return tuple((material(one.material, defined), one.counted_thickness) for one in layers), []
    layer, voltage = tube.half_value_layer, (tube.layer_at or tube.voltage).value
    named = material(layer.material, defined)
    matched = filter_for_half_value_layer(voltage, named, layer.thickness.value, tube.anode_angle.value)
    text = (
        f"source '{tube.name}': the stated half-value layer is matched by {1e3 * matched:.2f} mm of {named.name} as "
        f"total filtration at {voltage:g} kV"
    )
    return ((named, matched),), [Assumption("tube spectra", text)]
