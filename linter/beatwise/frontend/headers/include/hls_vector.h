// A vector takes N * sizeof(T) bytes, aligned to the largest power of two that divides its size.
#pragma once
#include <_bw/traits.h>
#include <initializer_list>
#include <stddef.h>
#include <stdint.h>
namespace hls {
template <class _BwT, size_t _BwN> class alignas((sizeof(_BwT) * _BwN) & -(sizeof(_BwT) * _BwN)) vector {
  _BwT _BwLanes[_BwN];

public:
  typedef _BwT value_type;
  static constexpr size_t width = _BwN;
  vector();
  vector(const vector &) = default;
  vector(const _BwT &);
  vector(const _BwT (&)[_BwN]);
  vector(std::initializer_list<_BwT>);
  vector &operator=(const vector &) = default;
  static constexpr size_t size() { return _BwN; }
  _BwT &operator[](size_t);
  const _BwT &operator[](size_t) const;
  _BwT *begin();
  _BwT *end();
  const _BwT *begin() const;
  const _BwT *end() const;
  vector &operator++();
  vector &operator--();
  vector operator++(int);
  vector operator--(int);
  vector operator-() const;
  vector operator~() const;
  vector lshift(size_t) const;
  vector rshift(size_t) const;
  vector rotate_left(size_t) const;
  vector rotate_right(size_t) const;
  _BwT reduce_add() const;
  _BwT reduce_mult() const;
  _BwT reduce_and() const;
  _BwT reduce_or() const;
  _BwT reduce_xor() const;
  _BwT reduce_min() const;
  _BwT reduce_max() const;
#define _BwBinary(_BwOp)                                                \
  friend vector operator _BwOp(const vector &, const vector &) { return vector(); }
#define _BwUpdate(_BwOp) vector &operator _BwOp(const vector &);
#define _BwCompare(_BwOp)                                               \
  friend vector<bool, _BwN> operator _BwOp(const vector &, const vector &) { return vector<bool, _BwN>(); }
  _BwBinary(+) _BwBinary(-) _BwBinary(*) _BwBinary(/) _BwBinary(%) _BwBinary(&) _BwBinary(|) _BwBinary(^) _BwBinary(<<) _BwBinary(>>)
  _BwUpdate(+=) _BwUpdate(-=) _BwUpdate(*=) _BwUpdate(/=) _BwUpdate(%=) _BwUpdate(&=) _BwUpdate(|=) _BwUpdate(^=) _BwUpdate(<<=) _BwUpdate(>>=)
  _BwCompare(<) _BwCompare(<=) _BwCompare(>) _BwCompare(>=) _BwCompare(==) _BwCompare(!=)
#undef _BwBinary
#undef _BwUpdate
#undef _BwCompare
};
}
