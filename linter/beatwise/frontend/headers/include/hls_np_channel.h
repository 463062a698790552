// One stream dealt out to several, or several gathered into one.
#pragma once
#include <hls_stream.h>
namespace hls {
#define _BwSplit(_BwName)                                                    \
  template <class _BwT, int _BwN, int _BwDepth = 2, int _BwMore = 0> struct _BwName { \
    stream<_BwT> in;                                                         \
    stream<_BwT> out[_BwN];                                                  \
    _BwName();                                                               \
    explicit _BwName(const char *);                                          \
  };
#define _BwMerge(_BwName)                                                    \
  template <class _BwT, int _BwN, int _BwDepth = 2, int _BwMore = 0> struct _BwName { \
    stream<_BwT> in[_BwN];                                                   \
    stream<_BwT> out;                                                        \
    _BwName();                                                               \
    explicit _BwName(const char *);                                          \
  };
namespace split { _BwSplit(round_robin) _BwSplit(load_balance) }
namespace merge { _BwMerge(round_robin) _BwMerge(load_balance) }
#undef _BwSplit
#undef _BwMerge
}
