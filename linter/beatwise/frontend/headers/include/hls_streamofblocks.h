// A FIFO of whole arrays; a lock lends one of them to its holder.
#pragma once
#include <hls_stream.h>
namespace hls {
template <class _BwT> struct _BwBlock { typedef _BwT type; };
template <class _BwT, int _BwDepth = 2> class stream_of_blocks {
public:
  typedef _BwT block_type;
  stream_of_blocks();
  explicit stream_of_blocks(const char *);
  bool empty() const;
  bool full() const;
  size_t size() const;
};
template <class _BwT, int _BwDepth = 2> using stream_of_blocks_t = stream_of_blocks<_BwT, _BwDepth>;
#define _BwLock(_BwName)                                                          \
  template <class _BwT> class _BwName {                                           \
    _BwT *_BwHeld;                                                                \
                                                                                  \
  public:                                                                         \
    template <int _BwDepth> explicit _BwName(stream_of_blocks<_BwT, _BwDepth> &); \
    operator _BwT &() const;                                                      \
  };
_BwLock(read_lock) _BwLock(write_lock)
#undef _BwLock
}
