"""Scatter from one body in the void by Monte Carlo: air kerma at points around it, with standard errors.

Every collision scores its expectation at every point (all that it may send there, weakened on the way out of
the body), and the walk goes on with one photon drawn from the same collision. Flights are forced to end inside.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import NamedTuple, Protocol

import numpy as np

from scatterbay.physics.medium import medium
from scatterbay.tables.materials import material as material_named
from tests.independent.collisions import (
    COHERENT,
    ELECTRON_KEV,
    INCOHERENT,
    LINES,
    LOWEST_KEV,
    PAIR,
    WAVE_KEV,
    Array,
    Indices,
    Matter,
    collide,
    kerma,
    matter,
)

BATCHES = 20
SPREAD_SHARE = 0.5
"""Share of first collisions spread evenly over the path; the rest follow the beam's own weakening."""
SMALL_WEIGHT = 0.02
"""Share of the weight of its first collision below which a photon goes on only by chance."""


class Scatter(NamedTuple):
    """Air kerma at each point per incident air kerma where the axis enters the body: once, and all times
    scattered, and the standard error of the latter; each of shape (points,).
    """

    single: Array
    total: Array
    standard_error: Array


class Shape(Protocol):
    """A convex shape centred at the origin."""

    def span(self, position: Array, direction: Array) -> tuple[Array, Array]:
        """Distances at which rays (n, 3) enter and leave the shape; the second is not larger if they miss."""
        ...


@dataclass(frozen=True)
class Box:
    """Box with these full sizes along x, y and z [m]."""

    size: tuple[float, float, float]

    def span(self, position: Array, direction: Array) -> tuple[Array, Array]:
        """See Shape."""
        safe = np.where(np.abs(direction) < 1e-12, 1e-12, direction)
        half = 0.5 * np.array(self.size)
        one, other = (-half - position) / safe, (half - position) / safe
        return np.minimum(one, other).max(axis=1), np.maximum(one, other).min(axis=1)


@dataclass(frozen=True)
class Sphere:
    """Sphere of this radius [m]."""

    radius: float

    def span(self, position: Array, direction: Array) -> tuple[Array, Array]:
        """See Shape."""
        return _round(position, direction, self.radius)


@dataclass(frozen=True)
class Cylinder:
    """Cylinder along z of this radius and full height [m]."""

    radius: float
    height: float

    def span(self, position: Array, direction: Array) -> tuple[Array, Array]:
        """See Shape."""
        near, far = _round(position[:, :2], direction[:, :2], self.radius)
        along = direction[:, 2]
        safe = np.where(np.abs(along) < 1e-12, 1e-12, along)
        one, other = (-0.5 * self.height - position[:, 2]) / safe, (0.5 * self.height - position[:, 2]) / safe
        return np.maximum(near, np.minimum(one, other)), np.minimum(far, np.maximum(one, other))


def _round(position: Array, direction: Array, radius: float) -> tuple[Array, Array]:
    """Span of a circle or a sphere, in as many dimensions as the rays have."""
    a = np.maximum((direction**2).sum(axis=1), 1e-24)
    b = (position * direction).sum(axis=1)
    inside = b * b - a * ((position**2).sum(axis=1) - radius**2)
    root = np.sqrt(np.maximum(inside, 0.0))
    hit = inside > 0
    return np.where(hit, (-b - root) / a, np.inf), np.where(hit, (-b + root) / a, -np.inf)


@dataclass
class _Photons:
    position: Array
    direction: Array
    energy: Array
    weight: Array
    first: Array

    def only(self, chosen: Indices) -> _Photons:
        columns = (self.position, self.direction, self.energy, self.weight, self.first)
        return _Photons(*(column[chosen] for column in columns))


@dataclass(frozen=True)
class _Body:
    shape: Shape
    stuff: Matter
    linear: float

    def depth(self, energy: Array) -> Array:
        """Linear attenuation [1/m]."""
        return self.stuff.totals(energy) * self.linear


def scatter_from_body(
    shape: Shape,
    material: str,
    energy_kev: float,
    source_position: tuple[float, float, float],
    field: tuple[float, float],
    detector_points: Array,
    histories: int,
    seed: int,
) -> Scatter:
    """Scatter from a body centred at the origin, lit by a point source that is aimed at its centre.

    Parameters
    ----------
    energy_kev : energy of the source, the same in all directions within the field [keV].
    source_position : outside the body [m].
    field : width (across, level) and height of the lit rectangle, in the plane through the body's centre
        square to the beam's axis [m].
    detector_points : outside the body, shape (points, 3) [m].
    """
    named = material_named(material)
    body = _Body(shape, matter(medium(named.fractions)), 100.0 * named.density_g_cm3)
    source, points = np.array(source_position), np.asarray(detector_points, dtype=float)
    away = float(np.linalg.norm(source))
    entrance = float(shape.span(source[None, :], -source[None, :] / away)[0][0])
    incident = float(kerma(np.array(energy_kev))) / entrance**2
    tallies = []
    for rng in np.random.default_rng(seed).spawn(BATCHES):
        beam = _beam(source, field, energy_kev, histories // BATCHES, rng)
        tallies.append(_walk(body, beam, points, rng) / incident)
    every = np.array(tallies)
    error = every[:, 1].std(axis=0, ddof=1) / np.sqrt(BATCHES)
    return Scatter(every[:, 0].mean(axis=0), every[:, 1].mean(axis=0), error)


def _beam(
    source: Array, field: tuple[float, float], energy: float, number: int, rng: np.random.Generator
) -> _Photons:
    """Photons of a source that sends one per steradian, drawn evenly over the lit rectangle."""
    away = float(np.linalg.norm(source))
    axis = -source / away
    across = np.cross(axis, [0.0, 0.0, 1.0] if abs(axis[2]) < 0.999 else [1.0, 0.0, 0.0])
    across /= np.linalg.norm(across)
    u, v = (rng.random((2, number, 1)) - 0.5) * np.array(field)[:, None, None]
    ray = u * across + v * np.cross(across, axis) - source
    length = np.linalg.norm(ray, axis=1)
    weight = field[0] * field[1] * away / length**3 / number
    starts, energies = np.repeat(source[None, :], number, axis=0), np.full(number, energy)
    return _Photons(starts, ray / length[:, None], energies, weight, weight)


def _walk(body: _Body, photons: _Photons, points: Array, rng: np.random.Generator) -> Array:
    """Kerma at the points from the first collisions, and from all: (2, points)."""
    tally = np.zeros((2, len(points)))
    near, far = body.shape.span(photons.position, photons.direction)
    photons = photons.only(np.flatnonzero(far > near))
    order = 0
    while photons.energy.size:
        _fly(body, photons, rng, SPREAD_SHARE if order == 0 else 0.0)
        scored = _expected(body, photons, points)
        tally[1] += scored
        if order == 0:
            tally[0] += scored
            photons.first = photons.weight
        photons.energy, cosine, factor = collide(body.stuff, photons.energy, rng)
        photons.weight = photons.weight * factor
        photons.direction = _turned(photons.direction, cosine, 2 * np.pi * rng.random(cosine.size))
        stays = np.minimum(photons.weight / (SMALL_WEIGHT * photons.first), 1.0)
        photons.weight = photons.weight / np.maximum(stays, 1e-300)
        photons = photons.only(
            np.flatnonzero((rng.random(stays.size) < stays) & (photons.energy >= LOWEST_KEV))
        )
        order += 1
    return tally


def _fly(body: _Body, photons: _Photons, rng: np.random.Generator, spread: float) -> None:
    """Move each photon to a collision on its way through the body; its weight takes the chance of one."""
    near, far = body.shape.span(photons.position, photons.direction)
    near = np.maximum(near, 0.0)
    path, mu = np.maximum(far - near, 1e-12), body.depth(photons.energy)
    hit = -np.expm1(-mu * path)
    u = rng.random(mu.size)
    flown = np.where(rng.random(mu.size) < spread, u * path, -np.log1p(-u * hit) / mu)
    true = mu * np.exp(-mu * flown)
    photons.weight = photons.weight * true / (spread / path + (1 - spread) * true / hit)
    photons.position = photons.position + (near + flown)[:, None] * photons.direction


def _expected(body: _Body, photons: _Photons, points: Array) -> Array:
    """Kerma at the points expected from these collisions, summed: (points,)."""
    total, parts = body.stuff.at(photons.energy)
    result = np.zeros(len(points))
    shapes = body.stuff.medium
    angular = _per_steradian(body.stuff, photons.energy)
    for j, point in enumerate(points):
        way = point - photons.position
        length = np.linalg.norm(way, axis=1)
        way /= length[:, None]
        out = body.shape.span(photons.position, way)[1]
        cosine = np.clip((way * photons.direction).sum(axis=1), -1.0, 1.0)
        ratio = 1 / (1 + photons.energy / ELECTRON_KEV * (1 - cosine))
        x = photons.energy / WAVE_KEV * np.sqrt(0.5 * (1 - cosine))
        bound = shapes.incoherent_shape.electrons(x) * ratio**2 * (ratio + 1 / ratio - 1 + cosine**2)
        sent = [(photons.energy * ratio, parts[:, INCOHERENT] * angular[0] * bound)]
        bound = shapes.coherent_shape.squared(x) * (1 + cosine**2)
        sent += [(photons.energy, parts[:, COHERENT] * angular[1] * bound)]
        fixed = [(PAIR, ELECTRON_KEV), *((LINES + k, float(e)) for k, e in enumerate(body.stuff.line_kev))]
        sent += [(np.full(total.size, e), parts[:, k] / (4 * np.pi)) for k, e in fixed if parts[:, k].any()]
        for energy, number in sent:
            heard = energy >= LOWEST_KEV
            e = np.maximum(energy, LOWEST_KEV)
            arriving = np.where(heard, number * kerma(e) * np.exp(-body.depth(e) * out), 0.0)
            result[j] += (photons.weight / total * arriving / length**2).sum()
    return result


def _per_steradian(stuff: Matter, energy: Array) -> tuple[Array, Array]:
    """Factors that make the two angular shapes (without r_e^2 / 2) densities per steradian."""
    nodes, weights = np.polynomial.legendre.leggauss(200)
    half = (0.5 * (nodes + 1.0)) ** 2
    cosine, weight = 1 - 2 * half**2, 2 * np.pi * 4 * half * np.sqrt(half) * weights
    grid = np.geomspace(LOWEST_KEV, float(energy.max()) * 1.0001, 300)
    ratio = 1 / (1 + grid[:, None] / ELECTRON_KEV * (1 - cosine))
    x = grid[:, None] / WAVE_KEV * half
    free = ratio**2 * (ratio + 1 / ratio - 1 + cosine**2)
    incoherent = (stuff.medium.incoherent_shape.electrons(x) * free) @ weight
    coherent = (stuff.medium.coherent_shape.squared(x) * (1 + cosine**2)) @ weight
    log, nodes = np.log(energy), np.log(grid)
    return (
        np.exp(-np.interp(log, nodes, np.log(incoherent))),
        np.exp(-np.interp(log, nodes, np.log(coherent))),
    )


def _turned(direction: Array, cosine: Array, azimuth: Array) -> Array:
    """Directions (n, 3) turned by an angle of this cosine, at this azimuth."""
    helper = np.where(np.abs(direction[:, 2:]) < 0.9, [[0.0, 0.0, 1.0]], [[1.0, 0.0, 0.0]])
    first = np.cross(direction, helper)
    first /= np.linalg.norm(first, axis=1)[:, None]
    second = np.cross(direction, first)
    sine = np.sqrt(np.maximum(1 - cosine**2, 0.0))
    turned = cosine[:, None] * direction
    turned += (sine * np.cos(azimuth))[:, None] * first + (sine * np.sin(azimuth))[:, None] * second
    return np.asarray(turned / np.linalg.norm(turned, axis=1)[:, None])
