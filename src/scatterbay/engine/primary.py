"""The primary beam on its way to a place: straight on, and as the lit patch of a barrier shining on it."""

from __future__ import annotations

from dataclasses import dataclass, field, replace

import numpy as np
from numpy.typing import NDArray

from scatterbay.barriers.makeup import Sheets
from scatterbay.engine.arrive import Surroundings, dose_from_emitters
from scatterbay.engine.bodies import Bodies
from scatterbay.engine.fields import BeamField
from scatterbay.engine.walls import Group, Signature
from scatterbay.geometry.enclosure import Crossings
from scatterbay.physics import dose
from scatterbay.physics.spectrum import Spectrum

Array = NDArray[np.float64]
Ints = NDArray[np.int64]

FAR = 1000.0
"""Length of the rays that look for the barriers a beam meets [m]."""
MESH = 28
"""Gauss points across the field in each direction."""
INCOMING = 7
"""Incoming angles at which the light of a patch is worked out, between the least and the greatest on it."""
PAIRS = 16384
"""Pairs of elements and places worked on at a time."""
OUTGOING = np.linspace(0.0, 1.0, 26)
"""Outgoing cosines at which it is worked out."""


@dataclass(frozen=True)
class PrimaryBeam:
    """A beam as the primary path needs it. ``bodies_count``: whether bodies in it weaken it; if not, it is bare."""

    origin: Array
    field: BeamField
    spectrum: Spectrum
    bodies_count: bool


@dataclass(frozen=True)
class Primary:
    """Primary dose at one place per unit of output, each (q,) [Gy, Sv].

    ``patch``: with only that part of the barrier lit that the field covers; in the field at most ``plane``.
    ``plane``: as if the whole barrier were lit; 0 beside the field.
    """

    patch: Array
    plane: Array
    in_field: bool
    """In the field, or within a hand's breadth of it."""


@dataclass(frozen=True)
class LitPatch:
    """The far side of a face where a beam leaves it, in k elements.

    Parameters
    ----------
    position : (k, 3) [m]. normal : out of the face, the way the beam goes (3,).
    signature : faces crossed up to there. next_face : the one these rays cross next, or None.
    incoming : cosine of the beam to the normal (k,).
    photons : photons in each element at each energy (k, e), per unit of output.
    """

    position: Array
    normal: Array
    signature: Signature
    next_face: int | None
    incoming: Array
    photons: Array
    kept: dict[Signature, Array] = field(default_factory=dict)

    def light(self, whole: Signature, energy_kev: Array, around: Surroundings) -> Array:
        """Scattered dose per steradian that leaves each element along OUTGOING, times its area: (q, k, o).

        ``whole``: this patch's signature, and the faces crossed after it.
        """
        if whole not in self.kept:
            mesh = np.linspace(float(self.incoming.min()), float(self.incoming.max()) + 1e-9, INCOMING)
            position = (self.incoming - mesh[0]) / (mesh[1] - mesh[0])
            index = np.minimum(position.astype(np.int64), INCOMING - 2)
            share = (position - index)[:, None]
            result = np.zeros((len(dose.QUANTITIES), len(self.incoming), OUTGOING.size))
            for answer in around.walls.answers(whole):
                emergent = answer.emergent(energy_kev, mesh, OUTGOING)
                for q, table in enumerate(emergent):
                    lit = np.tensordot(self.photons, table, axes=(1, 0))
                    rows = np.arange(len(index))
                    low, high = lit[rows, index], lit[rows, index + 1]
                    result[q] = np.maximum(result[q], low + share * (high - low))
            self.kept[whole] = result / (2.0 * np.pi * self.incoming[:, None])
        return self.kept[whole]


def lit_patches(beam: PrimaryBeam, around: Surroundings) -> list[LitPatch]:
    """Everything a limited beam lights, by the faces it crosses; nothing for a beam that goes everywhere."""
    if beam.field.kind == "everywhere":
        return []
    direction, angle = beam.field.mesh(MESH)
    origin = np.broadcast_to(beam.origin, direction.shape)
    met = around.walls.enclosure.crossings(origin, origin + FAR * direction)
    return [
        _patch(beam, around, group, count, direction[group.rays], angle[group.rays], met)
        for group in around.walls.groups(met)
        for count in range(1, len(group.signature) + 1)
    ]


def _patch(
    beam: PrimaryBeam, around: Surroundings, group: Group, count: int, direction: Array, angle: Array,
    met: Crossings,
) -> LitPatch:  # fmt: skip
    """The far side of the ``count``-th face that these rays cross."""
    face, outward, _ = group.signature[count - 1]
    room = around.walls.enclosure
    at, incoming = met.on(face, group.rays)
    behind = room.thickness[face] if outward or face > room.floor else 0.0
    reach = FAR * at + behind / incoming
    photons = angle[:, None] * beam.spectrum.photons
    if beam.bodies_count:
        photons = photons * np.exp(-_depths(beam, around, direction, reach))
    return LitPatch(
        beam.origin + reach[:, None] * direction,
        room.normal(face) * (1.0 if outward else -1.0),
        group.signature[:count],
        group.signature[count][0] if count < len(group.signature) else None,
        incoming,
        photons,
    )


def _depths(beam: PrimaryBeam, around: Surroundings, direction: Array, reach: Array) -> Array:
    """Optical depth of the bodies along rays of length ``reach`` at each energy of the spectrum, (k, e)."""
    rungs = around.ladder.rungs(beam.spectrum.energy_kev)
    result = np.zeros((len(direction), rungs.index.size))
    if not around.bodies.parts:
        return result
    track = around.bodies.track(np.broadcast_to(beam.origin, direction.shape), direction)
    lengths = np.diff(np.minimum(track.ends, reach[:, None]), axis=1)
    for number, linear in enumerate(around.bodies.linear(rungs)):
        path = np.where(track.matter == number, lengths, 0.0).sum(axis=1)
        result += path[:, None] * linear
    return result


def primary_at(beam: PrimaryBeam, patches: list[LitPatch], place: Array, around: Surroundings) -> Primary:
    """Primary dose at a place (3,) per unit of output."""
    shine = np.zeros(len(dose.QUANTITIES))
    for patch in patches:
        shine += _shine(beam, patch, place, around)
    breadth = around.walls.enclosure.breadth
    in_field = bool(beam.field.holds((place - beam.origin)[None, :], breadth)[0])
    if not in_field:
        return Primary(shine, np.zeros_like(shine), False)
    uncollided, plane = _straight(beam, place, around)
    if not patches:
        return Primary(plane, plane, True)
    return Primary(np.minimum(uncollided + shine, plane), plane, True)


def _shine(beam: PrimaryBeam, patch: LitPatch, place: Array, around: Surroundings) -> Array:
    """What a patch's elements send to a place in front of them, (q,)."""
    ray = place - patch.position
    square = np.einsum("ij,ij->i", ray, ray)
    outgoing = ray @ patch.normal / np.sqrt(square)
    met = around.walls.enclosure.crossings(patch.position, place)
    total = np.zeros(len(dose.QUANTITIES))
    for group in around.walls.groups(met):
        if patch.next_face in [face for face, _, _ in group.signature]:
            continue
        seen = group.rays[outgoing[group.rays] > 0.0]
        if not seen.size:
            continue
        light = patch.light(patch.signature + group.signature, beam.spectrum.energy_kev, around)[:, seen]
        position = outgoing[seen] * (OUTGOING.size - 1)
        index = np.minimum(position.astype(np.int64), OUTGOING.size - 2)
        rows = np.arange(seen.size)
        low, high = light[:, rows, index], light[:, rows, index + 1]
        bright = low + (position - index) * (high - low)
        total += (bright * outgoing[seen] / square[seen]).sum(axis=1)
    return total


def shine_on_many(beam: PrimaryBeam, patch: LitPatch, places: Array, around: Surroundings) -> Array:
    """What a patch's elements send to places (n, 3) in front of them, (q, n): as for one place, over all pairs."""
    count = len(patch.position)
    total = np.zeros((len(dose.QUANTITIES), len(places)))
    size = max(1, PAIRS // count)
    for first in range(0, len(places), size):
        some = places[first : first + size]
        start, end = np.tile(patch.position, (len(some), 1)), np.repeat(some, count, axis=0)
        ray = end - start
        square = np.einsum("ij,ij->i", ray, ray)
        outgoing = ray @ patch.normal / np.sqrt(square)
        for group in around.walls.groups(around.walls.enclosure.crossings(start, end)):
            if patch.next_face in [face for face, _, _ in group.signature]:
                continue
            seen = group.rays[outgoing[group.rays] > 0.0]
            if not seen.size:
                continue
            light = patch.light(patch.signature + group.signature, beam.spectrum.energy_kev, around)
            position = outgoing[seen] * (OUTGOING.size - 1)
            index = np.minimum(position.astype(np.int64), OUTGOING.size - 2)
            element = seen % count
            low, high = light[:, element, index], light[:, element, index + 1]
            bright = (low + (position - index) * (high - low)) * outgoing[seen] / square[seen]
            for q, row in enumerate(bright):
                total[q, first : first + size] += np.bincount(seen // count, row, len(some))
    return total


def primary_straight(beam: PrimaryBeam, place: Array, around: Surroundings) -> tuple[Array, Array]:
    """At a place in the field: the uncollided dose, and that behind barriers lit all over; (q,) each."""
    return _straight(beam, place, around)


def _straight(beam: PrimaryBeam, place: Array, around: Surroundings) -> tuple[Array, Array]:
    """Along the straight ray: the uncollided dose, and the dose behind barriers lit all over; each (q,)."""
    energy, photons = beam.spectrum.energy_kev, beam.spectrum.photons
    ray = place - beam.origin
    distance = float(np.linalg.norm(ray))
    if beam.bodies_count:
        photons = photons * np.exp(-_depths(beam, around, ray[None, :] / distance, np.array([distance])))[0]
    start = np.repeat(beam.origin[None, :], energy.size, axis=0)
    plane = dose_from_emitters(start, energy, place, without_bodies(around)) @ photons
    met = around.walls.enclosure.crossings(beam.origin[None, :], place)
    group = around.walls.groups(met)[0]
    cosine = 1.0 if group.cosine is None else float(group.cosine[0])
    passed = np.full(energy.size, float(not all(around.walls.options(group.signature))))
    for answer in around.walls.answers(group.signature):
        passed = np.maximum(passed, np.exp(-answer.optical_depth(energy) / cosine))
    return dose.per_fluence(energy) @ (photons * passed) / distance**2, plane


def without_bodies(around: Surroundings) -> Surroundings:
    """The same walls with no bodies in the way."""
    return Surroundings(Bodies((), ()), around.faces, around.ladder)


def with_prefix(beam: PrimaryBeam, prefix: Sheets, around: Surroundings) -> Surroundings:
    """The surroundings with sheets that stand in the beam, square to it, in front of every barrier.

    A barrier's sheets are crossed at the slant of its face. The prefix is taken as thin as that slant, at its
    steepest in the field, would make up for: it never counts for more than its thickness.
    """
    if not prefix:
        return around
    direction, _ = beam.field.mesh(MESH)
    origin = np.broadcast_to(beam.origin, direction.shape)
    met = around.walls.enclosure.crossings(origin, origin + FAR * direction)
    first = [(group.signature[0][0], group.rays) for group in around.walls.groups(met) if group.signature]
    least = min((float(met.on(face, rays)[1].min()) for face, rays in first), default=1.0)
    thinned = tuple(replace(one, thickness=least * one.thickness) for one in prefix)
    walls = replace(around.walls, prefix=thinned, _behind={})
    return Surroundings(around.bodies, walls, around.ladder)
