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
from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from typing import Literal as Word

from beatwise.frontend.headers import INCLUDE_DIRECTORY, header_files
from beatwise.frontend.prelude import INVENTED, Draft, Entry, EntryKind, MemberKind, Parameter, Scope
from beatwise.frontend.uses import Kind, argument_lists, bare, kind_of, kinds, strongest

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

    def repair(self, diagnostics: Sequence[Diagnostic]) -> bool:
        """Do the first class of repair that finds something to do."""
        self._tell_undefined_macros(diagnostics)
        wrong = [one for one in diagnostics if _matters(one)]
        classes = (self._withdraw, self._headers, self._homes, self._namespaces, self._types, self._names, self._members, self._refit)
        return any([any([work(one) for one in wrong]) for work in classes[:1]]) or any(
            any([work(one) for one in wrong]) for work in classes[1:]
        )
    # ------------------------------------------------------------------------------------------ the classes of repair

    def _tell_undefined_macros(self, diagnostics: Sequence[Diagnostic]) -> None:
        for one in diagnostics:
            if found := re.match(r"'(\w+)' is not defined, evaluates to 0", one.text):
                self._tell(found[1], "constant", one)

    def _withdraw(self, one: Diagnostic) -> bool:
        """The source declares after all what was stood in for."""
        if not (CONFLICT.search(one.text)):
            return False
        named = re.findall(r"'(?:\w+::)*(\w+)[^']*'", one.text) or [self._word_at(one)]
        changed = False
        for name in {*named, self._word_at(one)}:
            for key in [key for key in self.draft.names if key[1] == name]:
                del self.draft.names[key]
                changed = True
            self.withdrawn.add(name)
            self.inventions = {key: value for key, value in self.inventions.items() if value.name != name}
        return changed

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
        elif not name or self._guess(one, name, scope) != "namespace":
            return False
        if not name or name in self.withdrawn or (*scope, name) in self.draft.namespaces:
            return False
        self.draft.namespaces.add((*scope, name))
        self._tell(name, "namespace", one)
        return True

    def _types(self, one: Diagnostic) -> bool:
        name, scope = _missing_name(one), self._scope(one)
        if re.match("expected class name|expected template name", one.text):
            name = self._word_at(one)
        if not name or not scope_is_namespace(one):
            return False
        kind: Kind = self._guess(one, name, scope)
        if one.text.startswith("no template named"):
            kind = "template" if kind != "function template" else kind
        elif re.match("unknown type name|no type named|expected class name|unknown class name", one.text):
            kind = kind if kind in ("template", "empty macro", "call macro") else "type"
        if kind == "empty macro":
            return self._macro(name, name, one)
        if kind == "template":
            return self._invent(scope, name, Entry("template", self._signatures(name)), "type", one)
        return kind == "type" and self._invent(scope, name, Entry("type"), "type", one)

    def _names(self, one: Diagnostic) -> bool:
        name, scope = _missing_name(one), self._scope(one)
        if re.search("type specifier is required for all declarations|requires a type specifier", one.text):
            word = self._word_at(one)
            return bool(word) and self._text_from(one, word).lstrip().startswith("(") and self._macro(word, f"{word}(...)", one)
        if found := re.match(r"function-like macro '(\w+)' is not defined", one.text):
            return self._macro(found[1], f"{found[1]}(...)", one, "0")
        if not name or not scope_is_namespace(one):
            return False
        kind = self._guess(one, name, scope)
        if kind == "call macro":
            return self._macro(name, f"{name}(...)", one)
        if kind in ("function", "function template"):
            signatures = self._signatures(name) if kind == "function template" else set()
            return self._invent(scope, name, Entry("function", signatures), "function", one)
        return kind == "constant" and self._invent(scope, name, Entry("constant"), "constant", one)

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
            kind = "function" if after.startswith("(") else "constant"
        if holder == "_BwAny":
            members = self.draft.of_any
        else:
            entry = next((entry for (_, key), entry in self.draft.names.items() if key == holder), None)
            if entry is None:
                return False
            members = entry.members
        if name in members:
            return False
        members[name] = kind
        self._tell(name, "member", one)
        return True

    def _refit(self, one: Diagnostic) -> bool:
        """A stand-in that turns out to be of the wrong kind."""
        line = self._line(one)
        words = set(re.findall(r"[A-Za-z_]\w*", line))
        here = {key: entry for key, entry in self.draft.names.items() if key[1] in words}
        if NEEDS_VALUE.search(one.text):
            loose = [entry for entry in here.values() if entry.kind == "constant"]
            return self._make(loose or [entry for entry in self.draft.names.values() if entry.kind == "constant"], "bound")
        word = self._word_at(one)
        at = [entry for (_, name), entry in here.items() if name == word]
        if "type parameter must be a type" in one.text or "unknown type name" in one.text:
            return self._make([entry for entry in at if entry.kind in ("constant", "bound")], "type") or self._flip(here, "auto")
        if "non-type template parameter must be an expression" in one.text or "unexpected type name" in one.text:
            return self._make([entry for entry in at if entry.kind == "type"], "bound") or self._flip(here, "class")
        if "conditional expression is ambiguous" in one.text or "incompatible operand types" in one.text:
            named = set(re.findall(r"\w+", one.text))
            plain = [entry for (_, name), entry in self.draft.names.items() if name in named and entry.kind == "type" and not entry.members]
            return self._make(plain, "number type")
        if found := re.search(r"too (?:many|few) template arguments for (?:class|function|alias)?\s*template '(\w+)'", one.text):
            entry = next((entry for (_, name), entry in self.draft.names.items() if name == found[1]), None)
            return entry is not None and self._add_signatures(entry, found[1])
        if re.search(r"called object type '(?:const )?int' is not a function|is not a function or function pointer", one.text):
            return self._make([entry for entry in here.values() if entry.kind in ("constant", "bound")], "function")
        if re.match(r"expected|use of undeclared|unexpected", one.text):
            for scope, name in [key for key, entry in here.items() if entry.kind == "function" and re.fullmatch(r"[A-Z][A-Z0-9_]*", key[1])]:
                if not scope and self._first("macro", name):
                    del self.draft.names[scope, name]
                    self.inventions.pop(("function", name), None)
                    return self._macro(name, f"{name}(...)", one)
        return False

    # ----------------------------------------------------------------------------------------------- what they share

    def _first(self, *key: str) -> bool:
        """Whether this was never tried before; it counts as tried from now on."""
        new = key not in self.done
        self.done.add(key)
        return new

    def _tell(self, name: str, kind: InventionKind, one: Diagnostic) -> None:
        self.inventions.setdefault((kind, name), Invention(name, kind, one.file, one.line))

    def _invent(self, scope: Scope, name: str, entry: Entry, kind: InventionKind, one: Diagnostic) -> bool:
        if name in self.withdrawn or (scope, name) in self.draft.names:
            return False
        self.draft.add(scope, name, entry)
        self._tell(name, kind, one)
        return True

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

    def _flip(self, here: Mapping[tuple[Scope, str], Entry], wrong: Parameter) -> bool:
        """Make every parameter of the line's templates that was taken for the wrong kind the other one, once."""
        changed = False
        for (_, name), entry in here.items():
            if entry.kind == "template" and self._first("flip", name, wrong):
                right: Parameter = "class" if wrong == "class" else "auto"
                entry.signatures = {tuple(right for _ in signature) for signature in entry.signatures}
                changed = True
        return changed

    def _signatures(self, name: str) -> set[tuple[Parameter, ...]]:
        return {tuple(self._parameter(text) for text in found) for found in argument_lists(name, self.texts.values())}

    def _add_signatures(self, entry: Entry, name: str) -> bool:
        before = len(entry.signatures)
        entry.signatures |= self._signatures(name)
        return len(entry.signatures) > before

    def _parameter(self, argument: str) -> Parameter:
        """Whether a template argument is a type or a value."""
        if re.fullmatch(r"[A-Za-z_]\w*", argument):
            known = next((entry for (_, name), entry in self.draft.names.items() if name == argument), None)
            if known is not None:
                return "auto" if known.kind in ("constant", "bound") else "class"
            if argument in ("true", "false"):
                return "auto"
            spelled = rf"\b{argument}\b"
            if any(re.search(rf"(?:#\s*define\s+|\b(?:int|unsigned|size_t|bool|auto|uint\d+_t|int\d+_t)\s+){argument}\b(?!\s*\()", text) for text in self.texts.values()):
                replaced = next((found[1] for text in self.texts.values() if (found := re.search(rf"#\s*define\s+{argument}\s+(\S+)", text))), "0")
                return "auto" if re.match(r"[\d(]", replaced) or replaced.isupper() else "class"
            return "class" if "type" in kinds(argument, self.texts.values()) or not argument.isupper() else "auto"
        if re.match(r"[\d'\"(!~-]", argument) or re.fullmatch(r"[\w\s+*/()%-]+", argument) and re.search(r"[+*/%-]\s*\w", argument):
            return "auto"
        return "class"

    def _guess(self, one: Diagnostic, name: str, scope: Scope) -> Kind:
        """What the name is: all its uses speak, and the one complained about is heard where the others are silent."""
        used = set(kinds(name, self.texts.values()))
        here = kind_of(name, self._text_before(one), self._text_from(one, name))
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


def scope_is_namespace(one: Diagnostic) -> bool:
    """Whether the name was looked for in a namespace, not among the members of a class."""
    return " in namespace " in one.text or " named " not in one.text or "global namespace" in one.text or " in '" not in one.text
