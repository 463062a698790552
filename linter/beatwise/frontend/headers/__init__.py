"""The headers a kernel may include, as declarations only, served from memory under a directory that does not exist.

They are written from the public meaning of the names. Every name inside them that is not part of that meaning is
reserved (``_Bw...``), since kernels define ``N``, ``T`` or ``W`` as macros. Sizes are those of the hardware: see
``include/_bw/integer.h``.
"""

from __future__ import annotations

from functools import cache
from pathlib import Path

INCLUDE_DIRECTORY = "/_bw/include"  #: give it to the parser as a system include directory

#: What the parser must be told for these headers: where they are, that they are the only ones, and that a misspelt name
#: is an unknown name (else an unknown name may silently become a known one).
HEADER_FLAGS: tuple[str, ...] = (
    "-nostdinc",
    "-nostdinc++",
    "-isystem",
    INCLUDE_DIRECTORY,
    "-fno-spell-checking",
)

#: Headers that hold nothing of their own: name -> the header they forward to.
FORWARDS: dict[str, str] = {
    "cstdint": "stdint.h",
    "inttypes.h": "stdint.h",
    "cinttypes": "stdint.h",
    "cstddef": "stddef.h",
    "cstring": "string.h",
    "strings.h": "string.h",
    "memory.h": "string.h",
    "cstdlib": "stdlib.h",
    "malloc.h": "stdlib.h",
    "alloca.h": "stdlib.h",
    "cmath": "math.h",
    "cfloat": "float.h",
    "climits": "limits.h",
    "cassert": "assert.h",
    "cstdio": "stdio.h",
    "cstdarg": "stdarg.h",
    "cctype": "ctype.h",
    "ctime": "time.h",
    "sys/time.h": "time.h",
    "sys/types.h": "stdint.h",
    "set": "map",
    "unordered_map": "map",
    "unordered_set": "map",
    "stack": "queue",
    "stdexcept": "exception",
    "new": "exception",
    "string_view": "string",
    "condition_variable": "mutex",
    "iosfwd": "istream",
    "cstdbool": "stdbool.h",
    "ratio": "chrono",
    "ap_int_base.h": "ap_int.h",
    "ap_int_ref.h": "ap_int.h",
    "ap_common.h": "ap_int.h",
    "ap_fixed_base.h": "ap_fixed.h",
}


@cache
def header_files() -> dict[str, str]:
    """Every header: absolute made-up path -> text. The mapping is shared; don't change it."""
    folder = Path(__file__).parent / "include"
    written = {
        f"{INCLUDE_DIRECTORY}/{path.relative_to(folder).as_posix()}": path.read_text(encoding="utf-8")
        for path in sorted(folder.rglob("*"))
        if path.is_file()
    }
    forwarded = {f"{INCLUDE_DIRECTORY}/{name}": f"#include <{target}>\n" for name, target in FORWARDS.items()}
    return forwarded | written
