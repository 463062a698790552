"""Text in, accesses out: one line for each, as the tracer found it or as the walk measures it."""

from __future__ import annotations

from textwrap import dedent
from typing import TYPE_CHECKING

from beatwise.trace import trace_program
from beatwise.traffic.runs import walk
from helpers.lowered import program

if TYPE_CHECKING:
    from beatwise.model.access import Access, Guard, LoopInstance, StreamOperation, Trace
    from beatwise.model.form import Form, Symbol
    from beatwise.model.traffic import Walk

PARAMETERS = "int n, int m, const int *in, const int *table, const int *mask, int *out, int *a, int *b"
INFIX = {
    "lt": "<", "eq": "==", "ne": "!=", "and?": "and", "or?": "or", "floordiv": "//", "div": "/",
    "and": "&", "or": "|", "xor": "^", "shl": "<<", "shr": ">>",
}  # fmt: skip


def kernel(statements: str, *, before: str = "", parameters: str = PARAMETERS) -> str:
    """The statements as the body of a top function."""
    return f'{dedent(before)}\nextern "C" void echo({parameters}) {{\n{dedent(statements)}\n}}\n'


def traced(text: str, **given: int) -> Trace:
    """The first kernel of a file."""
    return trace_program(program(text), given)[0]


def accesses(statements: str, *, before: str = "", parameters: str = PARAMETERS, **given: int) -> str:
    """One line for each access: direction, argument, offset in bytes, size; the loops around it; the guards.

    Below, one line for each loop that carries something along, or ends otherwise than by its count.
    """
    found = traced(kernel(statements, before=before, parameters=parameters), **given)
    loops = dict.fromkeys(loop for access in found.accesses for loop in access.loops)
    return "\n".join([*map(show_access, found.accesses), *filter(None, map(show_loop_course, loops))])


def operations(statements: str, *, before: str = "", parameters: str = PARAMETERS) -> str:
    """One line for each stream operation: what, which stream; the loops around it; the guards."""
    found = traced(kernel(statements, before=before, parameters=parameters))
    return "\n".join(map(show_operation, found.operations))


def problems(statements: str, *, before: str = "", parameters: str = PARAMETERS) -> str:
    """What the tracer told, one line each."""
    return "\n".join(p.what for p in traced(kernel(statements, before=before, parameters=parameters)).problems)


def walks(statements: str, *, before: str = "", parameters: str = PARAMETERS, **given: int) -> str:
    """One line for each access: direction, argument, pattern, step in bytes, run in elements, basis, executions."""
    found = traced(kernel(statements, before=before, parameters=parameters), **given)
    return "\n".join(
        f"{access.direction} {access.argument} {show_walk(walk(access, given))}" for access in found.accesses
    )


def show_access(access: Access) -> str:
    size = "" if access.part_bytes == access.element_bytes else f"{access.part_bytes} of "
    words = [access.direction, f"{access.argument}[{show(access.offset)}]", f"{size}{access.element_bytes} B"]
    words += [show_loop(loop) for loop in access.loops]
    words += [show_guard(guard) for guard in access.guards]
    words += ["volatile"] if access.volatile else []
    words += ["by request"] if access.manual else []
    if access.choice is not None:
        words.append(f"{'|'.join(access.choice.alternatives)} by {show(access.choice.selector)}")
    words += [f"unresolved: {access.unresolved}"] if access.unresolved else []
    words += [f"taken: {access.taken}"] if access.taken else []
    return "  ".join(words)


def show_operation(operation: StreamOperation) -> str:
    element = f"[{show(operation.element)}]" if operation.element is not None else ""
    words = [operation.operation, f"{operation.stream}{element}", "" if operation.blocking else "without waiting"]
    words += [show_loop(loop) for loop in operation.loops]
    words += [show_guard(guard) for guard in operation.guards]
    if operation.choice is not None:
        words.append(f"picked by {show(operation.choice.selector)}")
    words += [f"in {operation.process}"] if operation.process else []
    return "  ".join(word for word in words if word)


def show_loop(loop: LoopInstance) -> str:
    return f"{_counter(loop.counter)} x{'?' if loop.trips is None else _factor(loop.trips)}"


def show_loop_course(loop: LoopInstance) -> str:
    """What the loop carries along, and what ends it early; empty where there is nothing of the kind."""
    words = [f"{show_symbol(r.symbol)} = {show(r.first)} then {show(r.next)}" for r in loop.recurrences]
    words += [f"until {show(form)}" for form in loop.until]
    words += [f"leaves when {show(form)}" for form in loop.exits]
    words += [f"data of {loop.data_exit_because} ends it"] if loop.data_exit is not None else []
    return f"{_counter(loop.counter)}: {'; '.join(words)}" if words else ""


def show_guard(guard: Guard) -> str:
    word = "unless left" if guard.leaves else "picks" if guard.chooses else "if"
    return f"{word} {show(guard.condition)}"


def show_walk(found: Walk) -> str:
    if found.pattern == "unresolved":
        return f"unresolved: {found.reason}"
    run = "?" if found.run_elements is None else f"{found.run_elements:g}"
    step = "" if found.stride_bytes is None else f" {found.stride_bytes:+}"
    many = "?" if found.executions is None else f"{found.executions:g}"
    return f"{found.pattern}{step} run {run} {found.basis} x{many}"


def show(form: Form) -> str:
    """A form in the words of the source: a loop by its label or line, data by what it was read from."""
    if form.known is not None:
        return str(form.known)
    terms = []
    for monomial, factor in sorted(form.terms.items(), key=lambda item: [symbol.number for symbol in item[0]]):
        body = "*".join(show_symbol(symbol) for symbol in monomial)
        terms.append(str(factor) if not body else body if factor == 1 else f"{factor}*{body}")
    return " + ".join(terms).replace("+ -", "- ").replace("- 1*", "- ")


def show_symbol(symbol: Symbol) -> str:
    match symbol.kind:
        case "counter":
            return _counter(symbol)
        case "data":
            return f"{symbol.name}[{show(symbol.at)}]" if symbol.at is not None else f"{symbol.name}[]"
        case "unknown":
            inside = sorted({show_symbol(other) for other in symbol.depends if other.kind != "unknown"})
            return f"?({', '.join(inside)})"
        case "carried":
            return f"{symbol.name}'"
        case "operation":
            return _operation(symbol)
        case _:
            return symbol.name


def _counter(symbol: Symbol) -> str:
    return symbol.name.replace("loop at line ", "@")


def _factor(form: Form) -> str:
    return show(form) if len(form.terms) < 2 else f"({show(form)})"


def _operation(symbol: Symbol) -> str:
    operands = [show(operand) for operand in symbol.operands]
    if symbol.name in INFIX:
        return f"({_factor(symbol.operands[0])} {INFIX[symbol.name]} {_factor(symbol.operands[1])})"
    match symbol.name:
        case "wrap":
            return f"{'int' if operands[2] == '1' else 'uint'}{operands[1]}({operands[0]})"
        case "not":
            return f"not({operands[0]})"
        case "lookup":
            return f"table{list(symbol.table)}[{operands[0]}]"
        case name:
            return f"{name}({', '.join(operands)})"
