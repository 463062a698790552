"""The slow, obvious way: one request, one cycle, one bank at a time. To hold the closed forms against."""

from __future__ import annotations

import heapq
import random
from collections import deque
from collections.abc import Sequence


def reads(beats: int, outstanding: int, latency: int, request_gap: int, number: int = 4000) -> float:
    """Beats a cycle of a port: a request leaves when there is room, its beats come back in order over one bus."""
    under_way: deque[float] = deque()
    asked, bus = -float(request_gap), 0.0
    for _ in range(number):
        asked += request_gap
        if len(under_way) == outstanding:
            asked = max(asked, under_way.popleft())
        bus = max(bus, asked + latency) + beats
        under_way.append(bus)
    return number * beats / bus


def writes(beats: int, gap: float, outstanding: int, latency: float, seed: int, number: int = 60000) -> float:
    """Beats a cycle of a port whose bursts take beats + gap cycles on average, their answers ``latency`` later."""
    draw = random.Random(seed)
    ready = [0.0] * outstanding
    bus = 0.0
    for _ in range(number):
        start = max(bus, heapq.heappop(ready))
        bus = start + draw.expovariate(1 / (beats + gap))
        heapq.heappush(ready, bus + latency)
    return number * beats / bus


def one_channel_at_a_time(size: float, channels: int, gbps: float, turn_ns: float, seed: int) -> float:
    """GB/s of random transactions of one port that waits whenever the next channel is another."""
    draw = random.Random(seed)
    here, now, number = 0, 0.0, 20000
    for _ in range(number):
        there = draw.randrange(channels)
        now += size / gbps + (turn_ns if there != here else 0)
        here = there
    return number * size / now


def crossbar(ports: int, slots: int, *, queues: bool, seed: int) -> float:
    """Packets a slot and port of a saturated crossbar, with a queue at each input or with losers thrown away."""
    draw = random.Random(seed)
    heads = [draw.randrange(ports) for _ in range(ports)]
    passed = 0
    for _ in range(slots):
        order = list(range(ports))
        draw.shuffle(order)
        served: set[int] = set()
        for port in order:
            if heads[port] not in served:
                served.add(heads[port])
                passed += 1
                heads[port] = draw.randrange(ports)
            elif not queues:
                heads[port] = draw.randrange(ports)
    return passed / slots / ports


def filling(capacity: dict[str, float], flows: Sequence[Sequence[str]], step: float = 1e-3) -> list[float]:
    """Max-min fair rates by raising all flows by a little until a link is full."""
    rates, rising = [0.0] * len(flows), set(range(len(flows)))
    while rising:
        for number in rising:
            rates[number] += step
        for link, most in capacity.items():
            if sum(rate for rate, flow in zip(rates, flows, strict=True) if link in flow) >= most - 1e-9:
                rising -= {number for number, flow in enumerate(flows) if link in flow}
    return rates


class Memory:
    """One rank of banks, cycle by cycle: the oldest open row first, then the oldest that needs its row. Cycles."""

    def __init__(
        self, groups: int, banks: int, *, burst: int, same_group: int, gap: int, window: int, cycle: int
    ) -> None:
        self.groups, self.banks = groups, banks
        self.burst, self.same_group, self.gap, self.window, self.cycle = burst, same_group, gap, window, cycle

    def serve(self, places: Sequence[tuple[int, int, int]], queue: int) -> float:
        """Granules a cycle; each place is (group, bank, row), ``queue`` of them are seen at a time."""
        waiting: list[tuple[int, int, int]] = []
        todo = iter(places)
        rows: dict[tuple[int, int], int] = {}
        row_ready: dict[tuple[int, int], int] = {}
        activated: dict[tuple[int, int], int] = {}
        group_ready = [0] * self.groups
        activates: deque[int] = deque([-(10**6)] * 4, maxlen=4)
        bus = now = served = 0
        open_cycles = self.cycle // 3
        while served < len(places):
            while len(waiting) < queue and (place := next(todo, None)) is not None:
                waiting.append(place)
            for place in waiting:
                group, bank, row = place
                if rows.get((group, bank)) == row and row_ready[group, bank] <= now >= max(bus, group_ready[group]):
                    waiting.remove(place)
                    bus, group_ready[group] = now + self.burst, now + self.same_group
                    served += 1
                    break
            wanted = {(group, bank, rows.get((group, bank))) for group, bank, _ in waiting}
            hits = {(group, bank) for group, bank, row in waiting if (group, bank, row) in wanted}
            if now >= activates[-1] + self.gap and now >= activates[0] + self.window:
                for group, bank, row in waiting:
                    if (group, bank) not in hits and now >= activated.get((group, bank), -(10**6)) + self.cycle:
                        rows[group, bank], activated[group, bank] = row, now
                        row_ready[group, bank] = now + open_cycles
                        activates.append(now)
                        break
            now += 1
        return served / max(now, bus)
