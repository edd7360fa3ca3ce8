"""The walk: energy balance, angles, flights and channels. Kinds: limit, closed form, independent route (quadrature)."""

from __future__ import annotations

import math

import numpy as np
import pytest
from numpy.typing import NDArray
from scipy.stats import chi2

from scatterbay.engine.media import Matter
from scatterbay.engine.points import ScatterPoints
from scatterbay.engine.turning import coherent_cosines, incoherent_cosines, turned
from scatterbay.physics.compton import scattered_energy
from scatterbay.physics.constants import PAIR_THRESHOLD
from scatterbay.physics.medium import medium
from scatterbay.tables.materials import material
from tests.engine.one_body import REPLICATES, Setting, along_x, one_line, setting

Array = NDArray[np.float64]

THICK = (0.3, 0.3, 0.2)
BALANCES = {
    "water 100 keV": (("water",), "box", THICK, 100.0),
    "water 11 keV, near the cut": (("water",), "box", THICK, 11.0),
    "steel 1250 keV": (("steel",), "sphere", (0.2,), 1250.0),
    "lead below its K edge": (("lead",), "box", THICK, 87.0),
    "lead above its K edge": (("lead",), "box", THICK, 100.0),
    "tungsten with pairs": (("tungsten",), "cylinder", (0.2, 0.3), 1300.0),
    "barite concrete, barium lines": (("barite concrete",), "box", THICK, 60.0),
    "lead pipe with water": (("lead", "water"), "pipe", (0.3, 0.01, 0.4), 662.0),
    "water pipe with lead": (("water", "lead"), "pipe", (0.3, 0.1, 0.4), 150.0),
}


def balanced(name: str) -> Setting:
    names, shape, sizes, energy = BALANCES[name]
    return setting(names, shape, (1.0, 0.0, 0.0), sizes, along_x(0.1), one_line(energy))


@pytest.mark.parametrize("name", sorted(BALANCES))
def test_energy_balance(name: str) -> None:
    """Limit: absorbed, escaped and cut off are counted by their own formulas, and sum to what entered, to 1e-9."""
    case = balanced(name)
    first = case.first(128)
    b = case.walk(first).balance
    assert b.entered == pytest.approx(first.collisions @ first.energy_kev, rel=1e-12)
    assert min(b.absorbed, b.escaped, b.cut_off) > 0.0
    assert b.absorbed + b.escaped + b.cut_off == pytest.approx(b.entered, rel=1e-9)
    assert b.cut_off < (0.02 if "11 keV" in name else 1e-3) * b.entered


def thin_foil(name: str, energy: float) -> Setting:
    """So thin that nothing collides twice."""
    return setting((name,), "box", (1.0, 0.0, 0.0), (1e-7, 0.5, 0.5), along_x(0.01), one_line(energy))


def mean_after(matter: Matter, energy: float) -> float:
    """Mean energy after incoherent scattering [keV], by Gauss quadrature over the angular law."""
    cosine, weights = np.polynomial.legendre.leggauss(400)
    strength = matter.medium.incoherent_shape.differential(np.full(400, energy), cosine) * weights
    return float(strength @ scattered_energy(np.full(400, energy), cosine) / strength.sum())


@pytest.mark.parametrize(
    ("name", "energy"),
    [("water", 60.0), ("lead", 87.0), ("lead", 100.0), ("tungsten", 1300.0), ("steel", 662.0)],
)
def test_absorbed_share_of_a_thin_foil(name: str, energy: float) -> None:
    """Closed form: what is absorbed where nothing collides twice is mu_tr of our cross sections, over mu, 1 %."""
    case = thin_foil(name, energy)
    matter, at = case.bodies.matters[0], np.array([energy])
    parts, (lines, made) = matter.medium.partials(at), matter.medium.fluorescence(at)
    counted = lines >= 10.0
    left = parts.photoelectric * energy - lines[counted] @ made[counted]
    left += parts.pair * (energy - PAIR_THRESHOLD) + parts.incoherent * (energy - mean_after(matter, energy))
    b = case.walk(case.first(2048)).balance
    assert b.absorbed / b.entered == pytest.approx(left[0] / (parts.total[0] * energy), rel=0.01)
    assert b.absorbed + b.escaped == pytest.approx(b.entered, rel=1e-3)


@pytest.mark.parametrize(("thickness", "slant"), [(1e-3, 0.0), (0.05, 0.0), (0.4, 0.0), (0.05, 60.0)])
def test_first_collisions_of_a_narrow_beam(thickness: float, slant: float) -> None:
    """Closed form: 1 - exp(-mu t / cos) of the photons collide, at the depths of an exponential law."""
    tilt = math.radians(slant)
    case = setting(
        ("water",), "plate", (1.0, 0.0, 0.0), (2.0, 2.0, thickness), along_x(1e-4), one_line(100.0),
        axis=(math.cos(tilt), math.sin(tilt), 0.0),
    )  # fmt: skip
    first = case.first(1024)
    mu = 100.0 * float(medium(material("water").fractions).partials(np.array([100.0])).total[0])
    way = thickness / math.cos(tilt)
    photons = case.field.solid_angle
    assert first.collisions.sum() / REPLICATES == pytest.approx(-math.expm1(-mu * way) * photons, rel=2e-3)
    depth = first.position[:, 0] - 1.0 + 0.5 * way
    deep = first.collisions[depth > 0.6 * way].sum() / REPLICATES
    exact = (math.exp(-0.6 * mu * way) - math.exp(-mu * way)) * photons
    assert deep == pytest.approx(exact, rel=5e-3)
    assert (first.order == 1).all()
    assert (first.energy_kev == 100.0).all()


def from_centre(case: Setting, energy: float, count: int) -> ScatterPoints:
    """Collisions all at the centre of the body, photons arriving along x."""
    zero = np.zeros(count, dtype=np.int64)
    middle = np.repeat(case.bodies.parts[0].solid.centre[None, :], count, axis=0)
    arriving = np.repeat(np.array([[1.0, 0.0, 0.0]]), count, axis=0)
    weight = np.full(count, REPLICATES / count)
    return ScatterPoints(
        middle, arriving, np.full(count, energy), weight, zero, zero + 1, np.arange(count) % REPLICATES
    )


def by_replicate(points: ScatterPoints, values: Array) -> tuple[float, float]:
    each = np.bincount(points.replicate, values, REPLICATES)
    return float(each.mean()), float(each.std(ddof=1)) / REPLICATES**0.5


@pytest.mark.parametrize(("name", "energy", "radius"), [("water", 300.0, 0.1), ("steel", 662.0, 0.02)])
def test_second_collisions_from_the_centre_of_a_sphere(name: str, energy: float, radius: float) -> None:
    """Quadrature: photons scattered at the centre meet exp(-mu(E') r): how many collide, how many in the inner half."""
    case = setting((name,), "sphere", (0.0, 0.0, 0.0), (2.0 * radius,), along_x(0.1), one_line(energy))
    stuff, matter = material(name), case.bodies.matters[0].medium
    parts = matter.partials(np.array([energy]))

    cosine, weights = np.polynomial.legendre.leggauss(400)
    strength = matter.incoherent_shape.differential(np.full(400, energy), cosine) * weights
    linear = 100.0 * stuff.density_g_cm3 * matter.attenuation(scattered_energy(np.full(400, energy), cosine))
    straight = 100.0 * stuff.density_g_cm3 * float(parts.total[0])

    second = case.walk(from_centre(case, energy, 100_000)).points
    second = second.some(second.order == 2)
    distance = np.linalg.norm(second.position, axis=1)
    assert distance.max() <= radius * (1.0 + 1e-9)
    for way in (radius, 0.5 * radius):
        exact = float(parts.incoherent[0]) * float(strength @ -np.expm1(-linear * way) / strength.sum())
        exact += float(parts.coherent[0]) * -math.expm1(-straight * way)
        mean, error = by_replicate(second, second.collisions * (distance <= way))
        assert error < 0.01 * mean
        assert abs(mean - exact / float(parts.total[0])) < 4.0 * error


def test_fluorescence_of_lead() -> None:
    """Closed form: collisions at the centre of a lead sphere send out K photons in the table's proportions, evenly."""
    radius, energy = 0.003, 100.0
    case = setting(("lead",), "sphere", (0.0, 0.0, 0.0), (2.0 * radius,), along_x(0.1), one_line(energy))
    stuff, matter = material("lead"), case.bodies.matters[0].medium
    lines, made = matter.fluorescence(np.array([energy]))
    total = float(matter.partials(np.array([energy])).total[0])
    second = case.walk(from_centre(case, energy, 200_000)).points
    second = second.some(second.order == 2)
    for line, amount in zip(lines, made[:, 0], strict=True):
        mine = second.energy_kev == line
        reach = -math.expm1(
            -100.0 * stuff.density_g_cm3 * float(matter.attenuation(np.array([line]))[0]) * radius
        )
        mean, error = by_replicate(second, second.collisions * mine)
        assert abs(mean - amount / total * reach) < 4.0 * error
        forward, wide = by_replicate(second, second.collisions * mine * second.direction[:, 0])
        assert abs(forward) < 4.0 * wide


@pytest.mark.parametrize("kind", ["incoherent", "coherent"])
@pytest.mark.parametrize("energy", [15.0, 60.0, 300.0, 1250.0])
@pytest.mark.parametrize("name", ["water", "steel", "lead"])
def test_angles_follow_the_differential_cross_section(kind: str, energy: float, name: str) -> None:
    """Quadrature and chi-square over 24 bins even in ((1 - cos) / 2)^(1/4), which spread the forward peak."""
    stuff, count, bins, fine = medium(material(name).fractions), 100_000, 24, 200
    random = np.random.Generator(np.random.PCG64(20))
    if kind == "incoherent":
        drawn = incoherent_cosines(stuff.incoherent_shape, np.full(count, energy), random)
        differential = stuff.incoherent_shape.differential
    else:
        drawn = coherent_cosines(stuff.coherent_shape, np.full(count, energy), random)
        differential = stuff.coherent_shape.differential
    u = (np.arange(bins * fine) + 0.5) / (bins * fine)
    density = differential(np.full(u.size, energy), 1.0 - 2.0 * u**4) * u**3
    expected = count * density.reshape(bins, fine).sum(axis=1) / density.sum()
    seen = np.histogram(np.sqrt(np.sqrt(0.5 * (1.0 - drawn))), bins, (0.0, 1.0))[0]
    filled = expected > 20.0
    statistic = float((((seen - expected) ** 2) / expected)[filled].sum())
    assert seen[~filled].sum() < expected[~filled].sum() + 40.0
    assert chi2.sf(statistic, filled.sum() - 1) > 1e-4


def test_turning_keeps_the_angle_and_spreads_the_azimuth() -> None:
    """Closed form: the angle between old and new is the one asked for, for any direction, poles included."""
    random = np.random.Generator(np.random.PCG64(4))
    count = 20_000
    before = random.normal(size=(count, 3))
    before[:4] = np.array([(0.0, 0.0, 1.0), (0.0, 0.0, -1.0), (1.0, 0.0, 0.0), (0.0, 1e-12, -1.0)])
    before /= np.linalg.norm(before, axis=1, keepdims=True)
    cosine = 2.0 * random.random(count) - 1.0
    cosine[:2] = 1.0, -1.0
    after = turned(before, cosine, random.random(count))
    np.testing.assert_allclose(np.einsum("ij,ij->i", before, after), cosine, atol=1e-12)
    np.testing.assert_allclose(np.linalg.norm(after, axis=1), 1.0, rtol=1e-12)
    across = after - cosine[:, None] * before
    assert np.abs(across.mean(axis=0)).max() < 4.0 * across.std() / math.sqrt(count)


def test_same_seed_same_points() -> None:
    """Limit: the walk repeats itself to the last bit, and differs with another seed."""
    case = balanced("lead pipe with water")
    first = case.first(64)
    one, two, other = (case.walk(first, seed).points for seed in (3, 3, 4))
    np.testing.assert_array_equal(one.position, two.position)
    np.testing.assert_array_equal(one.collisions, two.collisions)
    assert len(one) != len(other) or not np.array_equal(one.position, other.position)


def test_points_lie_in_the_matter_they_name() -> None:
    """Limit: innermost wins: the pipe's wall and its filling are told apart."""
    case = balanced("lead pipe with water")
    points = ScatterPoints.joined([case.first(64), case.walk(case.first(64)).points])
    inside = case.bodies.parts[1].solid.inner_distance(points.position)
    outside = case.bodies.parts[0].solid.inner_distance(points.position)
    assert set(points.matter.tolist()) == {0, 1}
    assert (inside[points.matter == 1] > -1e-9).all()
    assert (inside[points.matter == 0] < 1e-9).all()
    assert (outside > -1e-9).all()
