// A FIFO of whole arrays; a lock lends one of them to its holder.
#pragma once
#include <hls_stream.h>
namespace hls {
template <class _BwT, int _BwDepth = 2> class stream_of_blocks;
template <class _BwT> class stream_of_blocks<_BwT, 2> {
public:
  typedef _BwT block_type;
  stream_of_blocks();
  explicit stream_of_blocks(const char *);
  bool empty() const;
  bool full() const;
  size_t size() const;
};
template <class _BwT, int _BwDepth> class stream_of_blocks : public stream_of_blocks<_BwT, 2> {
public:
  stream_of_blocks();
  explicit stream_of_blocks(const char *);
};
#define _BwLock(_BwName)                                                          \
  template <class _BwT> class _BwName {                                           \
    _BwT *_BwHeld;                                                                \
                                                                                  \
  public:                                                                         \
    explicit _BwName(stream_of_blocks<_BwT> &);                                   \
    operator _BwT &() const;                                                      \
  };
_BwLock(read_lock) _BwLock(write_lock)
#undef _BwLock
}
