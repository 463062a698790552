#pragma once
#include <iostream>
#include <stddef.h>
#include <stdint.h>
namespace hls {
template <class _BwT, int _BwDepth = 0> class stream;
template <class _BwT> class stream<_BwT, 0> {
public:
  typedef _BwT value_type;
  stream();
  explicit stream(const char *);
  bool empty() const;
  bool full() const;
  size_t size() const;
  size_t capacity() const;
  _BwT read();
  void read(_BwT &);
  bool read_nb(_BwT &);
  void write(const _BwT &);
  bool write_nb(const _BwT &);
  void operator>>(_BwT &);
  void operator<<(const _BwT &);
  void set_name(const char *);
};
template <class _BwT, int _BwDepth> class stream : public stream<_BwT, 0> {
public:
  stream();
  explicit stream(const char *);
};
}
