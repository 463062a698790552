"""Board profiles: those that come with the program, and what a user's own may get wrong."""

from __future__ import annotations

import re
from dataclasses import fields
from pathlib import Path

import pytest

from beatwise.errors import BadSettings
from beatwise.memory import board, board_names
from beatwise.memory import boards as room
from beatwise.model.board import Board

TEXT = (Path(room.__file__).with_name("boards") / "hbm2-32ch.toml").read_text("utf-8")


def test_the_profiles_that_come_with_the_program() -> None:
    assert board_names() == ("ddr4-2400-1ch", "hbm2-32ch")


@pytest.mark.parametrize("name", board_names())
def test_every_fact_of_a_profile_names_its_source(name: str) -> None:
    profile = board(name)
    assert profile.name == name
    assert set(profile.sources) == {field.name for field in fields(Board)} - {"name", "about", "sources"}
    assert all(len(source) > 10 for source in profile.sources.values())


def test_peaks_are_width_times_rate() -> None:
    """64 bits at 1.8 Gb/s (power guide UG1556) and at 2400 MT/s (JESD79-4)."""
    assert board("hbm2-32ch").peak_gbps == pytest.approx(64 / 8 * 1.8)
    assert board("ddr4-2400-1ch").peak_gbps == pytest.approx(64 / 8 * 2.4)


def test_a_profile_of_the_users_own(tmp_path: Path) -> None:
    own = tmp_path / "harbour.toml"
    own.write_text(TEXT.replace("value = 32\n", "value = 16\n", 1))
    assert board(own).channels == 16
    assert board(str(own)).name == "harbour"


def refusal(tmp_path: Path, text: str) -> str:
    own = tmp_path / "harbour.toml"
    own.write_bytes(text.encode("latin-1"))
    with pytest.raises(BadSettings) as caught:
        board(own)
    message = str(caught.value)
    assert "\n" not in message
    return message.replace(f"{tmp_path}/", "")


def test_an_unknown_name_lists_the_known_ones() -> None:
    with pytest.raises(BadSettings, match=re.escape("no board named 'hbm'; known: ddr4-2400-1ch, hbm2-32ch")):
        board("hbm")


@pytest.mark.parametrize("path", ["missing/harbour.toml", "harbour.toml", "boards/harbour"])
def test_a_missing_file(path: str) -> None:
    with pytest.raises(BadSettings, match=re.escape(f"{path}: no such file")):
        board(path)


def test_a_folder_is_no_profile(tmp_path: Path) -> None:
    with pytest.raises(BadSettings, match="no such file"):
        board(tmp_path)


@pytest.mark.parametrize(
    ("old", "new", "says"),
    [
        ("[channels]\n", "[channels\n", "harbour.toml: not TOML: "),
        ("[channels]\n", "[chanels]\n", "harbour.toml: chanels: no such fact; known: channels, "),
        ("value = 32\n", 'value = "many"\n', "channels: expected a whole number of at least 1, got 'many'"),
        ("value = 32\n", "value = 0\n", "channels: expected a whole number of at least 1, got 0"),
        ("value = 32\n", "value = 1.5\n", "channels: expected a whole number of at least 1, got 1.5"),
        ("value = 32\n", "value = true\n", "channels: expected a whole number of at least 1, got True"),
        ("value = 14.4\n", "value = nan\n", "peak_gbps: expected a number above 0, got nan"),
        ("value = 14.4\n", "value = inf\n", "peak_gbps: expected a number above 0, got inf"),
        ("value = 14.4\n", "value = 10\n", "read_cap_gbps: expected at most peak_gbps, 10"),
        ("value = 260\n", "value = 3900\n", "refresh_ns: expected less than refresh_interval_ns"),
        ("value = 512\n", "value = 500\n", "port_bits: expected a power of two from 8 to 1024, got 500"),
        ("value = 16\nsource = \"HLS", "value = 257\nsource = \"HLS", "burst_beats: expected a whole number from 1 to"),
        ("about = \"", "about = 3 # \"", "about: expected text, got 3"),
        ("about", "channels = 3\nabout", "harbour.toml: not TOML: "),
    ],
)  # fmt: skip
def test_what_is_wrong_is_told_with_file_key_and_expectation(tmp_path: Path, old: str, new: str, says: str) -> None:
    assert old in TEXT
    message = refusal(tmp_path, TEXT.replace(old, new, 1))
    assert message.startswith("harbour.toml: ")
    assert says in message


def test_a_fact_left_out(tmp_path: Path) -> None:
    text = re.sub(r"\[page_bytes\]\nvalue = .*\nsource = .*\n", "", TEXT)
    assert refusal(tmp_path, text) == (
        "harbour.toml: page_bytes: missing; expected a table with value (a whole number of at least 1) and source"
    )


def test_a_fact_without_its_source(tmp_path: Path) -> None:
    bare = re.sub(r"(\[page_bytes\]\nvalue = .*\n)source = .*\n", r"\1", TEXT)
    assert "page_bytes: expected a table with value" in refusal(tmp_path, bare)
    empty = re.sub(r"(\[page_bytes\]\nvalue = .*\n)source = .*\n", r'\1source = " "\n', TEXT)
    assert refusal(tmp_path, empty) == "harbour.toml: page_bytes: expected a source in words, got ' '"


def test_text_that_is_no_text(tmp_path: Path) -> None:
    assert refusal(tmp_path, "about = 'caf\xe9'") == "harbour.toml: not UTF-8 text"


def test_brackets_without_end(tmp_path: Path) -> None:
    assert "not TOML" in refusal(tmp_path, "about = " + "[" * 100_000)
