"""Which of our own headers a name comes from, for sources that use it without including anything that has it."""

from __future__ import annotations

import re

STREAMS = (
    *("hls_stream.h", "hls_vector.h", "hls_math.h", "hls_burst_maxi.h", "hls_task.h", "hls_streamofblocks.h"),
    *("hls_np_channel.h", "hls_directio.h", "hls_print.h", "ap_axi_sdata.h"),
)
STANDARD = (
    *("algorithm", "vector", "array", "string", "complex", "limits", "iostream", "iomanip", "functional", "tuple"),
    *("memory", "numeric", "map", "queue", "type_traits", "cmath", "cstring", "cstdlib", "cstdio", "cstdint"),
)
REAL_FUNCTIONS = "sqrt|exp|exp2|log|log2|log10|pow|sin|cos|tan|atan|atan2|floor|ceil|round|fabs|fmin|fmax|fmod|tanh"

#: A qualified name, and the headers to include for it.
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
    (r"hls|hls::\w+", STREAMS),
    (r"hls_thread_local", ("hls_task.h",)),
    (r"tapa|tapa::\w+|TAPA_WHILE\w+", ("tapa.h",)),
    (r"u?int(?:_least|_fast)?(?:8|16|32|64)_t|u?int(?:ptr|max)_t|U?INT\d+_(?:MAX|MIN|C)", ("stdint.h",)),
    (r"u?int(?:[1-9]|[1-5]\d|6[0-4]|128|256|512|1024)", ("ap_cint.h",)),
    (r"uint|ulong|ushort|u_int\d+_t", ("stdlib.h",)),
    (r"size_t|ptrdiff_t|ssize_t|NULL|offsetof", ("stddef.h",)),
    (r"mem(?:cpy|set|move|cmp)|str(?:len|n?cpy|n?cmp|n?cat|chr|str)", ("string.h",)),
    (r"malloc|calloc|free|exit|abort|s?rand|abs|atoi|atof|posix_memalign|EXIT_\w+|RAND_MAX", ("stdlib.h",)),
    (r"f?printf|sn?printf|fopen|fclose|fread|fwrite|FILE|puts|stderr|stdout", ("stdio.h",)),
    (r"assert", ("assert.h",)),
    (r"(?:U?(?:INT|LONG|LLONG|CHAR|SHRT)|SCHAR)_(?:MAX|MIN)|CHAR_BIT", ("limits.h",)),
    (r"(?:FLT|DBL)_\w+", ("float.h",)),
    (rf"M_\w+|INFINITY|NAN|(?:{REAL_FUNCTIONS})f?|isnan|isinf", ("math.h",)),
    (r"cout|cerr|endl|cin", ("iostream",)),
    (r"std|std::\w+", STANDARD),
)


def homes(qualified: str) -> tuple[str, ...]:
    """The headers to include for the name; none if no header of ours declares it.

    >>> homes("ap_uint"), homes("radar::gate")
    (('ap_int.h',), ())
    """
    return next((headers for pattern, headers in HOMES if re.fullmatch(pattern, qualified)), ())
