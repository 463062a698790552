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
    assert board_names() == (
        "ddr4-2400-1ch", "ddr4-2400-4ch", "ddr5-4800-2ch", "hbm2-32ch", "hbm2e-32ch", "hbm3-32ch", "lpddr4-embedded",
    )  # fmt: skip


@pytest.mark.parametrize("name", board_names())
def test_every_fact_of_a_profile_names_its_source(name: str) -> None:
    profile = board(name)
    assert profile.name == name
    assert set(profile.sources) == {field.name for field in fields(Board)} - {"name", "about", "sources"}
    assert all(len(source) > 10 for source in profile.sources.values())


def test_peaks_are_width_times_rate() -> None:
    """JESD235, JESD238, JESD79-4 and -5 by way of Ramulator 2.0, HBM2 at 1.8 Gb/s: UG1556. JESD209-4 from memory."""
    bits_and_rates = {
        "ddr4-2400-1ch": (64, 2.4), "ddr4-2400-4ch": (64, 2.4), "ddr5-4800-2ch": (32, 4.8), "hbm2-32ch": (64, 1.8),
        "hbm2e-32ch": (64, 3.2), "hbm3-32ch": (32, 6.4), "lpddr4-embedded": (16, 3.2),
    }  # fmt: skip
    assert set(bits_and_rates) == set(board_names())
    for name, (bits, rate) in bits_and_rates.items():
        assert board(name).peak_gbps == pytest.approx(bits / 8 * rate)
    assert board("hbm2-32ch").peak_gbps * 32 == pytest.approx(460.8)
    assert board("hbm3-32ch").peak_gbps * 32 == pytest.approx(819.2)


@pytest.mark.parametrize("name", board_names())
def test_every_source_is_a_place_or_says_that_there_is_none(name: str) -> None:
    known = "no source|from memory|taken from|fitted|set by|inferred|definition|between|clock of|less refresh"
    papers = "JESD|PG|UG|XD099|Ramulator|DRAMsim3|FCCM|FPGA 2021|AXI burst log|guide"
    for fact, source in board(name).sources.items():
        assert re.search(f"{known}|{papers}", source), f"{fact}: {source}"


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
    with pytest.raises(BadSettings, match=re.escape(f"no board named 'hbm'; known: {', '.join(board_names())}")):
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
        ("row:14 group:1", "row:14 groups:1", "address_map: expected words like row:14 group:1 bank:2 column:5, from "),
        ("row:14 group:1", "row:14 group:", "address_map: expected words like row:14 group:1 bank:2 column:5, from "),
        ("row:14 group:1", "row:999 group:1", "address_map: expected words like row:14 group:1 bank:2 column:5, from "),
        ("row:14 group:1", "row:14 group:2", "address_map: expected 2 group bits in all (sizes of the profile), got 3"),
        ("row:14 group:1", "group:1", "address_map: expected row bits"),
        ("value = \"row:14 group:1 bank:2 column:5 group:1\"", "value = 3", "address_map: expected fields from high"),
        ("[bank_groups]\nvalue = 4", "[bank_groups]\nvalue = 3", "address_map: expected powers of two"),
        ("value = 1024\n", "value = 1000\n", "page_bytes: expected a multiple of granule_bytes, 32; got 1000"),
        ("[switch_ports]\nvalue = 4", "[switch_ports]\nvalue = 5", "switch_ports: expected a divisor of channels, 32"),
        ("[lateral_links]\nvalue = 2", "[lateral_links]\nvalue = 0", "lateral_links: expected at least 1 between"),
        ("[lateral_links]\nvalue = 2", "[lateral_links]\nvalue = 5", "lateral_links: expected at most switch_ports, 4"),
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


def test_facts_with_a_default_may_be_left_out(tmp_path: Path) -> None:
    needed = [
        "channels", "channel_bytes", "peak_gbps", "granule_bytes", "page_bytes", "refresh_ns", "refresh_interval_ns",
        "row_cycle_ns", "four_activates_ns", "read_latency_ns", "write_latency_ns", "kernel_mhz", "port_bits",
        "bank_groups", "banks_per_group",
    ]  # fmt: skip
    tables = dict(re.findall(r"(?ms)^\[(\w+)\]\n(.*?)(?=^\[|\Z)", TEXT))
    own = tmp_path / "harbour.toml"
    own.write_text("".join(f"[{fact}]\n{tables[fact]}" for fact in needed))
    profile = board(own)
    assert profile.read_cap_gbps == profile.write_cap_gbps == pytest.approx(13.44)
    assert profile.sources["read_cap_gbps"] == "peak_gbps less refresh; not measured"
    assert profile.sources["ranks"].startswith("not given")
    for fact in needed:
        own.write_text("".join(f"[{other}]\n{tables[other]}" for other in needed if other != fact))
        with pytest.raises(BadSettings, match=f"{fact}: missing"):
            board(own)
