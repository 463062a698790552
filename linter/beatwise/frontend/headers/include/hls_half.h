// Half-precision floating point, 2 bytes.
#pragma once
#include <_bw/traits.h>
struct half {
  unsigned short _BwStore;
  half();
  half(float);
  operator float() const;
  half &operator++();
  half operator++(int);
  half operator-() const;
  unsigned short get_bits() const;
};
#define _BwBinary(_BwOp, _BwResult)                                                                                       \
  _BwResult operator _BwOp(const half &, const half &);                                                                  \
  template <class _BwT> _BwEnable<__is_integral(_BwT), _BwResult> operator _BwOp(const half &, _BwT);                     \
  template <class _BwT> _BwEnable<__is_integral(_BwT), _BwResult> operator _BwOp(_BwT, const half &);
#define _BwFloats(_BwOp)                                                                                                  \
  template <class _BwT> _BwEnable<__is_floating_point(_BwT), _BwT> operator _BwOp(const half &, _BwT);                    \
  template <class _BwT> _BwEnable<__is_floating_point(_BwT), _BwT> operator _BwOp(_BwT, const half &);                    \
  template <class _BwT> half &operator _BwOp##=(half &, const _BwT &);                                                    \
  template <class _BwT> _BwEnable<__is_arithmetic(_BwT), _BwT> &operator _BwOp##=(_BwT &, const half &);
#define _BwCompare(_BwOp)                                                                                                 \
  _BwBinary(_BwOp, bool)                                                                                                  \
  template <class _BwT> _BwEnable<__is_floating_point(_BwT), bool> operator _BwOp(const half &, _BwT);                    \
  template <class _BwT> _BwEnable<__is_floating_point(_BwT), bool> operator _BwOp(_BwT, const half &);
_BwBinary(+, half) _BwBinary(-, half) _BwBinary(*, half) _BwBinary(/, half) _BwFloats(+) _BwFloats(-) _BwFloats(*) _BwFloats(/)
_BwCompare(==) _BwCompare(!=) _BwCompare(<) _BwCompare(<=) _BwCompare(>) _BwCompare(>=)
#undef _BwBinary
#undef _BwFloats
#undef _BwCompare
half half_sqrt(half);
half half_exp(half);
half half_log(half);
half half_abs(half);
