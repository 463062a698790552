"""The growing record of what a kernel does: its accesses, stream operations and loops, as they are met."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field, replace

from beatwise.model.access import Access, Choice, Guard, LoopInstance, Outcome, Recurrence, Stream, StreamOperation
from beatwise.model.form import Form, Symbol, symbol_form
from beatwise.model.substitution import substitute


@dataclass
class Recording:
    """Loops are kept apart by number, and joined to the accesses at the end; an access holds numbers until then."""

    accesses: list[tuple[Access, tuple[int, ...]]] = field(default_factory=list)
    operations: list[tuple[StreamOperation, tuple[int, ...]]] = field(default_factory=list)
    loops: dict[int, LoopInstance] = field(default_factory=dict)
    streams: dict[str, Stream] = field(default_factory=dict)

    def mark(self) -> tuple[int, int]:
        """How far the record has come."""
        return len(self.accesses), len(self.operations)

    def cut(self, mark: tuple[int, int]) -> None:
        """Takes back what came after the mark."""
        del self.accesses[mark[0] :]
        del self.operations[mark[1] :]

    def substitute(self, mark: tuple[int, int], values: Mapping[Symbol, Form], memo: dict[Symbol, Form]) -> None:
        """Replaces symbols in all that came after the mark, and in the loops it stands in."""
        touched: set[int] = set()
        for at in range(mark[0], len(self.accesses)):
            access, loops = self.accesses[at]
            touched.update(loops)
            self.accesses[at] = (
                replace(
                    access,
                    offset=substitute(access.offset, values, memo),
                    guards=_guards(access.guards, values, memo),
                    choice=_choice(access.choice, values, memo),
                ),
                loops,
            )
        for at in range(mark[1], len(self.operations)):
            operation, loops = self.operations[at]
            touched.update(loops)
            element = operation.element
            self.operations[at] = (
                replace(
                    operation,
                    element=None if element is None else substitute(element, values, memo),
                    guards=_guards(operation.guards, values, memo),
                    choice=_choice(operation.choice, values, memo),
                ),
                loops,
            )
        for loop_number in touched & self.loops.keys():
            loop = self.loops[loop_number]
            self.loops[loop_number] = replace(
                loop,
                trips=None if loop.trips is None else substitute(loop.trips, values, memo),
                recurrences=tuple(
                    Recurrence(r.symbol, substitute(r.first, values, memo), substitute(r.next, values, memo))
                    for r in loop.recurrences
                ),
                outcomes=tuple(Outcome(o.symbol, substitute(o.form, values, memo)) for o in loop.outcomes),
                until=tuple(substitute(condition, values, memo) for condition in loop.until),
                exits=tuple(substitute(condition, values, memo) for condition in loop.exits),
            )

    def forget_places_of_written(self) -> None:
        """What was loaded from an argument that is also stored to may be another value each time."""
        written = {access.argument for access, _ in self.accesses if access.direction == "write"}
        forms = [form for access, _ in self.accesses for form in (access.offset, *(g.condition for g in access.guards))]
        stale = {s for form in forms for s in form.leaves() if s.at is not None and s.name in written}
        if stale:
            self.substitute((0, 0), {s: symbol_form(replace(s, at=None)) for s in stale}, {})

    def finished(self) -> tuple[tuple[Access, ...], tuple[StreamOperation, ...]]:
        """The record with the loops in place."""
        return (
            tuple(replace(a, loops=tuple(self.loops[n] for n in loops)) for a, loops in self.accesses),
            tuple(replace(o, loops=tuple(self.loops[n] for n in loops)) for o, loops in self.operations),
        )


def _guards(guards: tuple[Guard, ...], values: Mapping[Symbol, Form], memo: dict[Symbol, Form]) -> tuple[Guard, ...]:
    return tuple(replace(guard, condition=substitute(guard.condition, values, memo)) for guard in guards)


def _choice(choice: Choice | None, values: Mapping[Symbol, Form], memo: dict[Symbol, Form]) -> Choice | None:
    return choice and replace(choice, selector=substitute(choice.selector, values, memo))
