"""Settings: where they are found, what they may say, and how a mistake is told."""

from __future__ import annotations

import subprocess
from pathlib import Path

import pytest

from beatwise.errors import BadSettings
from beatwise.settings import Limits, Settings, find_settings, merge, read_settings


@pytest.fixture(autouse=True)
def here(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """An empty working directory."""
    monkeypatch.chdir(tmp_path)
    return tmp_path


def read(text: str, *, trusted: bool = False, rules: list[str] | None = None) -> Settings:
    Path("beatwise.toml").write_text(text, encoding="utf-8")
    return read_settings(Path("beatwise.toml"), trusted=trusted, rules=rules)


def mistake(text: str, *, rules: list[str] | None = None) -> str:
    with pytest.raises(BadSettings) as error:
        read(text, rules=rules)
    assert "\n" not in str(error.value)
    assert str(error.value).startswith("beatwise.toml: ")
    return str(error.value).removeprefix("beatwise.toml: ")


def test_an_empty_file_leaves_every_default() -> None:
    assert read("") == Settings()


def test_everything_can_be_set(here: Path) -> None:
    assert read("""
        board = "ddr4-2400-1ch"
        top = "sweep"
        jobs = 2
        time_limit_seconds = 2.5
        memory_limit_mb = 512
        threshold = "error"
        include = ["include", "common/.generated"]
        define = ["GATES=1024", "FAST"]
        directives = "radar.tcl"
        ignore = ["old/*"]

        [given]
        n = 4096
        offset = -1

        [levels]
        short-run = "error"
        narrow-port = "off"

        [limits]
        error_loss = 1
        error_share = 0.05

        [place]
        gates = 3
        sums = "4:7"
        """) == Settings(
        board="ddr4-2400-1ch",
        top=("sweep",),
        jobs=2,
        time_limit_seconds=2.5,
        memory_limit_mb=512,
        threshold="error",
        include=(here / "include", here / "common/.generated"),
        define=("GATES=1024", "FAST"),
        directives=(here / "radar.tcl",),
        ignore=("old/*",),
        given={"n": 4096, "offset": -1},
        levels={"short-run": "error", "narrow-port": "off"},
        limits=Limits(error_loss=1.0, error_share=0.05),
        place={"gates": (3, 3), "sums": (4, 7)},
    )  # fmt: skip


SECONDS = "must be a number of seconds, above 0 and up to a day"


@pytest.mark.parametrize(
    ("text", "told"),
    [
        ("tpo = 'sweep'", "unknown key 'tpo'; did you mean 'top'?"),
        ("[limits]\nerror_los = 1", "unknown key 'limits.error_los'; did you mean 'error_loss'?"),
        ("[limits]\nx = 1", "unknown key 'limits.x'; known are error_loss, error_share, warning_loss"),
        ("board = 2", "'board' must be a text, not 2"),
        ("board = ''", "'board' must be a text, not ''"),
        ("top = [1]", "'top' must be a text or a list of texts, not [1]"),
        ("jobs = 0", "'jobs' must be a whole number of at least 1, not 0"),
        ("jobs = true", "'jobs' must be a whole number of at least 1, not True"),
        ("jobs = 'two'", "'jobs' must be a whole number of at least 1, not 'two'"),
        ("time_limit_seconds = 0", f"'time_limit_seconds' {SECONDS}, not 0"),
        ("time_limit_seconds = nan", f"'time_limit_seconds' {SECONDS}, not nan"),
        ("time_limit_seconds = 1e9", f"'time_limit_seconds' {SECONDS}, not 1000000000.0"),
        ("threshold = 'info'", "'threshold' must be error, warning or note, not 'info'"),
        ("threshold = 'off'", "'threshold' must be error, warning or note, not 'off'"),
        ("define = ['4=N']", "'define' must be NAME or NAME=VALUE, or a list of those, not ['4=N']"),
        ("given = 4", "'given' must be a table [given], not 4"),
        ("[given]\nn = 4.5", "'given.n' must be a whole number, not 4.5"),
        ("[given]\nn = false", "'given.n' must be a whole number, not False"),
        ("[levels]\nshort-run = 'bad'", "'levels.short-run' must be error, warning, note or off, not 'bad'"),
        ("[limits]\nerror_loss = 1.5", "'limits.error_loss' must be a share from 0 to 1, not 1.5"),
        ("[limits]\nerror_loss = 'half'", "'limits.error_loss' must be a share from 0 to 1, not 'half'"),
        ("[place]\na = -1", "'place.a' must be a channel (3) or a range of channels ('0:3'), not -1"),
        ("[place]\na = '3:1'", "'place.a' must be a channel (3) or a range of channels ('0:3'), not '3:1'"),
        ("jobs = 1\0", "a binary file, not C++ source"),
    ],
)  # fmt: skip
def test_a_mistake_names_the_key_and_what_was_expected(text: str, told: str) -> None:
    assert mistake(text) == told


@pytest.mark.parametrize("text", ["jobs = ", "jobs 1", "jobs = 1\njobs = 2"])
def test_what_is_no_toml_is_told_with_its_line(text: str) -> None:
    assert mistake(text).startswith("not valid TOML: ")


def test_hostile_nesting_is_told() -> None:
    assert "nested" in mistake("x = " + "[" * 5000)


def test_a_long_wrong_value_is_cut_short() -> None:
    assert mistake(f"jobs = '{'x' * 500}'") == f"'jobs' must be a whole number of at least 1, not '{'x' * 56}..."


def test_rule_names_are_checked_where_the_rules_are_known() -> None:
    rules = ["short-run", "narrow-port"]
    assert read("[levels]\nshort-run = 'off'", rules=rules).levels == {"short-run": "off"}
    assert (
        mistake("[levels]\nshort-runs = 'off'", rules=rules)
        == "unknown key 'levels.short-runs'; did you mean 'short-run'?"
    )


@pytest.mark.parametrize("key", ["include", "directives", "board"])
@pytest.mark.parametrize("path", ["/etc/x.toml", "../x.toml", "link/x.toml"])
def test_only_a_file_that_the_user_named_may_lead_out_of_its_repository(here: Path, key: str, path: str) -> None:
    (here / "link").symlink_to("/etc")
    assert mistake(f"{key} = '{path}'").startswith(f"'{key}' must be within the repository of the settings file")
    assert read(f"{key} = '{path}'", trusted=True)


def test_paths_may_go_up_to_the_root_of_the_work_tree(here: Path) -> None:
    subprocess.run(["git", "init", "-q", "."], check=True)
    (here / "k").mkdir()
    Path("k/beatwise.toml").write_text("include = '../common'", encoding="utf-8")
    assert read_settings(Path("k/beatwise.toml")).include == (here / "common",)


def test_the_nearest_file_upward_is_found(here: Path) -> None:
    source = here / "a/b/sweep.cpp"
    source.parent.mkdir(parents=True)
    source.touch()
    (here / "beatwise.toml").touch()
    assert find_settings(Path("a/b/sweep.cpp")) == find_settings(Path("a")) == here / "beatwise.toml"
    (here / "a/b/beatwise.toml").touch()
    assert find_settings(source) == find_settings(source.parent) == here / "a/b/beatwise.toml"
    assert find_settings(here / "a") == here / "beatwise.toml"


def test_the_search_ends_at_the_root_of_the_repository(here: Path) -> None:
    (here / "beatwise.toml").touch()
    (here / "repository/.git").mkdir(parents=True)
    (here / "repository/k").mkdir()
    assert find_settings(here / "repository/k") is None


def test_the_command_line_comes_before_the_file(here: Path) -> None:
    settings = read("top = 'a'\njobs = 2\ninclude = 'x'\ndefine = 'N=1'\nthreshold = 'note'\n[given]\nn = 1\nm = 2")
    assert merge(settings) == settings
    merged = merge(
        settings, top=["b"], include=[Path("y")], define=["N=2"], given={"n": 3}, threshold="error", board="hbm2-32ch"
    )
    assert (merged.top, merged.jobs, merged.threshold) == (("b",), 2, "error")
    assert merged.include == (here / "y", here / "x")
    assert merged.define == ("N=1", "N=2")
    assert merged.given == {"n": 3, "m": 2}
