"""The lowered kernel: a small typed tree of what the C++ says, with templates, macros and overloads already resolved.

Every expression has a ``type`` and a ``place``. Declarations are known by ``key``: two names with one key are the same
variable or function. A key is unique within a program; each instantiation of a template has its own.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Literal as Word

from beatwise.model.place import Place
from beatwise.model.types import Type

# ---------------------------------------------------------------------------------------------------- directives


@dataclass(frozen=True, slots=True)
class Directive:
    """One HLS directive, from a pragma or an external script.

    ``kind`` is lower case (``interface``, ``pipeline``, ``unroll``, ``dataflow``, ``array_partition``, ``stream`` ...).
    ``options`` has lower-case keys; a flag such as ``off`` or ``m_axi`` has the value ``""``. An option whose text is a
    macro, constant or template parameter is already replaced by its value where that is known. For ``interface``,
    ``options["mode"]`` is always set where a mode is given, however it was spelled.
    """

    kind: str
    options: Mapping[str, str]
    place: Place

    def number(self, option: str) -> int | None:
        """The option as an integer, or None when it is absent or its value is not known."""
        text = self.options.get(option)
        if text is None:
            return None
        try:
            return int(text, 0)
        except ValueError:
            return None


def is_independence(directive: Directive) -> bool:
    """Whether it says that a dependence between iterations is only apparent."""
    said = "false" in directive.options or directive.options.get("dependent", "").lower() == "false"
    return directive.kind == "dependence" and said and directive.options.get("type", "inter").lower() != "intra"


# --------------------------------------------------------------------------------------------------- expressions


@dataclass(frozen=True, slots=True)
class Literal:
    """A constant. ``value`` is an int where one is known, a float or str where it is that, else None.

    Also what the compiler folds: enumerators, constexpr names, sizeof, substituted template parameters. ``name`` is the
    constant's, where it has one.
    """

    value: int | float | str | None
    type: Type
    place: Place
    name: str | None = None


@dataclass(frozen=True, slots=True)
class Name:
    """A use of a variable or parameter."""

    key: str
    name: str
    type: Type
    place: Place


@dataclass(frozen=True, slots=True)
class FunctionName:
    """A function used as a value, or a lambda: ``captures`` are then the captured variables (key, by_reference)."""

    key: str
    type: Type
    place: Place
    captures: tuple[tuple[str, bool], ...] = ()


@dataclass(frozen=True, slots=True)
class This:
    """The object a method works on (``this``, or the implied one of a bare member name): a pointer to it."""

    type: Type
    place: Place


@dataclass(frozen=True, slots=True)
class Unary:
    """``op`` is one of ``- + ~ ! * &``; ``*`` yields a place, ``&`` takes a place."""

    op: str
    operand: Expression
    type: Type
    place: Place


@dataclass(frozen=True, slots=True)
class Step:
    """``++`` or ``--`` (``by`` is +1 or -1); ``prefix`` tells whether the value is the new one."""

    by: int
    prefix: bool
    operand: Expression
    type: Type
    place: Place


@dataclass(frozen=True, slots=True)
class Binary:
    """``op`` is one of ``+ - * / % & | ^ << >> < <= > >= == != && || ,``; also on arbitrary-precision integers and
    pointers. On reals too: then only what it depends on is kept."""

    op: str
    left: Expression
    right: Expression
    type: Type
    place: Place


@dataclass(frozen=True, slots=True)
class Assign:
    """``op`` is empty for ``=``, else the operator before the ``=`` (``+`` for ``+=``)."""

    op: str
    target: Expression
    value: Expression
    type: Type
    place: Place


@dataclass(frozen=True, slots=True)
class Select:
    """``condition ? yes : no``."""

    condition: Expression
    yes: Expression
    no: Expression
    type: Type
    place: Place


@dataclass(frozen=True, slots=True)
class Index:
    """``base[index]``, on a pointer, an array, a vector, an array of streams (std::array and the like included).

    ``place`` is the whole subscript expression; inside a macro, the expansion.
    A subscript on an arbitrary-precision integer is ``Bits``, not this.
    """

    base: Expression
    index: Expression
    type: Type
    place: Place


@dataclass(frozen=True, slots=True)
class Bits:
    """A bit or a bit range of an integer (``x[3]``, ``x.range(7, 0)``, ``x(7, 0)``): a place inside ``base``.
    ``low`` and ``high`` are None where the front end could not tell which they are."""

    base: Expression
    high: Expression | None
    low: Expression | None
    type: Type
    place: Place


@dataclass(frozen=True, slots=True)
class Member:
    """``base.field`` (for ``->`` the base is ``Unary('*', pointer)``)."""

    base: Expression
    field: str
    type: Type
    place: Place


@dataclass(frozen=True, slots=True)
class Cast:
    """A conversion to ``type``, written or implied where it changes width, sign or pointee (else it is left out)."""

    operand: Expression
    type: Type
    place: Place


@dataclass(frozen=True, slots=True)
class Call:
    """A call. ``function`` is the key of a ``Function`` of the program, or None (unknown or known by name only).

    ``name`` is the unqualified name. For a method ``receiver`` is the object (a place, not a pointer). Methods and
    operators of streams, burst pointers, vectors and integers have no ``function``: the tracer knows them by
    the receiver's type and ``name`` (``a >> b`` and ``a << b`` on a stream are ``read`` and ``write``).
    ``target`` is the callee when it is a value (a function pointer, a lambda held in a variable, a function object).
    """

    function: str | None
    name: str
    receiver: Expression | None
    arguments: tuple[Expression, ...]
    type: Type
    place: Place
    target: Expression | None = None
    template_arguments: tuple[int | str | Type | None, ...] = ()


@dataclass(frozen=True, slots=True)
class Build:
    """A constructed value of ``type``: ``function`` is the constructor's key where it has a body."""

    function: str | None
    arguments: tuple[Expression, ...]
    type: Type
    place: Place


@dataclass(frozen=True, slots=True)
class Items:
    """A braced list, in the order of the elements or fields; what is left out is zero."""

    items: tuple[Expression, ...]
    type: Type
    place: Place


@dataclass(frozen=True, slots=True)
class Opaque:
    """Something that was not understood; ``parts`` are the expressions in it, which still happen."""

    reason: str
    parts: tuple[Expression, ...]
    type: Type
    place: Place


Expression = (
    Literal
    | Name
    | FunctionName
    | This
    | Unary
    | Step
    | Binary
    | Assign
    | Select
    | Index
    | Bits
    | Member
    | Cast
    | Call
    | Build
    | Items
    | Opaque
)

# ---------------------------------------------------------------------------------------------------- statements


@dataclass(frozen=True, slots=True)
class Variable:
    """A declared variable, parameter, or global. ``declaration_scope`` ``static`` keeps its value between calls."""

    key: str
    name: str
    type: Type
    place: Place
    scope: Word["local", "static", "global", "parameter"]
    initial: Expression | None = None
    constant: bool = False
    directives: tuple[Directive, ...] = ()


@dataclass(frozen=True, slots=True)
class Block:
    """Statements in order. ``directives`` are those written directly in it, not in a statement within."""

    body: tuple[Statement, ...]
    place: Place
    directives: tuple[Directive, ...] = ()


@dataclass(frozen=True, slots=True)
class Declare:
    """A local variable comes into being."""

    variable: Variable
    place: Place


@dataclass(frozen=True, slots=True)
class Evaluate:
    """An expression for its effects."""

    expression: Expression
    place: Place


@dataclass(frozen=True, slots=True)
class If:
    """``initial`` are declarations made in the head (``if (int n = ...; ...)``)."""

    initial: tuple[Statement, ...]
    condition: Expression
    yes: Statement
    no: Statement | None
    place: Place


@dataclass(frozen=True, slots=True)
class Loop:
    """Any loop. ``test_first`` is False for ``do``; a missing ``condition`` is None (endless but for a break).

    ``place`` starts at the keyword. ``directives`` are those in its body's own block, or set on its label from outside.
    A range-for is lowered to a counted loop over its range.
    """

    initial: tuple[Statement, ...]
    condition: Expression | None
    step: Expression | None
    body: Statement
    test_first: bool
    label: str | None
    directives: tuple[Directive, ...]
    place: Place


@dataclass(frozen=True, slots=True)
class Case:
    """One arm of a switch: ``values`` are its labels (None for ``default``); it falls through unless it breaks."""

    values: tuple[Expression | None, ...]
    body: tuple[Statement, ...]
    place: Place


@dataclass(frozen=True, slots=True)
class Switch:
    """``switch``: the first case that holds ``subject`` is entered, else the one with ``default``."""

    subject: Expression
    cases: tuple[Case, ...]
    place: Place


@dataclass(frozen=True, slots=True)
class Leave:
    """``break``, ``continue``, or ``goto`` (which nothing can follow)."""

    how: Word["break", "continue", "goto"]
    place: Place


@dataclass(frozen=True, slots=True)
class Return:
    """``return``."""

    value: Expression | None
    place: Place


@dataclass(frozen=True, slots=True)
class Lost:
    """A statement of the source that did not come through; told, with the reason."""

    reason: str
    place: Place


Statement = Block | Declare | Evaluate | If | Loop | Switch | Leave | Return | Lost

# ------------------------------------------------------------------------------------------------------- program


@dataclass(frozen=True, slots=True)
class Function:
    """A function with a body, a method (``record`` is then the key of its type), or an instantiation of a template."""

    key: str
    name: str
    parameters: tuple[Variable, ...]
    result: Type
    body: Block | None
    place: Place
    record: str | None = None
    initializers: tuple[tuple[str, Expression], ...] = ()  #: of a constructor: (field, value)
    directives: tuple[Directive, ...] = ()  #: written in its outermost block, or set from outside
    extern_c: bool = False
    static: bool = False


@dataclass(frozen=True, slots=True)
class Invention:
    """A name that was stood in for because its header or macro is missing. Its value is not known."""

    name: str
    what: Word["header", "type", "template", "constant", "function", "member", "namespace"]
    place: Place


@dataclass(frozen=True, slots=True)
class Problem:
    """Something that kept (a part of) a file from being read, for the user: one line."""

    file: str
    line: int | None
    what: str


@dataclass(frozen=True, slots=True)
class Program:
    """One or several linked files, lowered: all functions that can be reached from a possible top function."""

    files: tuple[str, ...]
    functions: Mapping[str, Function]
    globals: Mapping[str, Variable]
    tops: tuple[str, ...]  #: keys of the top functions, in the order of the source
    inventions: tuple[Invention, ...] = ()
    problems: tuple[Problem, ...] = ()
    scripts: tuple[str, ...] = field(default=())
