"""One barrier on its own: how much of a beam it lets through, as a plane and as a lit patch."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from scatterbay.barriers.makeup import Sheets
from scatterbay.barriers.store import answer
from scatterbay.engine.arrive import Surroundings
from scatterbay.engine.bodies import Bodies
from scatterbay.engine.energies import ladder
from scatterbay.engine.fields import BeamField
from scatterbay.engine.primary import PrimaryBeam, lit_patches, primary_at
from scatterbay.engine.walls import Walls
from scatterbay.errors import OutOfRangeError, UsageError
from scatterbay.geometry.enclosure import Enclosure
from scatterbay.physics.interpolate import cubic
from scatterbay.physics.medium import medium
from scatterbay.physics.spectrum import Spectrum
from scatterbay.tables.materials import Material

Array = NDArray[np.float64]

STEEPEST = np.radians(85.0)
"""Largest angle to the normal that is answered [rad]."""
LEAST = 1e-30
"""Transmissions below this are not told apart."""
WIDE = 400.0
"""Half size of the wall the patch is lit on [m]."""
STEPS = (0.15, 0.3, 0.6, 1.0, 1.5, 2.2, 3.2)
"""Thicknesses tried for value layers, over a first guess of the tenth-value layer."""


@dataclass(frozen=True)
class PatchGeometry:
    """A field (width, height) [m] across the beam axis where it meets the barrier, the distance from the source to
    that point, and from where the axis leaves the barrier to the point behind it, along the axis [m]."""

    width: float
    height: float
    source_distance: float
    point_distance: float


@dataclass(frozen=True)
class Transmission:
    """Dose behind over dose without the barrier, each quantity over its own: shapes (q,).

    ``patch`` is None where no field was given. ``half`` and ``tenth``: further thickness of the last layer's
    material that halves the plane transmission, or takes it to a tenth, shapes (q,) [m].
    """

    plane: Array
    patch: Array | None
    uncollided: Array
    half: Array
    tenth: Array


def transmission(
    spectrum: Spectrum, sheets: Sheets, angle: float = 0.0, patch: PatchGeometry | None = None
) -> Transmission:
    """Transmission of a barrier for a beam at an angle [rad] to its normal.

    Raises
    ------
    UsageError : no layers. OutOfRangeError : the angle is above 85 degrees, a field does not meet the barrier, or
        the transmission is too small to tell.
    """
    if not sheets:
        raise UsageError("a barrier needs at least one layer")
    if not 0.0 <= angle <= STEEPEST:
        raise OutOfRangeError(
            f"angles of 0 to 85 degrees to the normal are covered; got {np.degrees(angle):g}"
        )
    plane, uncollided = _plane(spectrum, sheets, angle)
    if plane.min() < LEAST:
        raise OutOfRangeError(f"the transmission is below {LEAST:g}: too small to be told")
    half, tenth = _value_layers(spectrum, sheets, angle, plane)
    lit = None if patch is None else _patch(spectrum, sheets, angle, patch)
    return Transmission(plane, lit, uncollided, half, tenth)


def _plane(spectrum: Spectrum, sheets: Sheets, angle: float) -> tuple[Array, Array]:
    """Transmission, and its uncollided part, (q,) each."""
    cosine = float(np.cos(angle))
    found = answer(sheets)
    behind = np.exp(found.log_dose(spectrum.energy_kev, np.array([cosine]))[:, :, 0]) @ spectrum.photons
    passed = replace(
        spectrum, photons=spectrum.photons * np.exp(-found.optical_depth(spectrum.energy_kev) / cosine)
    )
    free = spectrum.dose_at_1_m()
    return behind / free, passed.dose_at_1_m() / free


def _value_layers(spectrum: Spectrum, sheets: Sheets, angle: float, plane: Array) -> tuple[Array, Array]:
    """Further thickness of the last sheet's material to a half and a tenth, (q,) each [m]."""
    last = sheets[-1]
    guess = _guess(spectrum, sheets, angle)
    extra, logs = [0.0], [np.log(plane)]
    for step in STEPS:
        thicker = (*sheets[:-1], replace(last, thickness=last.thickness + step * guess))
        extra.append(step * guess)
        logs.append(np.log(np.maximum(_plane(spectrum, thicker, angle)[0], 1e-300)))
        if (logs[-1] < logs[0] - np.log(10.5)).all():
            break
    falls = logs[0] - np.array(logs)
    thickness = np.array(extra)
    if not (falls[-1] >= np.log(10.0)).all() or not (np.diff(falls, axis=0) > 0.0).all():
        raise OutOfRangeError(
            "no tenth-value layer: more of the last layer's material does not stop this beam"
        )
    found = [
        [float(cubic(np.array([np.log(x)]), falls[:, q], thickness)[0]) for q in range(falls.shape[1])]
        for x in (2.0, 10.0)
    ]
    return np.array(found[0]), np.array(found[1])


def _guess(spectrum: Spectrum, sheets: Sheets, angle: float) -> float:
    """A first guess of the tenth-value layer [m], from what the beam's uncollided part meets."""
    last = sheets[-1]
    passed = spectrum.photons * np.exp(-answer(sheets).optical_depth(spectrum.energy_kev) / np.cos(angle))
    weight = passed * spectrum.energy_kev
    attenuation = 100.0 * last.density_g_cm3 * medium(last.fractions).attenuation(spectrum.energy_kev)
    total = float(weight.sum())
    mean = float(weight @ attenuation) / total if total > 0.0 else float(attenuation.min())
    return 2.3 / mean * float(np.cos(angle))


def _patch(spectrum: Spectrum, sheets: Sheets, angle: float, patch: PatchGeometry) -> Array:
    """Transmission behind the patch that the field lights, on the axis, (q,)."""
    cosine, sine = float(np.cos(angle)), float(np.sin(angle))
    thickness = sum(one.thickness for one in sheets)
    corners = np.array([(-WIDE, -WIDE), (0.0, -WIDE), (0.0, WIDE), (-WIDE, WIDE)])
    room = Enclosure(corners, 2.0 * WIDE, [thickness] * 6, {})
    walls = Walls(room, [(sheets,)] * 6, ladder(_edges(sheets)))
    around = Surroundings(Bodies((), ()), walls, walls.ladder)
    axis = np.array([cosine, sine, 0.0])
    origin = np.array([0.0, 0.0, WIDE]) - patch.source_distance * axis
    field = BeamField(
        "rectangle",
        axis,
        0.5 * patch.width / patch.source_distance,
        0.5 * patch.height / patch.source_distance,
    )
    if angle + np.arctan(field.half_width) > STEEPEST:
        raise OutOfRangeError("part of the field meets the barrier at more than 85 degrees, or misses it")
    beam = PrimaryBeam(origin, field, spectrum, bodies_count=False)
    place = origin + (patch.source_distance + thickness / cosine + patch.point_distance) * axis
    found = primary_at(beam, lit_patches(beam, around), place, around)
    distance = float(np.linalg.norm(place - origin))
    return found.patch * distance**2 / spectrum.dose_at_1_m()


def _edges(sheets: Sheets) -> list[float]:
    return [edge for one in sheets for edge in medium(one.fractions).k_edges_kev.values()]


def narrow_value_layers(spectrum: Spectrum, materials: list[Material]) -> dict[str, tuple[float, float]]:
    """First and second half-value layer [m] of each material, as a narrow beam by air kerma."""
    return {m.name: (spectrum.half_value_layer(m), spectrum.half_value_layer(m, 2)) for m in materials}
