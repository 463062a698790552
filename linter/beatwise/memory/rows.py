"""What the banks of a channel allow: activation windows, bank cycles and bank groups, by the places that are touched.

The granules of a pattern are followed through the board's address map. A controller sees so many of them at a time and
serves them in the order that suits it; the time of such a window is that of its busiest part: the bus, a bank group
(tCCD_L), a rank's activations (tRRD, tFAW) or a bank (tRC). Banks and rows carry over from window to window.
Names of the timings: JESD79-4 and JESD235.
"""

from __future__ import annotations

import random
from collections import Counter, defaultdict
from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from functools import lru_cache
from itertools import count, islice
from math import ceil, log2

from beatwise.model.board import Board

MOST_GRANULES = 16384  #: followed; fewer do not change the figures by a percent
LEAST_RUNS = 96  #: followed, however long they are
MOST_BITS = 64  #: of an address
SEED = 1  #: of random places: the same question gets the same answer
SHARPNESS = 5  #: set by two simulated DDR4-2400 strides, 8192 and 16384 bytes (dram_cycle_sim.csv)
GROUP_LEAD = (
    0.06  #: of a window, by which a bank group runs ahead; set by simulated DDR4-2400 reads, 4 KiB and sequential
)
GOLDEN = 0.618034  #: windows are unevenly long, so that they fall into no step with pages
LEAST_UNEVEN = 16  #: granules; shorter windows cannot be varied
FIELDS = ("rank", "group", "bank", "row", "column")


@dataclass(frozen=True, slots=True)
class Banks:
    """What the walk needs to know of a channel. Times in ns."""

    granule_bytes: int
    capacity_granules: int
    fields: tuple[tuple[str, int], ...]  #: name and bits, from the lowest bit above the granule up; the row is last
    burst_ns: float  #: of one granule on the data bus
    same_group_ns: float
    activate_gap_ns: float
    activate_gap_same_group_ns: float
    four_activates_ns: float
    row_cycle_ns: float
    window_granules: int  #: seen at a time, when all wait for one direction
    batch_granules: int
    turnaround_ns: float


def banks(board: Board, run_granules: int | None = None) -> Banks:
    """The channel of a board, with its address map parsed, as runs of so many granules meet it (None: without end).

    The controller sees a request of the past and of the future for each that it can hold: twice `reorder_requests`.
    """
    request = max(1, board.request_bytes // board.granule_bytes)
    request = request if run_granules is None else min(request, run_granules)
    return Banks(
        board.granule_bytes,
        max(1, board.channel_bytes // board.granule_bytes),
        address_fields(board),
        board.granule_bytes / board.peak_gbps,
        board.same_group_ns,
        board.activate_gap_ns,
        board.activate_gap_same_group_ns,
        board.four_activates_ns,
        board.row_cycle_ns,
        2 * board.reorder_requests * request,
        board.batch_granules,
        board.turnaround_ns,
    )


def address_fields(board: Board) -> tuple[tuple[str, int], ...]:
    """The address map, lowest field first; ValueError says what is wrong with it. ``row`` alone takes what is left.

    >>> from beatwise.memory.boards import board
    >>> address_fields(board("hbm2-32ch"))
    (('group', 1), ('column', 5), ('bank', 2), ('group', 1), ('row', 14))
    """
    bits = {
        "rank": log2(board.ranks),
        "group": log2(board.bank_groups),
        "bank": log2(board.banks_per_group),
        "column": log2(max(1.0, board.page_bytes / board.granule_bytes)),
    }
    for name, exact in bits.items():
        if exact != int(exact):
            raise ValueError(f"expected powers of two: ranks, banks, groups and page over granule; {name} is none")
    text = board.address_map or "row " + " ".join(f"{name}:{int(number)}" for name, number in bits.items())
    found: Counter[str] = Counter()
    fields = []
    for word in reversed(text.split()):
        name, colon, digits = word.partition(":")
        if name not in FIELDS or not (_bits(digits) if colon else name == "row"):
            raise ValueError(f"expected words like row:14 group:1 bank:2 column:5, from {FIELDS}; got {word!r}")
        fields.append((name, int(digits) if colon else MOST_BITS))
        found[name] += fields[-1][1]
    for name, wanted in bits.items():
        if found[name] != wanted:
            raise ValueError(f"expected {int(wanted)} {name} bits in all (sizes of the profile), got {found[name]}")
    if not found["row"]:
        raise ValueError("expected row bits")
    return tuple(fields)


def _bits(digits: str) -> bool:
    return digits.isascii() and digits.isdecimal() and len(digits) <= 2 and int(digits) <= MOST_BITS


def walk(board: Board, run_bytes: float | None, stride_bytes: int | None = None, *, mixed: bool = False) -> float:
    """GB/s that the channel moves, in whole granules, its refresh time taken off.

    ``run_bytes`` and ``stride_bytes`` as in `Demand`. ``mixed``: reads and writes in turns, so many granules of each
    before the bus turns around.
    """
    run = None if run_bytes is None else max(1, ceil(run_bytes / board.granule_bytes))
    share = 1 - board.refresh_ns / board.refresh_interval_ns
    return share * _rate(banks(board, run), run, stride_bytes, mixed)


@lru_cache(maxsize=512)
def _rate(channel: Banks, run: int | None, stride_bytes: int | None, mixed: bool) -> float:
    number = min(MOST_GRANULES, max(4096, LEAST_RUNS * (run or 1)))
    places = islice(_places(channel, run, stride_bytes), number)
    return number * channel.granule_bytes / walk_ns(channel, places, mixed=mixed)


def _places(channel: Banks, run: int | None, stride_bytes: int | None) -> Iterator[int]:
    """Numbers of the granules that a pattern touches."""
    if run is None:
        yield from count()
        return
    if stride_bytes is not None:
        for number in count():
            start = number * abs(stride_bytes) // channel.granule_bytes
            yield from range(start, start + run)
    draw = random.Random(SEED)
    aligned = run if run & (run - 1) == 0 else 1
    while True:
        start = draw.randrange(max(1, channel.capacity_granules // aligned)) * aligned
        yield from range(start, start + run)


def walk_ns(channel: Banks, places: Iterable[int], *, mixed: bool = False) -> float:
    """The time in which a channel serves these granules, without refresh.

    >>> from beatwise.memory.boards import board
    >>> one_bank = (number * 512 for number in range(100))     # a step of 16 KiB
    >>> round(walk_ns(banks(board("hbm2-32ch")), one_bank) / 100, 1)
    48.0
    """
    window = channel.batch_granules if mixed else channel.window_granules
    turn = channel.turnaround_ns if mixed else 0.0
    gap = max(channel.activate_gap_ns, channel.four_activates_ns / 4)
    now, ahead, early = 0.0, 0.0, 0.0
    open_rows, free_at, group_free = dict[int, int](), dict[int, float](), dict[int, float]()
    todo = iter(places)
    for number in count():
        part = 1 if window < LEAST_UNEVEN else 0.75 + 0.5 * (number * GOLDEN % 1)
        if not (taken := list(islice(todo, round(window * part)))):
            break
        groups: Counter[int] = Counter()
        rows: dict[int, set[int]] = defaultdict(set)
        last: dict[int, int] = {}
        for place in taken:
            bank, row = _bank_and_row(channel.fields, place)
            groups[bank >> 16] += 1
            rows[bank].add(row)
            last[bank] = row
        bus = len(taken) * channel.burst_ns
        for group, columns in groups.items():
            group_free[group] = max(early, group_free.get(group, 0.0)) + columns * channel.same_group_ns
            bus = max(bus, group_free[group] - now)
        by_rank: Counter[int] = Counter()
        by_group: Counter[int] = Counter()
        end = now
        for bank, touched in rows.items():
            activates = len(touched) - (open_rows.get(bank) in touched)
            open_rows[bank] = last[bank]
            if activates:
                by_rank[bank >> 32] += activates
                by_group[bank >> 16] += activates
                done = max(ahead, free_at.get(bank, 0.0)) + (activates - 1) * channel.row_cycle_ns
                free_at[bank] = done + channel.row_cycle_ns
                end = max(end, done)
        in_turns = [by_rank.total() * channel.row_cycle_ns / max(1, len(free_at))]
        if len(ranks := {bank >> 32 for bank in free_at}) > 1:
            in_turns.append(by_rank.total() * gap / len(ranks))
        end = max(end, now + turn + _together(bus, *in_turns))
        for activates in by_rank.values():
            end = max(end, now + activates * gap)
        for activates in by_group.values():
            end = max(end, now + activates * channel.activate_gap_same_group_ns)
        now, ahead, early = end, (now + end) / 2, end if mixed else end - GROUP_LEAD * (end - now)
    return now


def _together(*times: float) -> float:
    """The time of parts that work side by side and take turns: more than the longest, when others are nearly as long.

    No scheduler keeps all banks and ranks equally busy. `SHARPNESS` says how near comes to the longest.
    """
    longest = max(times)
    return longest * float(sum((time / longest) ** SHARPNESS for time in times) ** (1 / SHARPNESS))


def _bank_and_row(fields: tuple[tuple[str, int], ...], place: int) -> tuple[int, int]:
    """The bank (rank, group and bank, 16 bits each) and the row of a granule."""
    rank = group = bank = row = 0
    shifts = dict.fromkeys(FIELDS, 0)
    for name, bits in fields:
        value = place & ((1 << bits) - 1)
        place >>= bits
        match name:
            case "rank":
                rank |= value << shifts[name]
            case "group":
                group |= value << shifts[name]
            case "bank":
                bank |= value << shifts[name]
            case "row":
                row |= value << shifts[name]
        shifts[name] += bits
    return rank << 32 | group << 16 | bank, row
