#pragma once
#include <_bw/integer.h>
#include <math.h>
#include <stdint.h>
#include <iostream>
template <int _BwW, bool _BwS = true> struct ac_int : ap_int_base<_BwW, _BwS> {
  static constexpr bool sign = _BwS;
  ac_int();
  constexpr explicit ac_int(_BwLiteral _BwX) : ap_int_base<_BwW, _BwS>(_BwX) {}
  ac_int(const ac_int &) = default;
  template <class _BwT> ac_int(const _BwT &);
  ac_int &operator=(const ac_int &) = default;
  template <class _BwT> ac_int &operator=(const _BwT &);
  template <int _BwV> ac_int<_BwV, _BwS> slc(int) const;
  template <int _BwV> ac_int<_BwV, _BwS> slc(const ap_int_base<_BwV, false> &) const;
  template <class _BwT> ac_int &set_slc(int, const _BwT &);
  template <int _BwV> ac_int &set_val();
  ac_int<_BwW, false> bit_complement() const;
  int leading_sign() const;
};
#define _BwUpdate(_BwOp) template <int _BwW, bool _BwS, class _BwT> ac_int<_BwW, _BwS> &operator _BwOp(ac_int<_BwW, _BwS> &, const _BwT &);
_BwUpdate(+=) _BwUpdate(-=) _BwUpdate(*=) _BwUpdate(/=) _BwUpdate(%=) _BwUpdate(&=) _BwUpdate(|=) _BwUpdate(^=) _BwUpdate(<<=) _BwUpdate(>>=)
#undef _BwUpdate
namespace ac_intN {}
namespace ac {
template <unsigned _BwX> struct _BwLog {
  static constexpr int _BwFloor = 1 + _BwLog<_BwX / 2>::_BwFloor;
};
template <> struct _BwLog<1> { static constexpr int _BwFloor = 0; };
template <> struct _BwLog<0> { static constexpr int _BwFloor = 0; };
template <unsigned _BwX> struct log2_floor { static constexpr int val = _BwLog<_BwX>::_BwFloor; };
template <unsigned _BwX> struct log2_ceil { static constexpr int val = _BwLog<_BwX>::_BwFloor + ((_BwX & (_BwX - 1)) != 0); };
template <int _BwLow, int _BwHigh> struct int_range { typedef ac_int<_BwLog<unsigned(_BwHigh)>::_BwFloor + 1 + (_BwLow < 0), (_BwLow < 0)> type; };
template <unsigned _BwX, bool _BwS = false> struct nbits { static constexpr int val = _BwLog<_BwX>::_BwFloor + 1 + _BwS; };
}
