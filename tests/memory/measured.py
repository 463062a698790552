"""What other people measured or published, beside what the model says: one list for the tests and for docs/model.md.

``sets``: the value set a constant of the profile or of the model, so that agreement says nothing; all others are
predicted. Rates in 10^9 byte/s unless the words say otherwise.
"""

from __future__ import annotations

import csv
from collections.abc import Iterator
from dataclasses import dataclass, replace
from pathlib import Path
from typing import Literal

from beatwise.memory import board, queueing, rows, switch
from beatwise.memory.demand import Demand
from beatwise.memory.latency import idle_read_cycles
from beatwise.memory.onchip import BLOCK_18K, blocks, burst_buffer_blocks
from beatwise.memory.price import price
from beatwise.model.board import Board

HERE = Path(__file__).parent
DDR, HBM = board("ddr4-2400-1ch"), board("hbm2-32ch")
SIMULATED = {path.stem: board(path) for path in sorted((HERE / "boards").glob("*.toml"))}


@dataclass(frozen=True, slots=True)
class Check:
    """One value of a source and the model's; ``tolerance`` is relative."""

    source: str
    what: str
    value: float
    model: float
    tolerance: float = 0.10
    sets: bool = False  #: the value set a constant
    seen: bool = True  #: read in the source itself; else at second hand, from memory, or computed

    @property
    def error(self) -> float:
        return self.model / self.value - 1


# AXI burst log: README log of a public example suite, "AXI burst performance", one DDR4-2400 channel, 300 MHz, 16 MiB
# buffers, one direction at a time. It prints GiB/s; converted (x 1.0737). (beats, outstanding): at 256, at 512 bits.
READS = {
    (4, 4): (2.171, 4.220), (16, 4): (7.311, 14.078), (32, 4): (9.234, 18.062),
    (4, 32): (9.328, 18.063), (16, 32): (9.599, 18.071), (32, 32): (9.599, 18.062),
}  # fmt: skip
READS_SET = {(4, 4, 32), (16, 4, 32), (16, 4, 64), (16, 32, 64)}  #: latency, cycles a beat adds, read cap
WRITES = {
    (4, 4): (2.866, 5.519), (16, 4): (7.113, 12.664), (32, 4): (8.158, 15.778),
    (4, 32): (4.800, 9.599), (16, 32): (7.679, 15.355), (32, 32): (8.532, 16.276),
}  # fmt: skip
WRITES_SET = {(4, 4, 32), (4, 4, 64), (16, 4, 64), (4, 32, 32), (32, 32, 64)}  #: latency, gap, write cap
# Tutorial XD099, "using HBM", part 3: one port of 512 bits, random transactions, over 1, 2 and 4 pseudo-channels, 128
# outstanding. Its clock is not stated; 300 MHz inferred.
GROUPS = {
    64: (4.754, 0.761, 0.553), 128: (9.599, 1.499, 1.075), 256: (12.616, 2.711, 1.995),
    512: (13.134, 4.499, 3.499), 1024: (13.155, 6.547, 5.531),
}  # fmt: skip
GROUPS_SET = {(64, 1), (128, 1), (64, 2), (64, 4)}  #: request cycles; what a change of channel costs


def checks() -> tuple[Check, ...]:
    """Every value, by source."""
    return (*_axi_bursts(), *_channel_groups(), *_channels(), *_banks(), *_switches(), *_queues(), *_blocks())


def _gbps(on: Board, ask: Demand) -> float:
    return price(on, ask).gbps


def _axi_bursts() -> Iterator[Check]:
    for direction, table, setting in (("read", READS, READS_SET), ("write", WRITES, WRITES_SET)):
        for (beats, outstanding), values in table.items():
            for beat, value in zip((32, 64), values, strict=True):
                ask = Demand("read" if direction == "read" else "write", beat, beat, beats, outstanding, None)
                what = f"{direction}s, {beat * 8} bits, bursts of {beats}, {outstanding} outstanding"
                yield Check("AXI burst log", what, value, _gbps(DDR, ask), sets=(beats, outstanding, beat) in setting)


def _channel_groups() -> Iterator[Check]:
    for size, values in GROUPS.items():
        for channels, value in zip((1, 2, 4), values, strict=True):
            ask = Demand("read", 64, 64, min(16, size // 64), 128, size, channels=channels)
            what = f"random {size} bytes over {channels} pseudo-channels"
            yield Check("XD099, part 3", what, value, _gbps(HBM, ask), sets=(size, channels) in GROUPS_SET)
    for channels, value in ((1, 13.07), (2, 13.12), (4, 13.145)):
        ask = Demand("read", 64, 64, 16, 128, None, channels=channels)
        yield Check("XD099, part 3", f"sequential over {channels} pseudo-channels", value, _gbps(HBM, ask))
    log = "example suite's log"
    random = Demand("read", 64, 64, 2, 64, 128)
    yield Check(
        log, "random 128 bytes, a pseudo-channel for each of 12 ports, a port", 11.50, _gbps(HBM, random), sets=True
    )
    yield Check(log, "rows limit of the same", 11.50, rows.walk(HBM, 128))
    yield Check(log, "random 128 bytes over 4 pseudo-channels", 1.032, _gbps(HBM, replace(random, channels=4)))


def _channels() -> Iterator[Check]:
    """What a channel gives at best, and to reads and writes in turns."""
    log, best = "example suite's log", Demand("read", 64, 64, 64, 64, None)
    writes, mixed = replace(best, direction="write"), replace(best, direction="mixed")
    yield Check(
        "Wang et al., FCCM 2020, table V", "HBM2 read cap", 13.27, _gbps(HBM, best), 0.03, sets=True, seen=False
    )
    yield Check(
        "Wang et al., FCCM 2020, table V", "HBM2 peak less refresh", 13.27, HBM.refreshed_gbps, 0.03, seen=False
    )
    yield Check("Wang et al., FCCM 2020, table V", "DDR4 peak less refresh", 18.0, DDR.refreshed_gbps, 0.03, seen=False)
    yield Check("Wang et al., FCCM 2020, abstract", "32 pseudo-channels", 425, 32 * _gbps(HBM, best), 0.03)
    yield Check(log, "32 pseudo-channels at a time", 421.3, 32 * _gbps(HBM, best), 0.03)
    yield Check(log, "12 pseudo-channels at a time", 158.3, 12 * _gbps(HBM, best), 0.03)
    yield Check(log, "three ports over 32 pseudo-channels", 39.23, 3 * _gbps(HBM, replace(best, channels=32)), 0.03)
    yield Check("XD099, part 1", "about what two stacks give", 420, 32 * _gbps(HBM, best), 0.02)
    yield Check(
        "Lu et al., FPGA 2021", "HBM2 writes, 32 ports", 421.8, 32 * _gbps(HBM, writes), 0.03, sets=True, seen=False
    )
    yield Check("Lu et al., FPGA 2021", "HBM2, one port", 13.2, _gbps(HBM, best), 0.03, seen=False)
    yield Check("Lu et al., FPGA 2021", "DDR4 reads", 17.94, _gbps(DDR, best), 0.03, seen=False)
    yield Check("Lu et al., FPGA 2021", "DDR4 writes", 16.11, _gbps(DDR, writes), 0.03, seen=False)
    four = board("ddr4-2400-4ch")
    yield Check("Lu et al., FPGA 2021", "DDR4 reads, 4 channels", 71.7, 4 * _gbps(four, best), 0.03, seen=False)
    yield Check("Lu et al., FPGA 2021", "DDR4 writes, 4 channels", 64.6, 4 * _gbps(four, writes), 0.03, seen=False)
    yield Check(log, "HBM2, two reads and a write on one pseudo-channel", 11.19, _gbps(HBM, mixed), sets=True)
    yield Check(log, "DDR4, reads and writes on each of 4 channels", 52.2, 4 * _gbps(four, mixed), sets=True)
    three = 2 * _gbps(HBM, best) + _gbps(HBM, writes)
    paced = min(_gbps(HBM, best), _gbps(HBM, replace(writes, burst_beats=16)))
    yield Check(
        log,
        "two reads and a write, a pseudo-channel each: ratio to one (launch time included there)",
        2.76,
        3 * paced / _gbps(HBM, mixed),
        0.30,
    )
    yield Check(log, "the same, three pseudo-channels (launch time included there)", 30.92, min(three, 3 * paced), 0.30)
    steps = replace(writes, burst_beats=16, outstanding=16)
    yield Check("XD099, part 2", "DDR4, vector add in lockstep, a port", 15.17, _gbps(DDR, steps))
    cited = "HBM2E guide 773264, 6.1.1"
    yield Check(cited, "a stack of HBM2E at 90 %", 368.6, 16 * _gbps(board("hbm2e-32ch"), best), 0.01, sets=True)


def _banks() -> Iterator[Check]:
    wang = "Wang et al., FCCM 2020"
    banks, share = rows.banks(HBM, 1), 1 - HBM.refresh_ns / HBM.refresh_interval_ns

    def touching(step: int, below: int) -> float:
        places = (number * step % below // 32 for number in range(8192))
        return share * 8192 * 32 / rows.walk_ns(banks, places)

    yield Check(f"{wang}, fig. 7", "32 bytes every 4 KiB within 8 KiB", 6.7, touching(4096, 8192), 0.05, seen=False)
    yield Check(f"{wang}, fig. 7", "32 bytes every 4 KiB within 256 MiB", 2.4, touching(4096, 2**28), 0.05, seen=False)
    banks_first = replace(HBM, address_map="group:2 bank:2 row:14 column:5")
    ratio = rows.walk(HBM, 32, 1024) / rows.walk(banks_first, 32, 1024)
    yield Check(
        f"{wang}, fig. 6", "32 bytes every KiB: ratio of two address maps", 10, ratio, 0.20, sets=True, seen=False
    )
    for on, hit, mhz, closed, other in ((HBM, 48, 450, 55, 62), (DDR, 22, 300, 27, 32)):
        for row, value in (("closed", closed), ("other", other)):
            cycles = idle_read_cycles(on, "closed" if row == "closed" else "other", hit_cycles=hit, mhz=mhz)
            yield Check(
                f"{wang}, table IV", f"{on.name}: cycles of an idle read, row {row}", value, cycles, 0, seen=False
            )


def _switches() -> Iterator[Check]:
    guide = "PG276, lateral switch access"
    inside = min(switch.rates(HBM, [(0, 3), (1, 2), (2, 1), (3, 0)], 1.0))
    yield Check(guide, "within one switch, share of a port", 1, inside, 0)
    yield Check(guide, "two ports that share a lateral link", 0.5, min(switch.rates(HBM, [(0, 4), (1, 5)], 1.0)), 0)
    yield Check(guide, "two ports on two lateral links", 1, min(switch.rates(HBM, [(0, 4), (2, 5)], 1.0)), 0)
    writes = sum(switch.rates(HBM, [(0, 4), (1, 5)], 1.0, write_beats=16))
    yield Check(guide, "writes of 16 beats that share a lateral link: L / (L + 1)", 16 / 17, writes, 1e-9)
    alone = switch.rates(HBM, [(0, 31)], 1.0)[0]
    yield Check("Wang et al., FCCM 2020, fig. 8", "one port, seven switches away", 1, alone, 0, seen=False)


def _queues() -> Iterator[Check]:
    heads = (1, 0.75, 0.68254, 0.65524, 0.63992, 0.63015, 0.62337, 0.61839)
    for ports, value in enumerate(heads, 1):
        what = f"head-of-line blocking, {ports} ports"
        yield Check("Karol et al., 1987, table I", what, value, queueing.head_of_line(ports), 1e-4, seen=False)
    for ports, value in ((2, 0.75), (3, 0.7037), (4, 0.6836), (8, 0.6564), (16, 0.6439), (32, 0.6379)):
        yield Check(
            "textbook", f"losers dropped, {ports} ports", value, queueing.losers_dropped(ports), 1e-4, seen=False
        )
    patel = "Patel, 1981, recursion"
    for stages, value in enumerate((1, 0.75, 0.609375, 0.516541, 0.449837, 0.399249, 0.359399)):
        yield Check(patel, f"banyan of 2x2, {stages} stages", value, queueing.banyan(stages), 1e-5, seen=False)
    for stages, value in enumerate((0.4375, 0.389648, 0.351692, 0.320770), 1):
        yield Check(
            patel, f"the same offered 0.5, {stages} stages", value, queueing.banyan(stages, 0.5), 1e-5, seen=False
        )
    for stages, value in enumerate((0.683594, 0.527468, 0.432004), 1):
        yield Check(patel, f"network of 4x4, {stages} stages", value, queueing.banyan(stages, 1, 4), 1e-5, seen=False)
    for banks, draws, value in ((16, 4, 3.6404), (16, 16, 10.3028), (32, 8, 7.1776), (32, 32, 20.4142)):
        what = f"banks hit by {draws} draws of {banks}"
        yield Check("occupancy formula", what, value, queueing.banks_hit(banks, draws), 1e-4, seen=False)
    for banks, value in ((2, 1.5), (4, 2.125), (8, 2.5972), (16, 3.0782)):
        yield Check("exact count", f"busiest of {banks} banks", value, queueing.busiest_bank(banks), 1e-4, seen=False)


def _blocks() -> Iterator[Check]:
    for words, width, value in ((512, 32, 1), (512, 64, 2), (1024, 32, 2), (512, 512, 15), (16, 512, 15)):
        what = f"FIFO of {words} x {width} bits, blocks of 18 Kb"
        yield Check("memory guides UG953, UG573, counted", what, value, blocks(words, width, BLOCK_18K), 0, seen=False)
    what = "buffer of 16 x 16 beats of 512 bits, blocks of 36 Kb"
    yield Check("HLS user guide UG1399, counted", what, 8, burst_buffer_blocks(16, 16, 512), 0, seen=False)


def simulated() -> tuple[Check, ...]:
    """Every row of dram_cycle_sim.csv; dram_cycle_sim.md says where it comes from."""
    with (HERE / "dram_cycle_sim.csv").open() as file:
        return tuple(_simulated(row) for row in csv.DictReader(file))


def _simulated(row: dict[str, str]) -> Check:
    on = SIMULATED[row["memory"]]
    size, pattern = int(row["bytes"] or 0), row["pattern"]
    direction: Literal["read", "write", "mixed"] = (
        "mixed" if row["direction"] == "mixed" else "read" if row["direction"] == "read" else "write"
    )
    run = {"run": size, "stride": on.granule_bytes}.get(pattern)
    beats = 64 if run is None else max(1, run // 64)
    ask = Demand(direction, 64, min(64, run or 64), beats, 512, run, size if pattern == "stride" else None)
    setting = (on.name, direction, pattern, size) in SIMULATED_SET
    tolerance = 0.15 if direction == "mixed" else 0.10
    what = f"{direction}, {pattern} {size or ''}".strip()
    return Check(row["memory"], what, float(row["gbytes_per_s"]), _gbps(on, ask), tolerance, setting)


SIMULATED_SET = {
    ("hbm2-pseudo-channel-2.0Gbps", "read", "stride", 1024), ("hbm2-pseudo-channel-2.0Gbps", "read", "stride", 8192),
    ("hbm2-pseudo-channel-2.0Gbps", "read", "stride", 16384), ("hbm2-pseudo-channel-2.0Gbps", "read", "stride", 32768),
    ("ddr4-2400-64bit", "read", "stride", 65536), ("ddr4-2400-64bit", "read", "stride", 131072),
    ("ddr4-2400-64bit", "read", "stride", 8192), ("ddr4-2400-64bit", "read", "stride", 16384),
    ("hbm2-pseudo-channel-2.0Gbps", "mixed", "sequential", 0), ("ddr4-2400-64bit", "mixed", "sequential", 0),
    ("ddr4-2400-64bit", "read", "run", 4096), ("ddr4-2400-64bit", "read", "sequential", 0),
}  #: page and ranks that the note does not give, sharpness, turnaround, lead of a bank group  # fmt: skip
