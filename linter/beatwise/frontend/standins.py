"""Stand-ins for what a kernel needs and was not given: headers, namespaces, types, constants, functions, macros.

The compiler's complaints say what is missing, the uses in the source say what it must be, and a prelude read before the
source declares it. One class of repair is done, then the source is parsed again, until it is clean or nothing helps.

A stand-in says nothing about the thing it stands for. All are declared in the namespace ``_BwInvented``, so
:func:`is_invented` tells them by their qualified name: a type is a record of unknown size and layout, a constant an
``extern const int`` that nothing can be computed from. Where C++ insists on a number (an array bound, a template
argument) it is a ``constexpr int`` whose value means nothing. Macros can't lie in a namespace: see ``inventions``.
"""

from __future__ import annotations

import re
from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import dataclass
from typing import Literal as Word

from beatwise.frontend.headers import INCLUDE_DIRECTORY, header_files
from beatwise.frontend.prelude import INVENTED, Draft, Entry, EntryKind, MemberKind, Parameter, Scope
from beatwise.frontend.uses import BUILT_IN, Kind, argument_lists, bare, kind_of, kinds, strongest

WARNING, ERROR = 2, 3  #: as the compiler numbers severities; 4 is fatal

#: What a complaint is not about: a template that is only declared and is used with a type local to a function.
HARMLESS = re.compile(r"is used but not defined in this translation unit")


#: A complaint that names what is missing.
MISSING = re.compile(
    r"(?:use of undeclared identifier|unknown type name|unknown class name|no (?:template|type|member) named) '(\w+)'"
)

#: The source declares a name itself.
CONFLICT = re.compile(
    r"^redefinition of|conflicts with|^reference to '.*' is ambiguous|redefinition with different types|different kind of symbol"
    r"|^(?:call to|explicit specialization).* is ambiguous|redeclar|in the current scope|not in a namespace enclosing"
)

#: C++ insists on a number it can compute.
NEEDS_VALUE = re.compile(
    r"constant expression|compile-time constant|variable length array|constant size|is not an integral constant|variable-sized"
)

#: Names of our own headers, which a source may use without including them: (qualified name, headers).
HOMES: tuple[tuple[str, tuple[str, ...]], ...] = (
    (r"ap_u?int|ap_int_base|ap_range_ref", ("ap_int.h",)),
    (r"ap_u?fixed|AP_(?:RND|TRN|SAT|WRAP)\w*", ("ap_fixed.h",)),
    (r"ap_axi[su]|qdma_axis", ("ap_axi_sdata.h",)),
    (r"ac_int", ("ac_int.h",)),
    (r"ac_fixed|AC_(?:RND|TRN|SAT|WRAP)\w*", ("ac_fixed.h",)),
    (r"ac_channel", ("ac_channel.h",)),
    (r"half", ("hls_half.h",)),
    (r"ap_wait\w*|ap_fence", ("ap_utils.h",)),
    (r"ap_shift_reg", ("ap_shift_reg.h",)),
    (r"hls|hls::\w+", ("hls_stream.h", "hls_vector.h", "hls_math.h", "hls_burst_maxi.h", "hls_task.h", "hls_streamofblocks.h",
        "hls_np_channel.h", "hls_directio.h", "hls_print.h", "ap_axi_sdata.h")),
    (r"hls_thread_local", ("hls_task.h",)),
    (r"tapa|tapa::\w+|TAPA_WHILE\w+", ("tapa.h",)),
    (r"u?int(?:_least|_fast)?(?:8|16|32|64)_t|u?int(?:ptr|max)_t|U?INT\d+_(?:MAX|MIN|C)", ("stdint.h",)),
    (r"u?int(?:[1-9]|[1-5]\d|6[0-4]|128|256|512|1024)", ("ap_cint.h",)),
    (r"uint|ulong|ushort|u_int\d+_t", ("stdlib.h",)),
    (r"size_t|ptrdiff_t|ssize_t|NULL|offsetof", ("stddef.h",)),
    (r"mem(?:cpy|set|move|cmp)|str(?:len|n?cpy|n?cmp|n?cat|chr|str)", ("string.h",)),
    (r"malloc|calloc|free|exit|abort|s?rand|abs|atoi|atof|posix_memalign|EXIT_\w+|RAND_MAX", ("stdlib.h",)),
    (r"f?printf|s?n?printf|fopen|fclose|fread|fwrite|FILE|puts|stderr|stdout", ("stdio.h",)),
    (r"assert", ("assert.h",)),
    (r"(?:U?(?:INT|LONG|LLONG|CHAR|SHRT)|SCHAR)_(?:MAX|MIN)|CHAR_BIT", ("limits.h",)),
    (r"(?:FLT|DBL)_\w+", ("float.h",)),
    (r"M_\w+|INFINITY|NAN|(?:sqrt|exp|exp2|log|log2|log10|pow|sin|cos|tan|atan|atan2|floor|ceil|round|fabs|fmin|fmax|fmod|tanh)f?|isnan|isinf", ("math.h",)),
    (r"(?:std::)?(?:cout|cerr|endl|cin)", ("iostream",)),
    (r"std|std::\w+", ("algorithm", "vector", "array", "string", "complex", "limits", "iostream", "iomanip", "functional", "tuple", "memory",
        "numeric", "map", "queue", "type_traits", "cmath", "cstring", "cstdlib", "cstdio", "cstdint")),
)

InventionKind = Word["header", "include", "namespace", "type", "constant", "function", "macro", "member"]


@dataclass(frozen=True, slots=True)
class Diagnostic:
    """A complaint of the compiler; ``severity`` is 2 for a warning, 3 for an error, 4 for a fatal one."""

    severity: int
    text: str
    file: str
    line: int  #: from 1
    column: int  #: from 1, in bytes
    offset: int  #: from 0, in bytes


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


Parse = Callable[[str, dict[str, str]], Sequence[Diagnostic]]


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
    work = _Work({file: bare(text) for file, text in texts.items()}, texts)
    diagnostics = parse("", {})
    for _ in range(limit - 1):
        if not work.repair(diagnostics):
            break
        diagnostics = parse(work.draft.render(), dict(work.headers))
    left = tuple(one for one in diagnostics if _matters(one))
    return StandIns(work.draft.render(), work.headers, tuple(work.inventions.values()), left)


def _matters(one: Diagnostic) -> bool:
    return one.severity >= ERROR and not HARMLESS.search(one.text)


class _Work:
    """The stand-ins so far. Each repair looks at all diagnostics and says whether it changed anything."""

    def __init__(self, bared: Mapping[str, str], texts: Mapping[str, str]) -> None:
        self.texts = bared
        self.lines = {file: text.encode().split(b"\n") for file, text in bared.items()}
        self.raw_lines = {file: text.encode().split(b"\n") for file, text in texts.items()}
        self.draft = Draft()
        self.headers: dict[str, str] = {}
        self.inventions: dict[tuple[str, str], Invention] = {}
        self.withdrawn: set[str] = set()
        self.done: set[tuple[str, ...]] = set()
        self.wrong: list[Diagnostic] = []
        self.bold = False  #: also invent what the source seems to declare itself

    def repair(self, diagnostics: Sequence[Diagnostic]) -> bool:
        """Do the first class of repair that finds something to do."""
        self._tell_undefined_macros(diagnostics)
        wrong = [one for one in diagnostics if _matters(one)]
        classes = (
            *(self._withdraw, self._headers, self._homes, self._call_macros, self._shouted_macros, self._empty_macros, self._namespaces),
            *(self._types, self._methods, self._names, self._members, self._refit),
        )
        self.wrong, self.bold = wrong, False
        if any(any([repair(one) for one in wrong]) for repair in classes):
            return True
        self.bold = True
        return any(any([repair(one) for one in wrong]) for repair in (self._types, self._names))
    # ------------------------------------------------------------------------------------------ the classes of repair

    def _tell_undefined_macros(self, diagnostics: Sequence[Diagnostic]) -> None:
        for one in diagnostics:
            if found := re.match(r"'(\w+)' is not defined, evaluates to 0", one.text):
                self._tell(found[1], "constant", one)

    def _withdraw(self, one: Diagnostic) -> bool:
        """The source declares after all what was stood in for."""
        if not (CONFLICT.search(one.text)):
            return False
        here = self._word_at(one)
        named = re.findall(r"'(?:\w+::)*(\w+)[^']*'", one.text)
        for name in [name for name in (here, *named) if name in self.draft.names][:1]:
            del self.draft.names[name]
            self.withdrawn.add(name)
            self.inventions = {key: value for key, value in self.inventions.items() if value.name != name}
            return True
        return False

    def _headers(self, one: Diagnostic) -> bool:
        """A missing header: one of ours where the name is the same, else one that holds nothing."""
        found = re.match(r"'(.+)' file not found", one.text)
        if not found or not self._first("header", found[1]):
            return False
        name = found[1]
        ours = f"{INCLUDE_DIRECTORY}/{name.rpartition('/')[2]}"
        path = name if name.startswith("/") else f"{INCLUDE_DIRECTORY}/{name}"
        self.headers[path] = f'#include "{ours}"\n' if ours in header_files() else ""
        self._tell(name, "include" if self.headers[path] else "header", one)
        return True

    def _homes(self, one: Diagnostic) -> bool:
        """A name of one of our headers that was not included."""
        name = _missing_name(one) or self._word_at(one)
        scope = "::".join(self._scope(one))
        for pattern, headers in HOMES:
            if re.fullmatch(pattern, f"{scope}::{name}" if scope else name) and self._first("include", pattern):
                self.draft.includes += [header for header in headers if header not in self.draft.includes]
                for header in headers:
                    self._tell(header, "include", one)
                return True
        return False

    def _namespaces(self, one: Diagnostic) -> bool:
        name, scope = _missing_name(one), self._scope(one)
        if one.text.startswith("expected namespace name"):
            name = self._word_at(one)
            outer = re.search(r"((?:\w+\s*::\s*)+)$", self._text_before(one))
            scope = tuple(re.findall(r"\w+", outer[1])) if outer else ()
        elif not name or self._guess(one, name) != "namespace":
            return False
        if not name or name in self.withdrawn or (*scope, name) in self.draft.namespaces:
            return False
        self.draft.namespaces.add((*scope, name))
        self._tell(name, "namespace", one)
        return True

    def _call_macros(self, one: Diagnostic) -> bool:
        """A macro with arguments that is written where no call can be."""
        if found := re.match(r"function-like macro '(\w+)' is not defined", one.text):
            return self._macro(found[1], f"{found[1]}(...)", one, "0")
        name = _missing_name(one) or self._word_at(one)
        if not name or self._text_from(one, name).lstrip()[:1] != "(":
            return False
        if re.search("type specifier is required for all declarations|requires a type specifier", one.text):
            return self._macro(name, f"{name}(...)", one)
        return _missing_name(one) is not None and self._guess(one, name) == "call macro" and self._macro(name, f"{name}(...)", one)

    def _empty_macros(self, one: Diagnostic) -> bool:
        """A macro without arguments that is written where no name can be."""
        name = _missing_name(one)
        return name is not None and self._guess(one, name) == "empty macro" and self._macro(name, name, one)

    def _shouted_macros(self, one: Diagnostic) -> bool:
        """Where the text makes no sense at all: its names in capitals that can be nothing but macros."""
        if not re.match("expected|cannot combine|unexpected", one.text):
            return False
        changed = False
        for name in re.findall(r"\b[A-Z_][A-Z0-9_]{2,}\b", self._line(one)):
            if any(re.search(rf"#\s*define\s+{name}\b", text) for text in self.texts.values()) or name in self.draft.names:
                continue
            match strongest(kinds(name, self.texts.values())):
                case "call macro":
                    changed |= self._macro(name, f"{name}(...)", one)
                case "empty macro":
                    changed |= self._macro(name, name, one)
        return changed

    def _types(self, one: Diagnostic) -> bool:
        name, scope = _missing_name(one), self._scope(one)
        if re.match("expected class name|expected template name", one.text):
            name = self._word_at(one)
        if not name or not _is_in_namespace(one):
            return False
        kind: Kind = self._guess(one, name)
        if one.text.startswith("no template named") and kind != "function template":
            kind = "template"
        elif re.match("no type named|expected class name|unknown class name", one.text) and kind != "template":
            kind = "type"
        elif one.text.startswith("unknown type name") and kind not in ("template", "type"):
            bound = self._text_before(one).rstrip().endswith("[") or self._text_from(one, name).lstrip().startswith("]")
            kind = "constant" if bound or (name.isupper() and kind == "constant") else "type"
        if kind == "template":
            return self._invent(scope, name, Entry("template", parameters=self._parameters(name)), "type", one)
        return kind == "type" and self._invent(scope, name, Entry("type"), "type", one)

    def _names(self, one: Diagnostic) -> bool:
        """A constant, variable or function."""
        name, scope = _missing_name(one), self._scope(one)
        if not name or not _is_in_namespace(one) or self._was_lost(name, one):
            return False
        kind = self._guess(one, name)
        match kind:
            case "function" | "function template":
                parameters = self._parameters(name) if kind == "function template" else ()
                return self._invent(scope, name, Entry("function", parameters=parameters), "function", one)
            case "variable":
                return self._invent(scope, name, Entry("variable"), "constant", one)
            case _:
                return self._invent(scope, name, Entry("constant"), "constant", one)

    def _is_declared(self, name: str) -> bool:
        """Whether the source seems to declare the type, so that it is missing only for another error's sake."""
        declared = rf"\busing\s+{name}\s*=|\btypedef\b[^;{{}}]*\b{name}\s*(?:\[[^;]*\])?\s*;|\b(?:struct|class|enum|union)\s+{name}\s*[{{:]|\}}\s*{name}\s*;"
        return any(re.search(declared, text) for text in self.texts.values())

    def _was_lost(self, name: str, one: Diagnostic) -> bool:
        """Whether the name is declared on a line with another error, which may have cost it its declaration."""
        declarator = re.compile(rf"[,\w>*&\]]\s*[*&]*\b{name}\s*[\[;=,(){{]")
        for other in self.wrong:
            if other.line <= one.line and other.file == one.file and _missing_name(other) != name:
                line = self._line(other)
                if declarator.search(line[: one.column - 1] if one.line == other.line else line):
                    return True
        return False

    def _methods(self, one: Diagnostic) -> bool:
        """A method of an unknown class, defined outside it."""
        found = re.match(r"out-of-line definition of '(\w+)' does not match any declaration in '(?:\w+::)*(\w+)'", one.text)
        entry = self.draft.names.get(found[2]) if found else None
        if not found or entry is None:
            return False
        name, owner = found.groups()
        heads = rf"(?:^|[;}}\n])\s*([\w:<>,&* \t]*?)\b{owner}\s*::\s*{name}\s*(\([^(){{}};]*\)\s*(?:const\b)?)"
        methods = [f"{result.strip()} {name}{rest.strip()};" for text in self.texts.values() for result, rest in re.findall(heads, text)]
        methods = [" ".join(method.split()) for method in methods]
        new = [method for method in methods if method not in entry.declared]
        entry.declared.update(dict.fromkeys(new))
        return bool(new)

    def _members(self, one: Diagnostic) -> bool:
        """A member that a stand-in lacks."""
        found = re.match(r"no (member|type|template) named '(\w+)' in '([^']+)'", one.text)
        if not found:
            return False
        what, name, owner = found.groups()
        holder = re.sub(r"<.*", "", owner).rpartition("::")[2]
        after = self._text_from(one, name).lstrip()
        kind: MemberKind = "type" if what != "member" else "function" if re.match(r"<[^;]*>\s*\(", after) else "value"
        if kind == "value" and self._text_before(one).rstrip().endswith("::"):
            kind = "type" if re.match(r"[>&*\w]", after) else "function" if after.startswith("(") else "constant"
        if holder == "_BwAny":
            members = self.draft.of_any
        else:
            entry = self.draft.names.get(holder)
            if entry is None:
                return False
            members = entry.members
        if members.get(name) == kind or (name in members and kind != "type"):
            return False
        members[name] = kind
        self._tell(name, "member", one)
        return True

    def _refit(self, one: Diagnostic) -> bool:
        """A stand-in that turns out to be of the wrong kind."""
        text, word = one.text, self._word_at(one)
        words = set(re.findall(r"[A-Za-z_]\w*", self._line(one)))
        here = {name: entry for name, entry in self.draft.names.items() if name in words}
        at = [here[word]] if word in here else []
        if NEEDS_VALUE.search(text):
            return self._make(_of(here.values(), "constant") or _of(self.draft.names.values(), "constant"), "bound")
        if "negative size" in text:
            less = {name for name in re.findall(r"-\s*(\w+)", self._line(one))}
            return self._shrink([entry for name, entry in here.items() if name in less])
        if re.match("no matching function for call|cannot initialize|no matching member|assigning to", text):
            loose = {name: entry for name, entry in self.draft.names.items() if entry.kind == "constant"}
            inner = [entry for name, entry in loose.items() if any(re.search(rf"\]\s*\[[^\]]*\b{name}\b", one) for one in self.texts.values())]
            return self._make(inner, "bound")
        if "type parameter must be a type" in text:
            return self._make(_of(at, "constant", "bound"), "type") or self._flip(here, "auto")
        if re.search("non-type template parameter must be an expression|unexpected type name|does not refer to a value", text):
            return self._make(_of(at, "type"), "bound") or self._flip(here, "class")
        if "conditional expression is ambiguous" in text or "incompatible operand types" in text:
            named = set(re.findall(r"\w+", text))
            plain = [entry for name, entry in self.draft.names.items() if name in named and not entry.members]
            return self._make(_of(plain, "type"), "number type")
        if re.search("subscripted value is not|cannot assign to|member reference base type|indirection requires", text):
            used = {name for name in words if re.search(rf"\b{name}\s*(?:\[|\.|->|[-+*/|&^]?=[^=]|\+\+|--)|\*\s*{name}\b", self._line(one))}
            return self._make(_of([entry for name, entry in here.items() if name in used], "constant"), "variable")
        if re.search(r"called object type '(?:const )?int' is not a function|is not a function or function pointer", text):
            return self._make(_of(here.values(), "constant", "bound"), "function")
        if text.startswith("function cannot return function type"):
            wrapper = re.search(r"(\w+)\s*\(\s*\w+\s*\)\s*\(", self._line(one))
            return wrapper is not None and self._macro(wrapper[1], f"{wrapper[1]}(...)", one, "__VA_ARGS__")
        if found := re.match(r"member initializer '(\w+)' does not name", text):
            owners = [entry for name, entry in here.items() if entry.kind == "type"]
            return bool(owners) and self._first("member", found[1], one.file) and self._member(owners[0], found[1], one)
        if re.match(r"expected|use of undeclared|unexpected", text):
            for name in [name for name, entry in here.items() if entry.kind == "function" and name.isupper()]:
                if self._first("macro", name):
                    del self.draft.names[name]
                    self.inventions.pop(("function", name), None)
                    return self._macro(name, f"{name}(...)", one)
        return False

    def _member(self, entry: Entry, name: str, one: Diagnostic) -> bool:
        entry.members.setdefault(name, "value")
        self._tell(name, "member", one)
        return True

    def _shrink(self, entries: Sequence[Entry]) -> bool:
        changed = [entry for entry in entries if entry.value > len(entries)]
        for number, entry in enumerate(changed, 1):
            entry.value = number
        return bool(changed)

    # ----------------------------------------------------------------------------------------------- what they share

    def _first(self, *key: str) -> bool:
        """Whether this was never tried before; it counts as tried from now on."""
        new = key not in self.done
        self.done.add(key)
        return new

    def _tell(self, name: str, kind: InventionKind, one: Diagnostic) -> None:
        self.inventions.setdefault((kind, name), Invention(name, kind, one.file, one.line))

    def _invent(self, scope: Scope, name: str, entry: Entry, kind: InventionKind, one: Diagnostic) -> bool:
        if name in self.withdrawn or (not self.bold and self._is_declared(name)):
            return False
        if name not in self.draft.names:
            self.draft.add(name, entry)
            self._tell(name, kind, one)
        scopes = self.draft.names[name].scopes
        new = scope not in scopes
        scopes.add(scope)
        return new

    def _macro(self, name: str, written: str, one: Diagnostic, text: str = "") -> bool:
        if name in self.withdrawn or written in self.draft.macros:
            return False
        self.draft.macros[written] = text
        self._tell(name, "macro", one)
        return True

    def _make(self, entries: Sequence[Entry], kind: EntryKind) -> bool:
        for entry in entries:
            entry.kind = kind
        return bool(entries)

    def _flip(self, here: Mapping[str, Entry], wrong: Parameter) -> bool:
        """Take every parameter of the line's templates for the other kind, once."""
        changed = [entry for name, entry in here.items() if entry.kind == "template" and self._first("flip", name, wrong)]
        right: Parameter = "class" if wrong == "class" else "auto"
        for entry in changed:
            entry.parameters = (right,) * len(entry.parameters)
        return bool(changed)

    def _parameters(self, name: str) -> tuple[Parameter, ...]:
        """The template parameters that all uses of the name together ask for."""
        found: list[tuple[bool, Parameter]] = []
        for arguments in argument_lists(name, self.texts.values()):
            for at, argument in enumerate(arguments):
                told = self._parameter(argument)
                if at == len(found):
                    found.append(told)
                else:
                    found[at] = max(found[at], told)
        return tuple(kind for _, kind in found)

    def _parameter(self, argument: str) -> tuple[bool, Parameter]:
        """Whether a template argument is a type or a value, and before that whether it is sure."""
        if re.match(r"[\d'\"(!~-]|true\b|false\b|sizeof\b", argument) or re.search(r"\w\s*[+*/%-]\s*\w", argument):
            return True, "auto"
        if not re.fullmatch(r"[A-Za-z_]\w*", argument):
            return True, "class"
        for text in self.texts.values():
            if re.search(rf"\b(?:int|unsigned|size_t|bool|auto|u?int\d+_t)\s+{argument}\b(?!\s*\()", text):
                return True, "auto"
            if re.search(rf"\b(?:typename|class|struct)\s+{argument}\b|\btypedef\b[^;]*\b{argument}\s*;|\busing\s+{argument}\s*=", text):
                return True, "class"
            if replaced := re.search(rf"#\s*define\s+{argument}\s+(\S+)", text):
                return True, "auto" if re.match(r"[\d(]", replaced[1]) else "class"
        if re.fullmatch(rf"{BUILT_IN}|half", argument):
            return True, "class"
        known = self.draft.names.get(argument)
        if known is not None and known.kind in ("constant", "bound"):
            return False, "auto"
        return False, "class" if kinds(argument, self.texts.values()) & {"type", "template"} else "auto"

    def _guess(self, one: Diagnostic, name: str) -> Kind:
        """What the name is: all its uses speak, and so does the one complained about."""
        used = set(kinds(name, self.texts.values()))
        here = kind_of(name, self._text_before(one), self._text_from(one, name)) if self._word_at(one) == name else None
        if here == "namespace" and "type" not in used and "template" not in used:
            return "namespace"
        return strongest({*used, *((here,) if here else ())})

    def _scope(self, one: Diagnostic) -> Scope:
        """The namespaces in which the name was looked for."""
        found = re.search(r" in namespace '([^']+)'", one.text)
        return tuple(found[1].replace(f"{INVENTED}::", "").split("::")) if found else ()

    def _line(self, one: Diagnostic) -> str:
        lines = self.lines.get(one.file, [])
        return lines[one.line - 1].decode("utf-8", "replace") if 0 < one.line <= len(lines) else ""

    def _text_before(self, one: Diagnostic) -> str:
        lines = self.lines.get(one.file, [])
        if not 0 < one.line <= len(lines):
            return ""
        before = b"\n".join(lines[max(0, one.line - 6) : one.line - 1]) + b"\n" + lines[one.line - 1][: one.column - 1]
        return before.decode("utf-8", "replace")

    def _text_from(self, one: Diagnostic, name: str) -> str:
        """What follows the name where the diagnostic points."""
        lines = self.lines.get(one.file, [])
        if not 0 < one.line <= len(lines):
            return ""
        after = lines[one.line - 1][one.column - 1 :] + b"\n" + b"\n".join(lines[one.line : one.line + 8])
        return after.decode("utf-8", "replace").removeprefix(name)

    def _word_at(self, one: Diagnostic) -> str:
        lines = self.lines.get(one.file, [])
        if not 0 < one.line <= len(lines):
            return ""
        found = re.match(rb"[A-Za-z_]\w*", lines[one.line - 1][one.column - 1 :])
        return found.group().decode() if found else ""


def _missing_name(one: Diagnostic) -> str | None:
    found = MISSING.match(one.text)
    return found[1] if found else None


def _is_in_namespace(one: Diagnostic) -> bool:
    """Whether the name was looked for in a namespace, not among the members of a class."""
    return " in namespace " in one.text or " in '" not in one.text


def _of(entries: Iterable[Entry], *wanted: EntryKind) -> list[Entry]:
    return [entry for entry in entries if entry.kind in wanted]
