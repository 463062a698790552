"""A lowered program as text, for tests and for looking at."""

from __future__ import annotations

from collections.abc import Iterator
from typing import assert_never

from beatwise.model.kernel import (
    Assign,
    Binary,
    Bits,
    Block,
    Build,
    Call,
    Cast,
    Declare,
    Directive,
    Evaluate,
    Expression,
    Function,
    FunctionName,
    If,
    Index,
    Items,
    Leave,
    Literal,
    Loop,
    Lost,
    Member,
    Name,
    Opaque,
    Program,
    Return,
    Select,
    Statement,
    Step,
    Switch,
    This,
    Unary,
    Variable,
)
from beatwise.model.types import (
    ArrayType,
    BurstPointerType,
    CallableType,
    IntType,
    PointerType,
    RealType,
    RecordType,
    ReferenceType,
    StreamType,
    Type,
    UnknownType,
    VectorType,
    VoidType,
)


def show(program: Program) -> str:
    """Globals, functions in the order they were reached, inventions and problems; one line per statement."""
    lines = [f"global {show_variable(one)}" for one in program.globals.values()]
    for function in program.functions.values():
        lines += show_function(function, top=function.key in program.tops)
    lines += [f"invented {one.what} {one.name} at {one.place}" for one in program.inventions]
    lines += [f"problem {one.file}:{one.line}: {one.what}" for one in program.problems]
    return "\n".join(lines)


def show_function(function: Function, *, top: bool = False) -> list[str]:
    parameters = ", ".join(show_variable(one) for one in function.parameters)
    marks = [word for word, on in (("top", top), ("extern-c", function.extern_c)) if on]
    head = " ".join([*marks, f"{function.name}({parameters}) -> {show_type(function.result)}"])
    if function.initializers:
        head += " : " + ", ".join(f"{name}={show_expression(value)}" for name, value in function.initializers)
    lines = [head + _directives(function.directives)]
    if function.body:
        for one in function.body.body:
            lines += [f"  {line}" for line in show_statement(one)]
    return lines


def show_variable(one: Variable) -> str:
    scope = f"{one.scope} " if one.scope == "static" else ""
    constant = "const " if one.constant else ""
    value = f" = {show_expression(one.initial)}" if one.initial is not None else ""
    return f"{scope}{constant}{one.name}: {show_type(one.type)}{value}{_directives(one.directives)}"


def _directives(directives: tuple[Directive, ...]) -> str:
    return "".join(
        f" @{one.kind}({' '.join(f'{key}={value}' if value else key for key, value in one.options.items())})"
        for one in directives
    )


def show_statement(one: Statement) -> Iterator[str]:
    match one:
        case Block(body=body, directives=directives):
            yield "block" + _directives(directives)
            yield from _indented(body)
        case Declare(variable=variable):
            yield f"let {show_variable(variable)}"
        case Evaluate(expression=value):
            yield show_expression(value)
        case If(initial=initial, condition=condition, yes=yes, no=no):
            yield from (line for before in initial for line in show_statement(before))
            yield f"if {show_expression(condition)}"
            yield from _indented(_inner(yes))
            if no is not None:
                yield "else"
                yield from _indented(_inner(no))
        case Loop():
            yield from (line for before in one.initial for line in show_statement(before))
            word = "loop" if one.test_first else "loop-then-test"
            condition_text = show_expression(one.condition) if one.condition is not None else "always"
            step = f" step {show_expression(one.step)}" if one.step is not None else ""
            label = f"{one.label}: " if one.label else ""
            yield f"{label}{word} {condition_text}{step}{_directives(one.directives)}"
            yield from _indented(_inner(one.body))
        case Switch(subject=subject, cases=cases):
            yield f"switch {show_expression(subject)}"
            for case in cases:
                values = ", ".join("default" if value is None else show_expression(value) for value in case.values)
                yield f"  case {values}"
                for inner in case.body:
                    yield from (f"    {line}" for line in show_statement(inner))
        case Leave(how=how):
            yield how
        case Return(value=value):
            yield "return" + (f" {show_expression(value)}" if value is not None else "")
        case Lost(reason=reason, place=place):
            yield f"lost at {place}: {reason}"
        case never:
            assert_never(never)


def _inner(one: Statement) -> tuple[Statement, ...]:
    return one.body if isinstance(one, Block) else (one,)


def _indented(body: tuple[Statement, ...]) -> Iterator[str]:
    for one in body:
        yield from (f"  {line}" for line in show_statement(one))


def show_expression(one: Expression) -> str:
    match one:
        case Literal(value=value):
            return "?" if value is None else repr(value)
        case Name(name=name):
            return name
        case FunctionName(key=key, captures=captures):
            caught = ", ".join(("&" if reference else "") + name.partition("#")[0] for name, reference in captures)
            return f"function {_function(key)}" + (f"[{caught}]" if captures else "")
        case This():
            return "this"
        case Unary(op=op, operand=operand):
            return f"{op}({shown})" if (shown := _wrapped(operand)).startswith("-") else f"{op}{shown}"
        case Step(by=by, prefix=prefix, operand=operand):
            sign = "++" if by > 0 else "--"
            return f"{sign}{_wrapped(operand)}" if prefix else f"{_wrapped(operand)}{sign}"
        case Binary(op=op, left=left, right=right):
            return f"{_wrapped(left)} {op} {_wrapped(right)}"
        case Assign(op=op, target=target, value=value):
            return f"{_wrapped(target)} {op}= {_wrapped(value)}"
        case Select(condition=condition, yes=yes, no=no):
            return f"{_wrapped(condition)} ? {_wrapped(yes)} : {_wrapped(no)}"
        case Index(base=base, index=index):
            return f"{_wrapped(base)}[{show_expression(index)}]"
        case Bits(base=base, high=high, low=low):
            ends = [show_expression(end) if end is not None else "?" for end in (high, low)]
            return f"{_wrapped(base)}{{{':'.join(dict.fromkeys(ends))}}}"
        case Member(base=base, field=field):
            return f"{_wrapped(base)}.{field}"
        case Cast(operand=operand, type=of):
            return f"<{show_type(of)}>{_wrapped(operand)}"
        case Call():
            called = f"{_wrapped(one.target)}!" if one.target is not None else one.name
            known = "" if one.function or one.target is not None else "?"
            receiver = f"{_wrapped(one.receiver)}." if one.receiver is not None else ""
            return f"{receiver}{called}{known}({', '.join(show_expression(each) for each in one.arguments)})"
        case Build(function=function, arguments=arguments, type=of):
            known = "" if function else "?"
            return f"new {show_type(of)}{known}({', '.join(show_expression(each) for each in arguments)})"
        case Items(items=items):
            return "{" + ", ".join(show_expression(each) for each in items) + "}"
        case Opaque(reason=reason, parts=parts):
            return f"opaque<{reason}>({', '.join(show_expression(each) for each in parts)})"
        case never:
            assert_never(never)


def _function(key: str) -> str:
    """The name in a USR."""
    return key.split("@F@")[-1].split("#")[0].split("<")[0] if "@F@" in key else key


def _wrapped(one: Expression) -> str:
    shown = show_expression(one)
    return f"({shown})" if isinstance(one, Binary | Assign | Select) else shown


def show_type(of: Type) -> str:
    match of:
        case VoidType():
            return "void"
        case IntType(bits=bits, signed=signed):
            return f"{'i' if signed else 'u'}{bits}"
        case RealType(bits=bits):
            return f"r{bits}"
        case PointerType(to=to, volatile=volatile):
            return f"*{'volatile ' if volatile else ''}{show_type(to)}"
        case ReferenceType(to=to):
            return f"&{show_type(to)}"
        case ArrayType():
            bounds = ""
            element: Type = of
            while isinstance(element, ArrayType):
                bounds += f"[{'?' if element.count is None else element.count}]"
                element = element.element
            return show_type(element) + bounds
        case RecordType(name=name):
            return name or "record"
        case VectorType(element=element, lanes=lanes):
            return f"vector<{show_type(element)}, {lanes}>"
        case StreamType(element=element, depth=depth):
            return f"stream<{show_type(element)}{f', {depth}' if depth else ''}>"
        case BurstPointerType(to=to):
            return f"burst<{show_type(to)}>"
        case CallableType():
            return "callable"
        case UnknownType(name=name):
            return f"unknown<{name}>"
        case never:
            assert_never(never)
