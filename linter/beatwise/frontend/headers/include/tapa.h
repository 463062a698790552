// Kernels as parallel tasks that talk through streams and reach memory through mapped pointers.
#pragma once
#include <ap_int.h>
#include <iostream>
#include <vector>
namespace tapa {
enum {
  join = 0,
  detach = -1
};
template <class _BwT, int _BwN> struct alignas((sizeof(_BwT) * _BwN) & -(sizeof(_BwT) * _BwN)) vec_t {
  static constexpr int length = _BwN;
  static constexpr int bytes = int(sizeof(_BwT)) * _BwN;
  static constexpr int bits = bytes * 8;
  typedef _BwT value_type;
  _BwT _BwLanes[_BwN];
  vec_t();
  vec_t(const vec_t &) = default;
  template <class _BwU> explicit vec_t(const _BwU &);
  template <class... _BwU, class = _BwEnable<sizeof...(_BwU) == _BwN && (_BwN > 1)>> vec_t(const _BwU &...);
  vec_t &operator=(const vec_t &) = default;
  _BwT &operator[](size_t);
  const _BwT &operator[](size_t) const;
  void set(int, const _BwT &);
  void set(const _BwT &);
  const _BwT &get(int) const;
  void shift(const _BwT &);
  bool has(const _BwT &) const;
  vec_t operator-() const;
  vec_t operator~() const;
  bool operator==(const vec_t &) const;
  bool operator!=(const vec_t &) const;
#define _BwBinary(_BwOp)                                                            \
  friend vec_t operator _BwOp(const vec_t &, const vec_t &) { return vec_t(); }     \
  friend vec_t operator _BwOp(const vec_t &, const _BwT &) { return vec_t(); }      \
  friend vec_t operator _BwOp(const _BwT &, const vec_t &) { return vec_t(); }      \
  vec_t &operator _BwOp##=(const vec_t &);                                          \
  vec_t &operator _BwOp##=(const _BwT &);
  _BwBinary(+) _BwBinary(-) _BwBinary(*) _BwBinary(/) _BwBinary(%) _BwBinary(&) _BwBinary(|) _BwBinary(^) _BwBinary(<<) _BwBinary(>>)
#undef _BwBinary
};
template <int _BwFrom, int _BwTo, class _BwT, int _BwN> vec_t<_BwT, _BwTo - _BwFrom> truncated(const vec_t<_BwT, _BwN> &);
template <class _BwT, int _BwN> _BwT sum(const vec_t<_BwT, _BwN> &);
template <class _BwT, int _BwN> _BwT product(const vec_t<_BwT, _BwN> &);

// The two ends of a FIFO; they are passed by reference.
template <class _BwT> class istream {
public:
  bool empty() const;
  bool try_eot(bool &) const;
  bool eot() const;
  bool eot(bool &) const;
  bool eot(decltype(nullptr)) const;
  bool try_peek(_BwT &) const;
  _BwT peek() const;
  _BwT peek(bool &) const;
  _BwT peek(bool &, bool &) const;
  _BwT peek(decltype(nullptr)) const;
  bool try_read(_BwT &);
  _BwT read();
  _BwT read(bool &);
  _BwT read(decltype(nullptr));
  istream &operator>>(_BwT &);
  bool try_open();
  void open();
};
template <class _BwT> class ostream {
public:
  bool full() const;
  bool try_write(const _BwT &);
  void write(const _BwT &);
  ostream &operator<<(const _BwT &);
  bool try_close();
  void close();
};
template <class _BwT, unsigned long _BwDepth = 2> class stream : public istream<_BwT>, public ostream<_BwT> {
public:
  static constexpr int depth = _BwDepth;
  stream();
  template <size_t _BwN> stream(const char (&)[_BwN]);
};
template <class _BwT, unsigned long _BwN> class istreams {
public:
  static constexpr int length = _BwN;
  istream<_BwT> &operator[](int) const;
};
template <class _BwT, unsigned long _BwN> class ostreams {
public:
  static constexpr int length = _BwN;
  ostream<_BwT> &operator[](int) const;
};
template <class _BwT, unsigned long _BwN, unsigned long _BwDepth = 2> class streams : public istreams<_BwT, _BwN>, public ostreams<_BwT, _BwN> {
public:
  static constexpr int length = _BwN;
  static constexpr int depth = _BwDepth;
  streams();
  template <size_t _BwM> streams(const char (&)[_BwM]);
  stream<_BwT, _BwDepth> &operator[](int) const;
};

// Memory behind a port.
template <class _BwT> class mmap {
  _BwT *_BwBase;

public:
  mmap(_BwT *);
  mmap(_BwT *, unsigned long);
  template <class _BwC> explicit mmap(_BwC &);
  operator _BwT *() const;
  mmap &operator++();
  mmap operator++(int);
  _BwT *get() const;
  _BwT *data() const;
  unsigned long size() const;
  template <unsigned long _BwN> mmap<vec_t<_BwT, _BwN>> vectorized() const;
  template <class _BwU> mmap<_BwU> reinterpret() const;
};
template <class _BwT> class async_mmap {
public:
  typedef long addr_t;
  typedef unsigned char resp_t;
  async_mmap(_BwT *);
  template <class _BwU> async_mmap(const mmap<_BwU> &);
  ostream<addr_t> read_addr;
  istream<_BwT> read_data;
  ostream<addr_t> write_addr;
  ostream<_BwT> write_data;
  istream<resp_t> write_resp;
};
#define _BwDirected(_BwName)                                       \
  template <class _BwT> class _BwName : public mmap<_BwT> {        \
  public:                                                          \
    using mmap<_BwT>::mmap;                                        \
    _BwName(const mmap<_BwT> &);                                   \
    template <unsigned long _BwN> _BwName<vec_t<_BwT, _BwN>> vectorized() const; \
    template <class _BwU> _BwName<_BwU> reinterpret() const;       \
  };
_BwDirected(immap) _BwDirected(ommap) _BwDirected(read_only_mmap) _BwDirected(write_only_mmap) _BwDirected(read_write_mmap)

#undef _BwDirected
template <class _BwT, unsigned long _BwN> class mmaps {
public:
  template <class _BwC> explicit mmaps(_BwC &);
  mmap<_BwT> &operator[](int) const;
  template <unsigned long _BwFrom, unsigned long _BwCount> mmaps<_BwT, _BwCount> slice() const;
  template <unsigned long _BwM> mmaps<vec_t<_BwT, _BwM>, _BwN> vectorized() const;
  template <class _BwU> mmaps<_BwU, _BwN> reinterpret() const;
};
template <class _BwT, int _BwChannels, long _BwInterleave> class hmap : public mmap<_BwT> {
public:
  using mmap<_BwT>::mmap;
};

class seq {
public:
  seq();
  operator int() const;
};
class task {
public:
  task();
  template <class _BwF, class... _BwA> task &invoke(_BwF &&, _BwA &&...);
  template <int _BwMode, class _BwF, class... _BwA> task &invoke(_BwF &&, _BwA &&...);
  template <int _BwMode, int _BwN, class _BwF, class... _BwA> task &invoke(_BwF &&, _BwA &&...);
};
template <class _BwF, class... _BwA> long invoke(_BwF &&, _BwA &&...);
template <class _BwT> struct aligned_allocator {
  typedef _BwT value_type;
};
template <class _BwT> constexpr int widthof() { return int(sizeof(_BwT)) * 8; }
template <class _BwT> constexpr int widthof(const _BwT &) { return int(sizeof(_BwT)) * 8; }
template <class _BwT, class _BwU> constexpr _BwT round_up_div(_BwT _BwA, _BwU _BwB) { return (_BwA + _BwB - 1) / _BwB; }
template <class _BwT, class _BwU> constexpr _BwT round_up(_BwT _BwA, _BwU _BwB) { return (_BwA + _BwB - 1) / _BwB * _BwB; }
template <unsigned long _BwB, class _BwT> constexpr _BwT round_up_div(_BwT _BwA) { return (_BwA + _BwB - 1) / _BwB; }
template <unsigned long _BwB, class _BwT> constexpr _BwT round_up(_BwT _BwA) { return (_BwA + _BwB - 1) / _BwB * _BwB; }
template <class _BwT> _BwT reg(const _BwT &);
template <class _BwU, class _BwT> _BwU bit_cast(const _BwT &);
}
#define TAPA_WHILE_NOT_EOT(_BwS) for (bool _BwOk; !(_BwS).eot(_BwOk) || !_BwOk;)
#define TAPA_WHILE_NEITHER_EOT(_BwS, _BwU) for (bool _BwOk, _BwOther; (!(_BwS).eot(_BwOk) || !_BwOk) && (!(_BwU).eot(_BwOther) || !_BwOther);)
#define TAPA_WHILE_NONE_EOT(_BwS, _BwU, _BwV) \
  for (bool _BwOk; !(_BwS).eot(_BwOk) && !(_BwU).eot(_BwOk) && !(_BwV).eot(_BwOk);)
