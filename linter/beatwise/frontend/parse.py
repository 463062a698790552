"""One C++ file parsed by the compiler, with nothing read but what was given and our own headers.

Given files lie under a made-up root. The compiler's file system is an empty one laid over the real one, so that an
include of anything else, however it is spelled, finds nothing.
"""

from __future__ import annotations

import functools
import posixpath
import re
from collections.abc import Mapping, Sequence
from pathlib import Path

from beatwise.frontend.headers import INCLUDE_DIRECTORY, header_files
from beatwise.frontend.libclang import TranslationUnit

ROOT = "/_bw/given/1/2/3/4/5/6/7/8"  #: deep enough for names that begin with some ``../``
NO_DISK = Path(__file__).with_name("no_disk.json")  #: describes a file system without files; all the compiler reads
PRELUDE = "/_bw/prelude.h"
INCLUDE = re.compile(rb'^[ \t]*#[ \t]*include[ \t]*["<]([^">\n]+)[">]', re.MULTILINE)

KEEP_GOING, DETAILED_RECORD = 0x200, 0x01  #: CXTranslationUnit options
FLAGS = (
    "-x",
    "c++",
    "-target",
    "x86_64-unknown-linux-gnu",
    "-nostdinc",
    "-nostdinc++",
    "-ferror-limit=0",
    "-fno-caret-diagnostics",
    "-include",
    f"{INCLUDE_DIRECTORY}/initializer_list",
    "-ftemplate-depth=256",
    "-fconstexpr-steps=200000",
    "-fbracket-depth=1024",
    "-Wno-everything",
    "-Wundef",
    "-D_Bool=bool",
    "-Drestrict=__restrict",
    "-D_Pragma(x)=static_assert(1,x);",
)


def virtual_path(name: str) -> str:
    """Where the file of that name lies for the compiler.

    >>> virtual_path("../radar/gates.cpp")
    '/_bw/given/1/2/3/4/5/6/7/radar/gates.cpp'
    """
    return posixpath.normpath(posixpath.join(ROOT, name.replace("\\", "/").lstrip("/")))


def parse(
    name: str,
    files: Mapping[str, bytes],
    defines: Sequence[str] = (),
    prelude: str = "",
    headers: Mapping[str, str] | None = None,
    standard: str = "gnu++17",
) -> TranslationUnit:
    """The translation unit of the file at a virtual path. ``files`` are all that it may include, by virtual path;
    ``headers`` more of them, and ``prelude`` is read before the file."""
    unsaved = {**_our_headers(), **files, **_detours(files)}
    unsaved.update((path, text.encode()) for path, text in (headers or {}).items())
    unsaved[PRELUDE] = prelude.encode()
    arguments = [*FLAGS, f"-std={standard}", "-ivfsoverlay", str(NO_DISK), "-include", PRELUDE]
    arguments += [f"-D{define}" for define in defines]
    arguments += [f"-I{folder}" for folder in _folders(files)]
    arguments += ["-isystem", INCLUDE_DIRECTORY]
    return TranslationUnit(name, unsaved, arguments, KEEP_GOING | DETAILED_RECORD)


def _folders(files: Mapping[str, bytes]) -> list[str]:
    """The root, and the folders from which some angled or bare include of a given file finds a given file."""
    wanted = {spec.decode("utf-8", "replace") for text in files.values() for spec in INCLUDE.findall(text)}
    found = [ROOT]
    for spec in sorted(wanted):
        holders = [path[: -len(spec) - 1] for path in files if path.endswith("/" + spec)]
        if len(holders) == 1 and holders[0] not in found:
            found.append(holders[0])
    return found


def _detours(files: Mapping[str, bytes]) -> dict[str, bytes]:
    """For every include spelled through ``.`` or ``..``, a one-line file at the spelled path that leads to the
    real one: the compiler compares paths letter by letter."""
    found: dict[str, bytes] = {}
    for path, text in files.items():
        for raw in INCLUDE.findall(text):
            spelled = f"{posixpath.dirname(path)}/{raw.decode('utf-8', 'replace')}"
            plain = posixpath.normpath(spelled)
            if plain != spelled and plain in files:
                found[spelled] = f'#include "{plain}"\n'.encode()
    return found


@functools.cache
def _our_headers() -> dict[str, bytes]:
    return {path: text.encode() for path, text in header_files().items()}
