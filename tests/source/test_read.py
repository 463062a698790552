"""Reading a file: odd bytes are kept, unusable files are told in one line."""

from __future__ import annotations

import os
from pathlib import Path

import pytest

from beatwise.errors import BadInput
from beatwise.source import SourceText, read_text


def written(folder: Path, content: bytes) -> Path:
    path = folder / "echo.cpp"
    path.write_bytes(content)
    return path


@pytest.mark.parametrize(
    ("content", "read"),
    [
        (b"int a;\r\nint b;\n", SourceText("int a;\r\nint b;\n", "utf-8", False)),
        (b"\xef\xbb\xbfint a;", SourceText("int a;", "utf-8", True)),
        ("// Küste".encode(), SourceText("// Küste", "utf-8", False)),
        ("// Küste".encode("latin-1"), SourceText("// Küste", "latin-1", False)),
        (b"\xff\xfe\x80", SourceText("\xff\xfe\x80", "latin-1", False)),
        (b"", SourceText("", "utf-8", False)),
    ],
)
def test_any_text_is_read_with_its_line_ends(tmp_path: Path, content: bytes, read: SourceText) -> None:
    assert read_text(written(tmp_path, content)) == read


@pytest.mark.parametrize(
    ("content", "said"),
    [(b"\x7fELF\0\0", "a binary file, not C++ source"), (b" " * (4 << 20) + b";", "larger than 4 MiB")],
)
def test_what_is_no_source_is_refused(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, content: bytes, said: str
) -> None:
    monkeypatch.chdir(tmp_path)
    with pytest.raises(BadInput) as error:
        read_text(written(tmp_path, content))
    assert str(error.value) == f"echo.cpp: {said}"


def test_a_missing_file_and_a_pipe_are_refused(tmp_path: Path) -> None:
    with pytest.raises(BadInput, match=r"gone\.cpp: no such file or folder$"):
        read_text(tmp_path / "gone.cpp")
    os.mkfifo(tmp_path / "pipe.cpp")
    with pytest.raises(BadInput, match=r"pipe\.cpp: not an ordinary file$"):
        read_text(tmp_path / "pipe.cpp")
    with pytest.raises(BadInput, match="cannot be read"):
        read_text(Path("echo\0.cpp"))
