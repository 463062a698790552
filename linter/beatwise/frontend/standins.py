"""Stand-ins for what a kernel needs and was not given: headers, namespaces, types, constants, functions, macros.

The compiler's complaints say what is missing, the uses in the source say what it must be, and a prelude read before the
source declares it. One class of repair is done, then the source is parsed again, until it is clean or nothing helps.

A stand-in says nothing about the thing it stands for. All are declared in the namespace ``_BwInvented``, so
:func:`is_invented` tells them by their qualified name: a type is a record of unknown size and layout, a constant an
``extern const int`` that nothing can be computed from. Where C++ insists on a number (an array bound, a template
argument) it is a ``constexpr int`` whose value means nothing. Macros can't lie in a namespace: see ``inventions``.
"""

from __future__ import annotations

import functools
import re
from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import dataclass
from typing import Literal as Word

from beatwise.frontend.complaints import ERROR, WARNING, Complaint, Diagnostic, complaints, is_lasting
from beatwise.frontend.headers import INCLUDE_DIRECTORY, header_files
from beatwise.frontend.homes import homes
from beatwise.frontend.prelude import INVENTED, Draft, Entry, EntryKind, MemberKind
from beatwise.frontend.uses import Kind, bare, kind_of, kinds, strongest, template_parameters

__all__ = ["ERROR", "WARNING", "Diagnostic", "Invention", "StandIns", "is_invented", "stand_in"]

InventionKind = Word["header", "include", "namespace", "type", "constant", "function", "macro", "member"]
Parse = Callable[[str, dict[str, str]], Sequence[Diagnostic]]

#: The source declares a name itself.
CONFLICT = re.compile(
    "^redefinition of|conflicts with|^reference to '.*' is ambiguous|redefinition with different types"
    "|different kind of symbol|^explicit specialization.* is ambiguous|redeclar|not in a namespace enclosing"
)

#: C++ insists on a number it can compute.
NEEDS_VALUE = re.compile(
    "constant expression|compile-time constant|variable length array|constant size|is not an integral constant"
)


@dataclass(frozen=True, slots=True)
class Invention:
    """Something that was stood in for, and the first place that needs it.

    ``include`` is one of our own headers that the source uses without including it; nothing in it is invented.
    """

    name: str
    kind: InventionKind
    file: str
    line: int


@dataclass(frozen=True, slots=True)
class StandIns:
    """A prelude to read before the source, headers to offer by path, what they invent, and the errors that are left."""

    prelude: str
    headers: Mapping[str, str]
    inventions: tuple[Invention, ...]
    left: tuple[Diagnostic, ...]


def is_invented(name: str) -> bool:
    """Whether a qualified name is that of a stand-in.

    >>> is_invented("_BwInvented::RANGE_GATES"), is_invented("RANGE_GATES")
    (True, False)
    """
    return f"{INVENTED}::" in name


def stand_in(parse: Parse, texts: Mapping[str, str], limit: int = 12) -> StandIns:
    """The stand-ins that the source parsed by ``parse(prelude, headers)`` needs.

    ``texts`` holds the text of each file a diagnostic may name. The source is parsed at most ``limit`` times.
    """
    work = _Work({file: bare(text) for file, text in texts.items()})
    diagnostics = parse("", {})
    for _ in range(limit - 1):
        if not work.repair(diagnostics):
            break
        diagnostics = parse(work.draft.render(), dict(work.headers))
    left = tuple(one for one in diagnostics if is_lasting(one))
    return StandIns(work.draft.render(), work.headers, tuple(work.inventions.values()), left)


class _Work:
    """The stand-ins so far. Each repair looks at one complaint and says whether it changed anything."""

    def __init__(self, bared: Mapping[str, str]) -> None:
        self.texts = tuple(bared.values())
        self.lines = {file: text.encode().split(b"\n") for file, text in bared.items()}
        self.kinds = functools.cache(lambda name: kinds(name, self.texts))
        self.draft = Draft()
        self.headers: dict[str, str] = {}
        self.inventions: dict[tuple[str, str], Invention] = {}
        self.withdrawn: set[str] = set()
        self.done: set[tuple[str, ...]] = set()
        self.wrong: list[Complaint] = []
        self.bold = False  #: also invent what the source seems to declare itself

    def repair(self, diagnostics: Sequence[Diagnostic]) -> bool:
        """Do the first class of repair that finds something to do."""
        for one in diagnostics:
            if found := re.match(r"'(\w+)' is not defined, evaluates to 0", one.text):
                self.inventions.setdefault(("constant", found[1]), Invention(found[1], "constant", one.file, one.line))
        self.wrong, self.bold = complaints(diagnostics, self.lines), False
        classes: tuple[Callable[[Complaint], bool], ...] = (
            *(self._withdraw, self._headers, self._homes, self._call_macros, self._shouted_macros, self._empty_macros),
            *(self._namespaces, self._types, self._methods, self._names, self._members, self._values, self._refit),
        )
        if any(self._all(work) for work in classes):
            return True
        self.bold = True
        return self._all(self._types) or self._all(self._names)

    def _all(self, repair: Callable[[Complaint], bool]) -> bool:
        return sum(repair(one) for one in self.wrong) > 0

    # ------------------------------------------------------------------------------------------ the classes of repair

    def _withdraw(self, one: Complaint) -> bool:
        """The source declares after all what was stood in for."""
        if not CONFLICT.search(one.text):
            return False
        named = [one.word, *re.findall(r"'(?:\w+::)*(\w+)[^']*'", one.text)]
        name = next((name for name in named if name in self.draft.names), None)
        if name is None:
            return False
        del self.draft.names[name]
        self.withdrawn.add(name)
        self.inventions = {key: value for key, value in self.inventions.items() if value.name != name}
        return True

    def _headers(self, one: Complaint) -> bool:
        """A missing header: one of ours where the last part of the name is the same, else one that holds nothing."""
        found = re.match("'(.+)' file not found", one.text)
        if not found or not self._first("header", found[1]):
            return False
        name = found[1]
        ours = f"{INCLUDE_DIRECTORY}/{name.rpartition('/')[2]}"
        path = name if name.startswith("/") else f"{INCLUDE_DIRECTORY}/{name}"
        self.headers[path] = f'#include "{ours}"\n' if ours in header_files() else ""
        return self._tell(name, "include" if self.headers[path] else "header", one)

    def _homes(self, one: Complaint) -> bool:
        """A name of one of our headers that was not included."""
        new = [header for header in homes("::".join((*one.scope, one.name or one.word))) if self._first("home", header)]
        for header in new:
            self.draft.includes.append(header)
            self._tell(header, "include", one)
        return bool(new)

    def _call_macros(self, one: Complaint) -> bool:
        """A macro with arguments, written where no call can be."""
        if found := re.match(r"function-like macro '(\w+)' is not defined", one.text):
            return self._macro(found[1], "(...)", one, "0")
        untyped = re.search("type specifier is required for all declarations|requires a type specifier", one.text)
        name = one.name or (one.word if untyped else "")
        if not name or not one.after.removeprefix(name).lstrip().startswith("("):
            return False
        return bool(untyped or self._guess(one) == "call macro") and self._macro(name, "(...)", one)

    def _empty_macros(self, one: Complaint) -> bool:
        """A macro without arguments, written where no name can be."""
        return bool(one.name) and self._guess(one) == "empty macro" and self._macro(one.name, "", one)

    def _shouted_macros(self, one: Complaint) -> bool:
        """Where the text makes no sense at all: its names in capitals that can be nothing but macros."""
        if not re.match("expected|cannot combine|unexpected|invalid operands", one.text):
            return False
        holder = re.search(r"\b([A-Z_][A-Z0-9_]*)\s*\([^()]*$", one.before)
        changed = False
        for name in re.findall(r"\b[A-Z_][A-Z0-9_]{2,}\b", one.line):
            if name in self.draft.names or any(re.search(rf"#\s*define\s+{name}\b", text) for text in self.texts):
                continue
            match strongest(self.kinds(name)):
                case "call macro":
                    changed |= self._macro(name, "(...)", one)
                case "empty macro":
                    changed |= self._macro(name, "", one)
                case "function" if holder and holder[1] == name:
                    changed |= self._macro(name, "(...)", one)
        return changed

    def _namespaces(self, one: Complaint) -> bool:
        name, scope = one.name, one.scope
        if one.text.startswith("expected namespace name"):
            name = one.word
            outer = re.search(r"((?:\w+\s*::\s*)+)$", one.before)
            scope = tuple(re.findall(r"\w+", outer[1])) if outer else ()
        elif not name or self._guess(one) != "namespace":
            return False
        if not name or name in self.withdrawn or (*scope, name) in self.draft.namespaces:
            return False
        self.draft.namespaces.add((*scope, name))
        return self._tell(name, "namespace", one)

    def _types(self, one: Complaint) -> bool:
        name = one.word if re.match("expected (?:class|template) name", one.text) else one.name
        if not name or not one.in_namespace:
            return False
        kind = self._guess(one)
        match re.split(" named '| name", one.text)[0]:
            case "no template" if kind != "function template":
                kind = "template"
            case "expected class" | "unknown class" if kind != "template":
                kind = "type"
            case "no type" if not kind.startswith(("template", "function")):
                kind = "type"
            case "unknown type" if kind not in ("template", "type"):
                bound = one.before.rstrip().endswith("[") or one.after.lstrip().startswith("]")
                kind = "constant" if bound or (name.isupper() and kind == "constant") else "type"
        if kind == "template":
            return self._invent(name, Entry("template", parameters=self._parameters(name)), "type", one)
        return kind == "type" and self._invent(name, Entry("type"), "type", one)

    def _methods(self, one: Complaint) -> bool:
        """A method of an unknown class, defined outside it: declared as the definition says."""
        found = re.match(r"out-of-line definition of '(\w+)' does not match .* in '(?:\w+::)*(\w+)'", one.text)
        entry = self.draft.names.get(found[2]) if found else None
        if not found or entry is None:
            return False
        head = rf"(?:^|[;}}\n])\s*([\w:<>,&* \t]*?)\b{found[2]}\s*::\s*{found[1]}\s*(\([^(){{}};]*\)\s*(?:const\b)?)"
        heads = [pair for text in self.texts for pair in re.findall(head, text)]
        new = [" ".join(f"{result} {found[1]}{rest};".split()) for result, rest in heads]
        before = len(entry.declared)
        entry.declared.update(dict.fromkeys(new))
        return len(entry.declared) > before

    def _names(self, one: Complaint) -> bool:
        """A constant, variable or function."""
        if not one.name or not one.in_namespace or self._was_lost(one):
            return False
        match self._guess(one):
            case "function":
                return self._invent(one.name, Entry("function"), "function", one)
            case "function template":
                return self._invent(one.name, Entry("function", parameters=self._parameters(one.name)), "function", one)
            case "variable":
                return self._invent(one.name, Entry("variable"), "constant", one)
            case _:
                kind: EntryKind = "bound" if self._is_argument(one.name) else "constant"
                return self._invent(one.name, Entry(kind), "constant", one)

    def _members(self, one: Complaint) -> bool:
        """A member that a stand-in lacks."""
        found = re.match(r"no (member|type|template) named '(\w+)' in '([^']+)'", one.text)
        if not found:
            return False
        what, name, owner = found.groups()
        holder = re.sub("<.*", "", owner).rpartition("::")[2]
        entry = self.draft.names.get(holder)
        members = self.draft.of_any if holder == "_BwAny" else entry.members if entry else None
        kind = "type" if what != "member" else _member_kind(one)
        if members is None or members.get(name) == kind or (name in members and kind != "type"):
            return False
        members[name] = kind
        return self._tell(name, "member", one)

    def _values(self, one: Complaint) -> bool:
        """A constant that must have a value."""
        if not NEEDS_VALUE.search(one.text):
            return False
        here = self._on_line(one).values()
        named = set(re.findall(r"\w+", " ".join(re.findall(r"\[[^]]*\]|<[^<>]*>|\bcase\b[^:]*", one.line))))
        inside = [entry for name, entry in self._on_line(one).items() if name in named]
        loose = (
            _of(inside, "constant")
            or _of(here, "constant")
            or _of(self.draft.names.values(), "constant")
            or _of(here, "variable")
        )
        return _make(loose, "bound")

    def _refit(self, one: Complaint) -> bool:
        """A stand-in that turns out to be of the wrong kind."""
        here = self._on_line(one)
        at = [here[one.word]] if one.word in here else []
        match one.text:
            case text if "negative size" in text:
                less = set(re.findall(r"-\s*(\w+)", one.line))
                return _shrink([entry for name, entry in here.items() if name in less])
            case text if re.match(
                "no matching (?:function|member)|cannot initialize|assigning to|reference to type", text
            ):
                bounds = [entry for name, entry in self.draft.names.items() if self._is_bound(name)]
                return _make(_of(bounds, "constant"), "bound")
            case text if found := re.match(r"invalid range expression of type '(?:const )?(?:\w+::)*(\w+)", text):
                owner = self.draft.names.get(found[1])
                members = self.draft.of_any if found[1] == "_BwAny" else owner.members if owner else None
                if members is None or "begin" in members:
                    return False
                members.update({"begin": "function", "end": "function"})
                return True
            case text if "type parameter must be a type" in text:
                return _make(_of(at, "constant", "bound"), "type") or self._flip(here, "int")
            case text if re.search("must be an expression|unexpected type name|does not refer to a value", text):
                return _make(_of(at, "type"), "bound") or self._flip(here, "class")
            case text if "is not implicitly convertible to" in text:
                return self._flip(here, "auto")
            case text if "conditional expression is ambiguous" in text or "incompatible operand types" in text:
                named = set(re.findall(r"\w+", text))
                plain = [entry for name, entry in self.draft.names.items() if name in named and not entry.members]
                return _make(_of(plain, "type"), "number type")
            case text if "implicitly-deleted default constructor" in text or "union member" in text:
                plain = [entry for name, entry in self.draft.names.items() if self._is_in_union(name)]
                return _make(_of(plain, "type"), "number type")
            case text if re.search("subscripted value is|cannot assign to|reference base type|indirection req", text):
                used = r"\b(\w+)\s*(?:\[|\.|->|[-+*/|&^]?=[^=]|\+\+|--)"
                return _make(
                    _of([here[name] for name in set(re.findall(used, one.line)) & set(here)], "constant"), "variable"
                )
            case text if re.search("called object type '(?:const )?int'|is not a function or function pointer", text):
                return _make(_of(here.values(), "constant", "bound"), "function")
            case text if text.startswith("function cannot return function type"):
                wrapper = re.search(r"(\w+)\s*\(\s*\w+\s*\)\s*\(", one.line)
                return wrapper is not None and self._macro(wrapper[1], "(...)", one, "__VA_ARGS__")
            case text if found := re.match(r"member initializer '(\w+)' does not name", text):
                owner = next(iter(_of(here.values(), "type")), None)
                if owner is None or found[1] in owner.members:
                    return False
                owner.members[found[1]] = "value"
                return self._tell(found[1], "member", one)
            case text if re.match("expected|use of undeclared|unexpected|invalid operands", text):
                shouted = [name for name, entry in here.items() if entry.kind == "function" and name.isupper()]
                for name in shouted:
                    del self.draft.names[name]
                    del self.inventions["function", name]
                return sum(self._macro(name, "(...)", one) for name in shouted) > 0
        return False

    # ----------------------------------------------------------------------------------------------- what they share

    def _first(self, *key: str) -> bool:
        """Whether this was never tried before; it counts as tried from now on."""
        new = key not in self.done
        self.done.add(key)
        return new

    def _tell(self, name: str, kind: InventionKind, one: Complaint) -> bool:
        self.inventions.setdefault((kind, name), Invention(name, kind, one.file, one.number))
        return True

    def _invent(self, name: str, entry: Entry, kind: InventionKind, one: Complaint) -> bool:
        if name in self.withdrawn or (not self.bold and self._is_declared(name)):
            return False
        if name not in self.draft.names:
            self.draft.add(name, entry)
            self._tell(name, kind, one)
        scopes = self.draft.names[name].scopes
        new = one.scope not in scopes
        scopes.add(one.scope)
        return new

    def _macro(self, name: str, parameters: str, one: Complaint, text: str = "") -> bool:
        if name in self.withdrawn or not self._first("macro", name):
            return False
        self.draft.macros[name + parameters] = text
        return self._tell(name, "macro", one)

    def _on_line(self, one: Complaint) -> dict[str, Entry]:
        """The stand-ins that the complaint's line names."""
        words = set(re.findall(r"[A-Za-z_]\w*", one.line))
        return {name: entry for name, entry in self.draft.names.items() if name in words}

    def _flip(self, here: Mapping[str, Entry], wanted: str) -> bool:
        """Take every parameter of the line's templates for one of the wanted kind, once."""
        changed = [
            entry for name, entry in here.items() if entry.kind == "template" and self._first("flip", name, wanted)
        ]
        for entry in changed:
            entry.parameters = (wanted,) * len(entry.parameters)
        return bool(changed)

    def _parameters(self, name: str) -> tuple[str, ...]:
        values = {known for known, entry in self.draft.names.items() if entry.kind in ("constant", "bound")}
        return template_parameters(name, self.texts, values)

    def _guess(self, one: Complaint) -> Kind:
        """What the name is: all its uses speak, and so does the one complained about."""
        name = one.name or one.word
        used = self.kinds(name)
        here = kind_of(name, one.before, one.after) if one.word == one.name else None
        if here == "namespace" and not used & {"type", "template", "type argument"}:
            return "namespace"
        kind = strongest({*used, *((here,) if here else ())})
        return "type" if kind == "type argument" else kind

    def _is_bound(self, name: str) -> bool:
        """Whether the name is in an array bound that is part of a parameter's or reference's type."""
        bound = rf"\]\s*\[[^\]]*\b{name}\b|\(\s*&\s*\w+\s*\)\s*\[[^\]]*\b{name}\b"
        return any(re.search(bound, text) for text in self.texts)

    def _is_argument(self, name: str) -> bool:
        """Whether the name is in a template argument: without a value a recursion over templates would not end."""
        return any(re.search(rf"\w\s*<[\w\s,:*+/-]*\b{name}\b[\w\s,:*+/-]*>", text) for text in self.texts)

    def _is_in_union(self, name: str) -> bool:
        return any(re.search(rf"\bunion\b[^{{}}]*\{{[^{{}}]*\b{name}\b", text) for text in self.texts)

    def _is_declared(self, name: str) -> bool:
        """Whether the source seems to declare the type, so that it is missing only for another error's sake."""
        declared = (
            rf"\busing\s+{name}\s*=|\btypedef\b[^;{{}}]*\b{name}\s*(?:\[[^;]*\])?\s*;"
            rf"|\b(?:struct|class|enum|union)\s+{name}\s*[{{:]|\}}\s*{name}\s*;"
        )
        return any(re.search(declared, text) for text in self.texts)

    def _was_lost(self, one: Complaint) -> bool:
        """Whether the name is declared on a line with another error, which may have cost it its declaration."""
        declarator = re.compile(rf"[,\w>*&\]]\s*[*&]*\b{one.name}\s*[\[;=,(){{]")
        return any(
            other.number <= one.number
            and other.file == one.file
            and other.name != one.name
            and declarator.search(other.line[: one.column - 1] if one.number == other.number else other.line)
            for other in self.wrong
        )


def _member_kind(one: Complaint) -> MemberKind:
    after = one.after.lstrip()
    if one.before.rstrip().endswith("::"):
        if re.match(r"[>*\w]|&(?!&)", after):
            return "type"
        return "function" if after.startswith("(") else "constant"
    return "function" if re.match(r"<[^;]*>\s*\(", after) else "value"


def _of(entries: Iterable[Entry], *wanted: EntryKind) -> list[Entry]:
    return [entry for entry in entries if entry.kind in wanted]


def _make(entries: Sequence[Entry], kind: EntryKind) -> bool:
    for entry in entries:
        entry.kind = kind
    return bool(entries)


def _shrink(entries: Sequence[Entry]) -> bool:
    """Give the entries small values; they are subtracted from others."""
    changed = [entry for entry in entries if entry.value > len(entries)]
    for number, entry in enumerate(changed, 1):
        entry.value = number
    return bool(changed)
