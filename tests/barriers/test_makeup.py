"""Make-ups: merging, keys, edges. Kind: limit."""

from __future__ import annotations

from pathlib import Path

import pytest

from scatterbay.barriers import makeup
from scatterbay.barriers.answer import build_answer
from scatterbay.barriers.makeup import Sheet, content_key, k_elements, merged, sheet
from scatterbay.errors import UsageError
from scatterbay.physics import dose, medium
from scatterbay.resources import folder
from scatterbay.tables import attenuation, conversion, elements, files, scattering, shells
from scatterbay.tables.materials import Material

CONCRETE, LEAD = sheet("concrete", 0.1), sheet("lead", 0.002)


def test_sheet_takes_material_and_thickness() -> None:
    assert (CONCRETE.density_g_cm3, CONCRETE.thickness) == (2.3, 0.1)
    assert sum(share for _, share in CONCRETE.fractions) == pytest.approx(1.0)
    own = Material.from_symbols("mix", 3.0, {"Ba": 1.0}, "test")
    assert sheet("mix", 0.1, [own]) == Sheet(((56, 1.0),), 3.0, 0.1)
    with pytest.raises(UsageError, match="not a known material"):
        sheet("mix", 0.1)


def test_neighbours_of_the_same_stuff_are_one() -> None:
    cut = (sheet("concrete", 0.04), sheet("concrete", 0.06), LEAD, LEAD, CONCRETE)
    found = merged(cut)
    assert [one.thickness for one in found] == pytest.approx([0.1, 0.004, 0.1])
    assert merged(found) == found
    assert merged((CONCRETE, LEAD, CONCRETE)) == (CONCRETE, LEAD, CONCRETE)
    assert merged(()) == ()


def test_another_density_is_other_stuff() -> None:
    lighter = Sheet(CONCRETE.fractions, 2.2, 0.1)
    assert merged((CONCRETE, lighter)) == (CONCRETE, lighter)


def test_k_elements_of_a_wall() -> None:
    """Elements with an edge above 10 keV and K-shell data, from half a per cent of the mass up."""
    assert k_elements((CONCRETE,)) == ()
    assert k_elements((LEAD,)) == (82,)
    assert k_elements((LEAD, sheet("barite concrete", 0.1), LEAD)) == (56, 82)
    trace = Material.from_symbols("trace", 1.0, {"O": 0.996, "Pb": 0.004}, "test")
    assert k_elements((sheet("trace", 0.1, [trace]),)) == ()


def test_key_changes_with_every_content(monkeypatch: pytest.MonkeyPatch) -> None:
    stacks = [
        (CONCRETE, LEAD),
        (LEAD, CONCRETE),
        (CONCRETE,),
        (CONCRETE, sheet("lead", 0.0020001)),
        (Sheet(CONCRETE.fractions, 2.31, 0.1), LEAD),
        (sheet("limestone concrete", 0.1), LEAD),
    ]
    keys = [content_key(stack) for stack in stacks]
    assert len(set(keys)) == len(keys)
    assert content_key((CONCRETE, LEAD)) == keys[0]
    monkeypatch.setattr(makeup, "METHOD_VERSION", makeup.METHOD_VERSION + 1)
    assert content_key((CONCRETE, LEAD)) not in keys


@pytest.mark.parametrize("changed", makeup.TABLES)
def test_key_changes_with_every_table(changed: str, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """One digit in any table the slab method reads makes kept answers worthless."""
    before = content_key((LEAD,))
    for name in makeup.TABLES:
        (tmp_path / name).write_bytes(
            (folder("data") / name).read_bytes() + (b"1" if name == changed else b"")
        )
    monkeypatch.setattr("scatterbay.barriers.makeup.folder", lambda _: tmp_path)
    makeup._tables_digest.cache_clear()
    try:
        assert content_key((LEAD,)) != before
    finally:
        monkeypatch.undo()
        makeup._tables_digest.cache_clear()
    assert content_key((LEAD,)) == before


def test_the_tables_in_the_key_are_those_that_transport_reads(monkeypatch: pytest.MonkeyPatch) -> None:
    """Building an answer from scratch opens every table that the key counts, and no other."""
    opened: set[str] = set()

    class Watched:
        def __truediv__(self, name: str) -> object:
            opened.add(name)
            return folder("data") / name

    monkeypatch.setattr("scatterbay.tables.files.folder", lambda _: Watched())
    caches = [
        files.read_table, attenuation.element, attenuation.air, attenuation.pair, attenuation._elements,
        attenuation._pairs, conversion.ambient_per_kerma, elements.symbols, elements.atomic_number,
        elements.atomic_weight, scattering.momentum_nodes, scattering.incoherent_function, scattering.form_factor,
        shells.k_shell, shells._all, dose._ambient_cubic, medium._nodes, medium._element,
    ]  # fmt: skip
    for cached in caches:
        cached.cache_clear()
    build_answer((Sheet(((30, 0.4), (47, 0.6)), 8.0, 1e-3),))
    assert opened == set(makeup.TABLES)
