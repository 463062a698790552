"""What remains of a crossbar's rate when its inputs want the same outputs: queues, dropped losers, networks of stages.

All rates are packets per slot and port, with destinations drawn uniformly.
"""

from __future__ import annotations

from collections import defaultdict
from functools import lru_cache
from math import comb, prod

HEAD_OF_LINE_LIMIT = (
    2 - 2**0.5
)  #: of a saturated switch with many inputs (Karol, Hluchyj, Morgan, IEEE Trans. Commun. 35(12), 1987)
MOST_PORTS = 16  #: up to which the chain is solved; its states are the partitions of the number of ports


@lru_cache(maxsize=32)
def head_of_line(ports: int) -> float:
    """Saturated crossbar with a FIFO queue at each input: what each port still passes. Exact up to `MOST_PORTS`.

    Markov chain over how many heads of queues want each output (Karol, Hluchyj, Morgan, 1987, table I); its limit for
    more ports.

    >>> [round(head_of_line(ports), 4) for ports in (1, 2, 3)]
    [1.0, 0.75, 0.6825]
    """
    if ports < 1:
        raise ValueError(f"a switch of {ports} ports")
    if ports > MOST_PORTS:
        return HEAD_OF_LINE_LIMIT
    state: dict[tuple[int, ...], float] = {(ports,): 1.0}
    step: dict[tuple[int, ...], dict[tuple[int, ...], float]] = {}
    rate, before = 0.0, -1.0
    while abs(rate - before) > 1e-12:
        after: dict[tuple[int, ...], float] = defaultdict(float)
        before, rate = rate, 0.0
        for wanted, share in state.items():
            rate += share * len(wanted) / ports
            if wanted not in step:
                step[wanted] = _next_slot(wanted, ports)
            for following, chance in step[wanted].items():
                after[following] += share * chance
        state = after
    return rate


def _next_slot(wanted: tuple[int, ...], ports: int) -> dict[tuple[int, ...], float]:
    """Each wanted output serves one head; as many inputs draw a new output."""
    chances = {tuple(number - 1 for number in wanted if number > 1): 1.0}
    for _ in wanted:
        drawn: dict[tuple[int, ...], float] = defaultdict(float)
        for state, chance in chances.items():
            for place, number in enumerate(state):
                more = (*state[:place], number + 1, *state[place + 1 :])
                drawn[tuple(sorted(more))] += chance / ports
            if ports > len(state):
                drawn[tuple(sorted((*state, 1)))] += chance * (ports - len(state)) / ports
        chances = drawn
    return chances


def losers_dropped(ports: int) -> float:
    """Saturated crossbar without queues: of the packets for one output, one gets through. 1 - (1 - 1/N)^N.

    >>> round(losers_dropped(2), 4), round(losers_dropped(4), 4)
    (0.75, 0.6836)
    """
    return 1 - (1 - 1 / ports) ** ports


def banyan(stages: int, offered: float = 1.0, ports: int = 2) -> float:
    """Load on an output link of an unbuffered network of ``stages`` stages of small crossbars: q' = 1 - (1 - q/N)^N.

    Patel, IEEE Trans. Comput. C-30(10), 1981 (recursion from memory).

    >>> [round(banyan(stages), 4) for stages in (0, 1, 2)]
    [1.0, 0.75, 0.6094]
    """
    for _ in range(stages):
        offered = 1 - (1 - offered / ports) ** ports
    return offered


def banks_hit(banks: int, draws: int) -> float:
    """Distinct banks that so many random draws reach: N (1 - (1 - 1/N)^k).

    >>> round(banks_hit(16, 4), 4)
    3.6404
    """
    return banks * (1 - (1 - 1 / banks) ** draws)


def busiest_bank(banks: int) -> float:
    """Mean of the largest bank load when as many requests as banks are drawn; exact count.

    >>> busiest_bank(2)
    1.5
    """
    return sum(1 - _all_at_most(banks, most) for most in range(banks))


def _all_at_most(banks: int, most: int) -> float:
    """The chance that none of ``banks`` banks gets more than ``most`` of as many draws."""
    ways = [1.0] + [0.0] * banks
    for _ in range(banks):
        ways = [
            sum(comb(total, own) * ways[total - own] for own in range(min(most, total) + 1))
            for total in range(banks + 1)
        ]
    return ways[banks] / prod([banks] * banks)
