"""What changes from one iteration of a loop to the next: addresses, conditions, choices."""

from __future__ import annotations

from collections.abc import Sequence

from beatwise.model.access import Access, LoopInstance
from beatwise.model.form import Form, Symbol, redrawn_in


def varies(form: Form, loop: LoopInstance) -> bool:
    """Whether the form may differ between two iterations of one run of ``loop``."""
    return any(
        symbol == loop.counter
        or loop.number in symbol.loops
        or (symbol.kind == "carried" and symbol.loop == loop.number)
        for symbol in form.leaves()
    )


def moving_loop(access: Access) -> LoopInstance | None:
    """The innermost loop that moves the access; where none does, the innermost; None outside loops."""
    for loop in reversed(access.loops):
        if varies(access.offset, loop) and (loop.trips is None or loop.trips.known != 1):
            return loop
    return access.loops[-1] if access.loops else None


def drawn_in(form: Form, loop: LoopInstance, loops: Sequence[LoopInstance]) -> bool:
    """Whether data read anew in each iteration of ``loop`` decides the form, or what ``loops`` carry along does."""
    inside = loops[[other.number for other in loops].index(loop.number) :]
    carried = {step.symbol: step.next for other in inside for step in other.recurrences}
    seen: set[Symbol] = set()
    todo = [form]
    while todo:
        for symbol in todo.pop().leaves():
            if symbol.kind == "data" and loop.number in symbol.loops:
                return True
            if any(other.kind == "data" for other in symbol.depends) and loop.number in redrawn_in(symbol):
                return True
            if symbol in carried and symbol not in seen:
                seen.add(symbol)
                todo.append(carried[symbol])
    return False
