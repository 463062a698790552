"""What the tests of the workers give them to do; imports little, for a worker imports it whenever it starts."""

from __future__ import annotations

import ctypes
import os
import time


def work(item: object) -> int:
    """What the workers are given: an item that is a number is squared, a word is misbehaviour."""
    if item == "crash":
        ctypes.string_at(0)
    if item == "hang":
        time.sleep(60)
    if item == "spin":
        while True:
            pass
    if item == "swallow":
        held = []
        while True:
            held.append(bytearray(50_000_000))
    if item == "gorge":
        return len(bytearray(250_000_000))
    if item == "pid":
        return os.getpid()
    if item == "abort":
        os.abort()
    if item == "raise":
        raise KeyError("no such loop")
    if item == "print":
        os.write(1, b"not a result")
        return 0
    assert isinstance(item, int)
    return item * item
