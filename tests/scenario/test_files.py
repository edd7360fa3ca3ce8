"""What is not a scenario file at all, and files that are odd but good."""

from __future__ import annotations

import os
from pathlib import Path

import pytest

from scatterbay.errors import ScenarioError
from scatterbay.scenario import load, loads
from tests.scenario.edits import BASE, refusal


def refused(path: Path, content: bytes | None = None) -> ScenarioError:
    if content is not None:
        path.write_bytes(content)
    with pytest.raises(ScenarioError) as caught:
        load(path)
    assert caught.value.exit_code == 2
    assert str(path) in caught.value.render()
    return caught.value


def test_a_missing_file_names_the_one_beside_it(tmp_path: Path) -> None:
    (tmp_path / "weld-bay.yaml").write_text(BASE)
    assert f"did you mean '{tmp_path / 'weld-bay.yaml'}'" in refused(tmp_path / "weldbay.yaml").render()
    assert "no folder" in refused(tmp_path / "nowhere" / "bay.yaml").render()


def test_a_folder(tmp_path: Path) -> None:
    assert "is a folder" in refused(tmp_path).render()


@pytest.mark.skipif(not hasattr(os, "mkfifo"), reason="no named pipes here")
def test_a_pipe_is_not_waited_for(tmp_path: Path) -> None:
    os.mkfifo(tmp_path / "pipe.yaml")
    assert "not a regular file" in refused(tmp_path / "pipe.yaml").render()


@pytest.mark.parametrize(
    ("content", "said"),
    [
        (b"", "the file is empty"),
        (b"# only a remark\n\n", "the file is empty"),
        (b"\x7fELF\x02\x01\x00\x00", "is a binary file"),
        (BASE.encode("utf-16"), "not UTF-8"),
        ("title: m\xfcll".encode("latin-1"), "0xfc"),
        (b"just words", "this is not a scenario"),
        (b"- a\n- list\n", "this is not a scenario"),
        (b"12", "this is not a scenario"),
        (b"x" * 1_000_001, "larger than 1000 kB"),
        (b"a: 'open\n", "a quotation mark is not closed"),
        (b"a: [1, 2\nb: 3", "a '[' is not closed"),
        (b"a: {b: 1\nc: 2", "a '{' is not closed"),
        (b"a\nb: 1", "':'"),
        (b"a: &x [*x]", "contains itself"),
        (b"a: [" + b"1, " * 30_000 + b"]", "more than 20000 entries"),
        (b"a: " + b"[" * 500, "nested more than 12 deep"),
        (b"a: &a [1]\n" + b"b: [" + b"*a, " * 60 + b"]", "more than 50 aliases"),
    ],
    ids=lambda value: value[:24] if isinstance(value, str) else "",
)
def test_refused_whole(tmp_path: Path, content: bytes, said: str) -> None:
    assert said in refused(tmp_path / "bay.yaml", content).render()


def test_an_alias_bomb_is_refused_before_it_grows() -> None:
    """Nine levels of nine aliases each would be 400 million entries."""
    levels = [
        f"{name}: &{name} [{', '.join([f'*{before}'] * 6)}]"
        for before, name in zip("abcdefgh", "bcdefghi", strict=True)
    ]
    assert "entries" in refusal("a: &a [1, 1, 1, 1, 1, 1]\n" + "\n".join(levels)).render()


def test_the_line_of_a_byte_that_is_not_text(tmp_path: Path) -> None:
    error = refused(tmp_path / "bay.yaml", b"format: 1\ntitle: m\xfcll\n")
    assert (error.problems[0].line, error.problems[0].column) == (2, 9)


def test_windows_line_ends_and_a_byte_order_mark(tmp_path: Path) -> None:
    path = tmp_path / "bay.yaml"
    path.write_bytes(b"\xef\xbb\xbf" + BASE.replace("\n", "\r\n").encode())
    assert load(path).bodies == loads(BASE).bodies
    path.write_bytes(
        b"\xef\xbb\xbf" + BASE.replace("height: 3 m", "height: 3").replace("\n", "\r\n").encode()
    )
    assert refused(path).problems[0].line == BASE[: BASE.index("height: 3 m")].count("\n") + 1


def test_the_digest_is_of_the_bytes(tmp_path: Path) -> None:
    import hashlib

    path = tmp_path / "bay.yaml"
    path.write_text(BASE, encoding="utf-8")
    assert load(path).sha256 == hashlib.sha256(path.read_bytes()).hexdigest()
    assert load(path).sha256 == loads(BASE).sha256
