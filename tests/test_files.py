"""Files are written whole or not at all."""

from __future__ import annotations

from pathlib import Path

import pytest

from calcsheets import files
from calcsheets.errors import OutputError
from calcsheets.files import make_folder, write_whole


def test_a_file_is_written_and_nothing_else_is_left(tmp_path: Path) -> None:
    write_whole(tmp_path / "a.bin", b"content")
    assert [path.name for path in tmp_path.iterdir()] == ["a.bin"]
    assert (tmp_path / "a.bin").read_bytes() == b"content"


def test_an_old_file_stays_when_the_new_one_cannot_be_written(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """The disk is full just before the new content is safe."""
    path = tmp_path / "a.bin"
    path.write_bytes(b"old")

    def full(_: int) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(files.os, "fsync", full)
    with pytest.raises(OutputError) as caught:
        write_whole(path, b"new")
    assert str(caught.value) == (
        f"{path}: no space left on device. Free space or choose another folder with --out."
    )
    assert path.read_bytes() == b"old"
    assert [item.name for item in tmp_path.iterdir()] == ["a.bin"]


def test_a_missing_folder_is_said(tmp_path: Path) -> None:
    with pytest.raises(OutputError) as caught:
        write_whole(tmp_path / "nowhere" / "a.bin", b"")
    assert "no such file or directory" in str(caught.value)


def test_a_folder_is_made_with_those_above_it(tmp_path: Path) -> None:
    make_folder(tmp_path / "a" / "b")
    make_folder(tmp_path / "a" / "b")
    assert (tmp_path / "a" / "b").is_dir()
