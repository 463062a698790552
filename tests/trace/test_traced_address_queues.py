"""Ports that are given their addresses through a queue, and arguments that nothing was seen of."""

from __future__ import annotations

from beatwise.memory import board
from beatwise.traffic import measure
from helpers.traced import traced

SOURCE = """
    #include <tapa.h>
    void fetch(int count, tapa::async_mmap<int> &from, tapa::ostream<int> &to) {
        for (int asked = 0, got = 0; got < count;) {
            if (asked < count && !from.read_addr.full()) {
                from.read_addr.try_write(asked);
                ++asked;
            }
            int value;
            if (from.read_data.try_read(value)) {
                to.write(value);
                ++got;
            }
        }
    }
    extern "C" void sweep(tapa::async_mmap<int> &from, tapa::ostream<int> &to, int count) {
        fetch(count, from, to);
    }
"""


def test_an_address_put_into_a_queue_is_an_access_that_nothing_blocks() -> None:
    found = measure(traced(SOURCE), board("hbm2-32ch"), {})
    (item,) = found.traffic
    assert (item.access.argument, item.access.direction, item.access.manual) == ("from", "read", True)
    assert (item.walk.pattern, item.blocked) == ("sequential", ())


def test_an_argument_of_which_no_access_was_found_is_told() -> None:
    trace = traced('extern "C" void sweep(int *used, int *idle) { int *copy = idle; used[0] = copy == 0; }')
    assert [problem.what for problem in trace.problems] == [
        "sweep: no access through idle was found, although it is mentioned"
    ]
