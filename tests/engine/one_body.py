"""One body in empty space, for tests of the walk and of single scatter."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from scatterbay.engine.arrive import Surroundings, dose_from_points, ready
from scatterbay.engine.bodies import Bodies, Part
from scatterbay.engine.energies import Ladder, ladder
from scatterbay.engine.fields import BeamField
from scatterbay.engine.first import first_collisions
from scatterbay.engine.media import Matter
from scatterbay.engine.points import ScatterPoints
from scatterbay.engine.sequence import generator
from scatterbay.engine.walk import Walk, walk_on
from scatterbay.geometry.bodies import solids
from scatterbay.physics.medium import medium
from scatterbay.physics.spectrum import Spectrum
from scatterbay.tables.materials import material

Array = NDArray[np.float64]

REPLICATES = 16
ORIGIN = np.zeros(3)


def along_x(half_width: float, half_height: float | None = None) -> BeamField:
    """A rectangular field along x: tangents of its half angles."""
    return BeamField("rectangle", np.array([1.0, 0.0, 0.0]), half_width, half_height or half_width)


def one_line(energy_kev: float) -> Spectrum:
    """One energy, one photon per steradian."""
    return Spectrum(np.array([energy_kev]), np.array([1.0]), "decay")


@dataclass(frozen=True)
class Setting:
    """A beam from the origin on a body, and the points it makes there."""

    bodies: Bodies
    rungs: Ladder
    field: BeamField
    spectrum: Spectrum

    @property
    def around(self) -> Surroundings:
        return Surroundings(self.bodies, None, self.rungs)

    def first(self, per_replicate: int, seed: int = 1) -> ScatterPoints:
        even = self.spectrum.photons / self.spectrum.photons.sum()
        return first_collisions(
            ORIGIN, self.field, self.spectrum, even, self.bodies, 0, self.rungs, per_replicate, REPLICATES, (seed, 0)
        )  # fmt: skip

    def walk(self, first: ScatterPoints, seed: int = 1) -> Walk:
        return walk_on(first, self.bodies, self.rungs, generator(seed, 1))

    def dose(self, points: ScatterPoints, place: Array) -> tuple[Array, Array]:
        """Mean and standard error (q,) of the dose at a place."""
        found = dose_from_points(ready(points, self.around), place, self.around)
        each = np.array([np.bincount(points.replicate, row, REPLICATES) for row in found])
        return each.mean(axis=1), each.std(axis=1, ddof=1) / REPLICATES**0.5


def setting(
    names: Sequence[str],
    shape: str,
    centre: Sequence[float],
    sizes: tuple[float, ...],
    field: BeamField,
    spectrum: Spectrum,
    axis: Sequence[float] = (0.0, 0.0, 1.0),
) -> Setting:
    """A body of one material, or of two where its shape has an inside (a pipe)."""
    found = [material(name) for name in names]
    rungs = ladder(edge for one in found for edge in medium(one.fractions).k_edges_kev.values())
    matters = [Matter(medium(one.fractions), one.density_g_cm3, rungs) for one in found]
    parts = [
        Part(solid, number, None if number == 0 else 0, 0)
        for number, solid in enumerate(solids(shape, centre, sizes, axis, 0.0))
    ]
    return Setting(Bodies(parts, matters), rungs, field, spectrum)
