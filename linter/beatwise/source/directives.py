"""HLS directives: in pragmas, and in external directive scripts."""

from __future__ import annotations

import re
from collections.abc import Iterator

from beatwise.model.kernel import Directive
from beatwise.model.place import Place
from beatwise.source.commands import Command, commands
from beatwise.source.lexis import joined, lexemes
from beatwise.source.lines import Lines

#: Options that older sources give as a bare word, by directive: the option, and the words that are its values.
POSITIONAL = {
    "interface": (
        "mode",
        {
            "m_axi",
            "s_axilite",
            "axis",
            "ap_none",
            "ap_vld",
            "ap_ack",
            "ap_hs",
            "ap_ovld",
            "ap_fifo",
            "ap_memory",
            "bram",
        }
        | {"ap_ctrl_none", "ap_ctrl_hs", "ap_ctrl_chain", "ap_stable", "ap_auto"},
    ),
    "array_partition": ("type", {"block", "cyclic", "complete"}),
    "array_reshape": ("type", {"block", "cyclic", "complete"}),
    "dependence": ("type", {"inter", "intra"}),
}
WORDS = {option for option, _ in POSITIONAL.values()}  #: options whose value is a keyword, in any case

#: Options of script commands that take no value; all others take the word after them.
FLAGS = {
    *("off", "register", "rewind", "enable_flush", "recursive", "region", "force", "force_fifo", "skip_exit_check"),
    *("disable_start_propagation", "inter", "intra", "block", "cyclic", "complete", "compact_bits"),
}

PRAGMA = re.compile(r"#\s*pragma\s", re.IGNORECASE)
HEAD = re.compile(r"\s*hls\s+(\w+)", re.IGNORECASE)
BLANKS = re.compile(r"\s*")
SEPARATION = re.compile(r"[\s,]*")
KEY = re.compile(r"([A-Za-z_]\w*)\s*(=(?!=))?")
ATOM = re.compile(r'"(?:\\.|[^"\\])*"?|[^\s"()\[\]{}]|[()\[\]{}]')
NEXT_OPTION = re.compile(r"[A-Za-z_]\w*\s*=(?!=)")
JOINS = set("+-*/%<>&|^?:,.~!=")  #: a value goes on across blanks beside one of these
OPTION = re.compile(r"-([A-Za-z_]\w*)(?:=(.*))?", re.DOTALL)


def parse_directive(text: str, place: Place) -> Directive | None:
    """What follows ``#pragma``, continued lines joined; None when it is no HLS directive.

    >>> here = Place("copy.cpp", 3, 1, 3, 60, 40)
    >>> dict(parse_directive("HLS INTERFACE m_axi port=a bundle = g0  depth=(N + 1)*4", here).options)
    {'m_axi': '', 'port': 'a', 'bundle': 'g0', 'depth': '(N + 1)*4', 'mode': 'm_axi'}
    """
    text = joined(text).rstrip()
    head = HEAD.match(text)
    if not head:
        return None
    kind = head[1].lower()
    return Directive(kind, _with_positional(kind, dict(_options(text, head.end()))), place)


def pragmas_in(text: str, file: str) -> tuple[Directive, ...]:
    """All HLS pragmas written in a text, each placed at its ``#``; those in comments and strings are none.

    Whether the preprocessor keeps the region a pragma stands in is not asked here.
    """
    lines = Lines(file, text)
    found = []
    for lexeme in lexemes(text):
        if lexeme.kind == "directive":
            logical = joined(text[lexeme.start : lexeme.end])
            if pragma := PRAGMA.match(logical):
                found.append(parse_directive(logical[pragma.end() :], lines.place(lexeme.start, lexeme.end)))
    return tuple(directive for directive in found if directive)


def read_script(text: str, file: str) -> tuple[Directive, ...]:
    """The directives of an external script; each is placed at its command.

    ``options["function"]``, and ``["label"]``, ``["port"]`` or ``["variable"]`` where given, say where it belongs.
    Commands that set no directive are passed over.
    """
    lines = Lines(file, text)
    found = (_command(command, lines) for command in commands(text))
    return tuple(directive for directive in found if directive)


def _options(text: str, start: int) -> Iterator[tuple[str, str]]:
    index = start
    while index < len(text):
        index = _past(SEPARATION, text, index)
        key = KEY.match(text, index)
        if key and key[2]:
            value, index = _value(text, key.end())
            yield key[1].lower(), value
        elif key:
            index = key.end()
            yield key[1].lower(), ""
        else:  # a stray sign or a bare number
            index += 1


def _value(text: str, start: int) -> tuple[str, int]:
    """The text of a value and where it ends: at the first blank outside brackets and quotes that ends an operand."""
    begin = index = end = _past(BLANKS, text, start)
    depth, last = 0, "="
    while atom := ATOM.match(text, index):
        if depth == 0 and _ends(text, end, index, last):
            break
        depth += (atom[0] in "([{") - (atom[0] in ")]}")
        last = atom[0][-1]
        end = atom.end()
        index = _past(BLANKS, text, end)
    return _unquoted(text[begin:end].rstrip(",")), end


def _past(pattern: re.Pattern[str], text: str, start: int) -> int:
    match = pattern.match(text, start)
    return match.end() if match else start


def _ends(text: str, end: int, following: int, last: str) -> bool:
    """Whether a value that reached ``end`` with the sign ``last`` leaves what follows to the next option."""
    if last == ",":
        return bool(NEXT_OPTION.match(text, following))
    return following > end and last not in JOINS and text[following] not in JOINS


def _unquoted(value: str) -> str:
    return value[1:-1] if len(value) > 1 and value[0] == value[-1] == '"' and '"' not in value[1:-1] else value


def _with_positional(kind: str, options: dict[str, str]) -> dict[str, str]:
    option, words = POSITIONAL.get(kind, ("", set[str]()))
    spelled = next((key for key, value in options.items() if key in words and not value), None)
    if spelled:
        options.setdefault(option, spelled)
    return {key: value.lower() if key in WORDS else value for key, value in options.items()}


def _command(command: Command, lines: Lines) -> Directive | None:
    name, *words = command.words
    place = lines.place(command.start, command.end)
    if name == "config_interface":
        options, _ = _script_options(words, flags=set())
        return Directive(name, options, place)
    if not name.startswith("set_directive_"):
        return None
    kind = name.removeprefix("set_directive_").lower()
    options, rest = _script_options(words, FLAGS)
    if rest:
        function, *labels = rest[0].split("/")
        options["function"] = function
        if labels:
            options["label"] = labels[-1]
    if rest[1:]:
        options["port" if kind == "interface" else "variable"] = ",".join(rest[1:])
    return Directive(kind, _with_positional(kind, options), place)


def _script_options(words: list[str], flags: set[str]) -> tuple[dict[str, str], list[str]]:
    options: dict[str, str] = {}
    rest: list[str] = []
    index = 0
    while index < len(words):
        option = OPTION.fullmatch(words[index])
        following = words[index + 1] if index + 1 < len(words) else ""
        index += 1
        if not option:
            rest.append(words[index - 1])
            continue
        key, value = option[1].lower(), option[2] or ""
        takes = following in ("true", "false") if key in flags else following and not OPTION.fullmatch(following)
        if option[2] is None and takes:
            value = following
            index += 1
        options[key] = value
    return options, rest
