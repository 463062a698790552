"""The text that declares the stand-ins: what is written, not why."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from typing import Literal as Word

INVENTED = "_BwInvented"  #: the namespace that holds every stand-in
FIRST_VALUE, VALUE_STEP = 64, 16  #: invented values that C++ insists on; distinct, as case labels must be

Scope = tuple[str, ...]  #: namespaces, outermost first; empty for the global one
EntryKind = Word["type", "number type", "template", "constant", "bound", "variable", "function"]
MemberKind = Word["value", "type", "function", "constant"]
Parameter = str  #: ``class``, ``auto``, or the type of a value


@dataclass(slots=True)
class Entry:
    """One stand-in. ``number type`` is a built-in type no source uses, for a type that must mix with numbers freely;
    ``bound`` is a constant with a value that means nothing. ``parameters`` are those of a template; ``declared`` are
    methods that the source defines outside the class."""

    kind: EntryKind
    scopes: set[Scope] = field(default_factory=set)  #: where the name is seen; a name means one thing in all of them
    parameters: tuple[Parameter, ...] = ()
    declared: dict[str, None] = field(default_factory=dict)
    members: dict[str, MemberKind] = field(default_factory=dict)
    value: int = 0


@dataclass(slots=True)
class Draft:
    """A prelude that is being written."""

    includes: list[str] = field(default_factory=list)
    namespaces: set[Scope] = field(default_factory=set)
    macros: dict[str, str] = field(default_factory=dict)  #: name with its parameters -> replacement
    names: dict[str, Entry] = field(default_factory=dict)
    of_any: dict[str, MemberKind] = field(default_factory=dict)  #: members of values whose type is not even named

    def add(self, name: str, entry: Entry) -> None:
        entry.value = FIRST_VALUE + VALUE_STEP * len(self.names)
        self.names[name] = entry

    def render(self) -> str:
        """The prelude as C++."""
        lines = [f"#include <{header}>" for header in self.includes]
        if self.names or self.of_any:
            members = " ".join(_members(self.of_any, "static "))
            lines += [f"#define _BwAnyMembers {members}", "#include <_bw/invented.h>"]
        lines += [f"#define {name} {text}".rstrip() for name, text in self.macros.items()]
        lines += [_within(scope, "") for scope in sorted(self.namespaces)]
        for name, entry in self.names.items():
            lines.append(_within((INVENTED,), " ".join(_declaration(name, entry))))
            lines += [_within(scope, f"using {INVENTED}::{name};") for scope in sorted(entry.scopes)]
        return "".join(f"{line}\n" for line in lines)


def _within(scope: Scope, text: str) -> str:
    return "".join(f"namespace {name} {{ " for name in scope) + text + " }" * len(scope)


def _declaration(name: str, entry: Entry) -> Iterator[str]:
    match entry.kind:
        case "type":
            yield f"struct {name} {_body(name, entry)}"
        case "number type":
            yield f"typedef _BitInt(19) {name};"
        case "template":
            parameters = ", ".join(f"{kind} _BwP{at} = {_default(kind)}" for at, kind in enumerate(entry.parameters))
            yield f"template <{parameters}> struct {name} {_body(name, entry)}"
        case "constant":
            yield f"extern const int {name};"
        case "bound":
            yield f"constexpr int {name} = {entry.value};"
        case "variable":
            yield f"extern _BwAny {name};"
        case "function":
            for count in range(len(entry.parameters) + 1):
                parameters = "".join(f"{kind} _BwP{at}, " for at, kind in enumerate(entry.parameters[:count]))
                yield f"template <{parameters}class... _BwA> _BwAny {name}(_BwA &&...);"


def _body(name: str, entry: Entry) -> str:
    members = " ".join(_members(entry.members, ""))
    return f": _BwUsable {{ _BwStandIn({name}) {members} {' '.join(entry.declared)} }};"


def _members(members: Mapping[str, MemberKind], storage: str) -> Iterator[str]:
    for number, (name, kind) in enumerate(members.items()):
        match kind:
            case "value":
                yield f"{storage}_BwAny {name};"
            case "type":
                yield f"struct {name} : _BwUsable {{ _BwStandIn({name}) }};"
            case "function":
                yield f"template <class... _BwA> static _BwAny {name}(_BwA &&...);"
                yield f"template <auto _BwP, auto... _BwQ, class... _BwA> static _BwAny {name}(_BwA &&...);"
                yield f"template <class _BwP, class... _BwA> static _BwAny {name}(_BwA &&...);"
            case "constant":
                yield f"static constexpr int {name} = {FIRST_VALUE + VALUE_STEP * number};"


def _default(kind: Parameter) -> str:
    return "int" if kind == "class" else str(FIRST_VALUE)
