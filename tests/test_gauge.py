"""`beatwise gauge` and `beatwise boards`, as a user types them."""

from __future__ import annotations

import json
from pathlib import Path

import pytest

from beatwise import cli
from beatwise.memory import board, board_names
from beatwise.memory import boards as room


def told(capsys: pytest.CaptureFixture[str], *arguments: str) -> tuple[int, str, str]:
    status = cli.run(arguments)
    captured = capsys.readouterr()
    return status, captured.out, captured.err


def test_json_has_the_rate_and_every_limit(capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = told(capsys, "gauge", "--run", "128", "--channels", "4", "--outstanding", "128", "--as", "json")
    assert (status, err) == (0, "")
    answer = json.loads(out)
    assert answer["limit"] == "order"
    assert answer["gbps"] == min(answer["limits"].values()) == pytest.approx(1.075, rel=0.10)  # XD099, part 3
    assert answer["share_of_peak"] == pytest.approx(answer["gbps"] / 14.4)


def test_text_names_the_limit_that_holds(capsys: pytest.CaptureFixture[str]) -> None:
    status, out, _ = told(capsys, "gauge", "--board", "ddr4-2400-1ch", "--direction", "write", "--burst", "4")
    assert status == 0
    assert out.splitlines()[0] == (
        "ddr4-2400-1ch: write, sequential, 512 bits at 300 MHz, 4 beats a transaction, 16 outstanding"
    )
    assert out.splitlines()[1] == "9.6 GB/s, 50 % of a channel's peak of 19.2 GB/s; held by gaps"


def test_a_sweep_as_a_chart_and_as_json(capsys: pytest.CaptureFixture[str]) -> None:
    sweep = ("gauge", "--sweep", "run=32:65536", "--outstanding", "64")
    status, out, _ = told(capsys, *sweep)
    assert status == 0
    rows = [line.split() for line in out.splitlines()[4:]]
    assert [row[0] for row in rows] == [str(32 << step) for step in range(12)]
    bars = [len(row[2]) for row in rows]
    assert bars == sorted(bars) and bars[0] < bars[-1]
    assert all(len(line) <= 80 for line in out.splitlines()[1:])
    document = json.loads(told(capsys, *sweep, "--as", "json")[1])
    assert [point["run"] for point in document["points"]] == [32 << step for step in range(12)]
    assert all({"gbps", "share_of_peak", "limit", "limits"} <= point.keys() for point in document["points"])


def test_a_board_of_the_users_own(capsys: pytest.CaptureFixture[str], tmp_path: Path) -> None:
    own = tmp_path / "harbour.toml"
    text = (Path(room.__file__).with_name("boards") / "hbm2-32ch.toml").read_text("utf-8")
    own.write_text(text.replace("value = 13.27", "value = 6.5"))
    answer = json.loads(told(capsys, "gauge", "--board", str(own), "--as", "json")[1])
    assert (answer["board"], answer["gbps"], answer["limit"]) == ("harbour", 6.5, "channel")
    assert "harbour: two HBM2 stacks" in told(capsys, "boards", str(own))[1]


@pytest.mark.parametrize(
    ("arguments", "says"),
    [
        (["--run", "0"], "--run: '0': expected a number of bytes, at least 1, or sequential"),
        (["--run", "many"], "--run: 'many': expected a number of bytes, at least 1, or sequential"),
        (["--run", "sequential", "--random"], "run: sequential traffic has no stride and no random places"),
        (["--random", "--stride", "64"], "random: places that a stride gives are not random"),
        (["--width", "500"], "width: expected a power of two from 8 to 1024 bits, got 500"),
        (["--channels", "64"], "channels: the board has 32, got 64"),
        (["--burst", "257"], "--burst: 257 is not in the range 1<=x<=256."),
        (["--clock", "0"], "--clock: 0.0 is not in the range x>0."),
        (["--sweep", "run"], "sweep: expected NAME=FIRST:LAST, as in run=32:65536, NAME one of run, stride, "),
        (["--board", "nowhere.toml"], "nowhere.toml: no such file"),
        (["--direction", "sideways"], "--direction: 'sideways' is not one of 'read', 'write', 'mixed'."),
    ],
)
def test_a_mistake_is_one_line(capsys: pytest.CaptureFixture[str], arguments: list[str], says: str) -> None:
    status, out, err = told(capsys, "gauge", *arguments)
    assert (status, out, err.count("\n")) == (2, "", 1)
    assert says in err


def test_all_boards_and_one(capsys: pytest.CaptureFixture[str]) -> None:
    out = told(capsys, "boards")[1]
    assert [line.split()[0] for line in out.splitlines()] == list(board_names())
    shown = " ".join(told(capsys, "boards", "hbm2-32ch")[1].split())
    for fact, source in board("hbm2-32ch").sources.items():
        assert fact in shown
        assert " ".join(source.split())[:24] in shown
    status, _, err = told(capsys, "boards", "hbm9")
    assert status == 2 and "no board named 'hbm9'" in err


def test_to_a_file(capsys: pytest.CaptureFixture[str], tmp_path: Path) -> None:
    assert told(capsys, "gauge", "--to", str(tmp_path / "gauge.txt"))[:2] == (0, "")
    assert "held by channel" in (tmp_path / "gauge.txt").read_text("utf-8")
