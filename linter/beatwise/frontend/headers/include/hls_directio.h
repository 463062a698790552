#pragma once
#include <hls_stream.h>
namespace hls {
template <class _BwT> class ap_none {
  _BwT _BwHeld;

public:
  _BwT read() const;
  void write(const _BwT &);
  operator _BwT() const;
  void operator=(const _BwT &);
};
#define _BwDirect(_BwName)               \
  template <class _BwT> class _BwName {  \
    _BwT _BwHeld;                        \
                                         \
  public:                                \
    bool valid() const;                  \
    bool empty() const;                  \
    bool full() const;                   \
    _BwT read();                         \
    void read(_BwT &);                   \
    bool read_nb(_BwT &);                \
    void write(const _BwT &);            \
    bool write_nb(const _BwT &);         \
    operator _BwT();                     \
    void operator=(const _BwT &);        \
    void operator>>(_BwT &);             \
    void operator<<(const _BwT &);       \
  };
_BwDirect(ap_vld) _BwDirect(ap_ack) _BwDirect(ap_hs)
#undef _BwDirect
}
