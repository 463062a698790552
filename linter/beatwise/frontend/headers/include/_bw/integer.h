// Arbitrary-precision integers. An integer of W bits takes ceil(W / 8) bytes rounded up to a power of two, and is
// aligned to that size (up to 512 bytes): what hardware compilers give an integer of that width in memory.
#pragma once
#include <_bw/traits.h>

template <int _BwW> struct ap_int;
template <int _BwW> struct ap_uint;
template <int _BwW, bool _BwS> struct ap_int_base;
template <int _BwW, bool _BwS> using _BwInteger = _BwChoose<_BwS, ap_int<_BwW>, ap_uint<_BwW>>;

constexpr int _BwMax(int _BwA, int _BwB) { return _BwA > _BwB ? _BwA : _BwB; }
constexpr int _BwMin(int _BwA, int _BwB) { return _BwA < _BwB ? _BwA : _BwB; }
constexpr int _BwBytes(int _BwBits) {
  int _BwSize = 1;
  while (_BwSize * 8 < _BwBits) _BwSize *= 2;
  return _BwSize;
}

// Makes a type one that a constexpr variable may have. Its other constructors must not be constexpr: the compiler would
// work out every element of a large array, which takes seconds.
enum class _BwLiteral {};

// The built-in integer that an arbitrary-precision one converts to.
template <int _BwSize, bool _BwS> struct _BwBuiltinOf { typedef _BwChoose<_BwS, long long, unsigned long long> type; };
template <> struct _BwBuiltinOf<1, true> { typedef signed char type; };
template <> struct _BwBuiltinOf<1, false> { typedef unsigned char type; };
template <> struct _BwBuiltinOf<2, true> { typedef short type; };
template <> struct _BwBuiltinOf<2, false> { typedef unsigned short type; };
template <> struct _BwBuiltinOf<4, true> { typedef int type; };
template <> struct _BwBuiltinOf<4, false> { typedef unsigned type; };

template <int _BwW, bool _BwS> struct ap_bit_ref;
template <int _BwW, bool _BwS> struct ap_range_ref;
template <int _BwW> struct ap_concat_ref;

template <int _BwW, bool _BwS> struct ap_int_base {
  typedef void _BwOpen;
  static constexpr int width = _BwW;
  static constexpr bool sign_flag = _BwS;
  alignas(_BwMin(_BwBytes(_BwW), 512)) unsigned char _BwStore[_BwBytes(_BwW)];

  ap_int_base();
  constexpr explicit ap_int_base(_BwLiteral) : _BwStore{} {}
  template <class _BwT> ap_int_base(const _BwT &);
  ap_int_base(const char *, signed char);

  operator typename _BwBuiltinOf<_BwBytes(_BwW), _BwS>::type() const volatile;
  int to_int() const volatile;
  unsigned to_uint() const volatile;
  long to_long() const volatile;
  unsigned long to_ulong() const volatile;
  long long to_int64() const volatile;
  unsigned long long to_uint64() const volatile;
  bool to_bool() const volatile;
  char to_char() const volatile;
  signed char to_schar() const volatile;
  unsigned char to_uchar() const volatile;
  short to_short() const volatile;
  unsigned short to_ushort() const volatile;
  float to_float() const volatile;
  double to_double() const volatile;
  float to_half() const volatile;
  struct _BwText { operator const char *() const; const char *c_str() const; unsigned long length() const; };
  _BwText to_string(signed char = 2, bool = false) const;

  int length() const volatile;
  bool iszero() const;
  bool is_zero() const;
  bool sign() const;
  int countLeadingZeros() const;
  int countTrailingZeros() const;
  int countBits() const;
  int popcount() const;
  bool and_reduce() const;
  bool nand_reduce() const;
  bool or_reduce() const;
  bool nor_reduce() const;
  bool xor_reduce() const;
  bool xnor_reduce() const;

  ap_bit_ref<_BwW, _BwS> operator[](int);
  bool operator[](int) const volatile;
  ap_bit_ref<_BwW, _BwS> bit(int);
  bool bit(int) const volatile;
  bool get_bit(int) const volatile;
  bool test(int) const volatile;
  void set(int);
  void set();
  void set(int, bool);
  void set_bit(int, bool);
  void set_bit_v(int, bool);
  void clear(int);
  void clear();
  void invert(int);
  void invert();
  void b_not();
  void reverse();
  void lrotate(int);
  void rrotate(int);
  ap_range_ref<_BwW, _BwS> range(int, int) const volatile;
  ap_range_ref<_BwW, _BwS> range() const volatile;
  ap_range_ref<_BwW, _BwS> operator()(int, int) const volatile;
  template <int _BwV, bool _BwR> ap_concat_ref<_BwW + _BwV> concat(const ap_int_base<_BwV, _BwR> &) const;

  template <class _BwT> ap_int_base &operator=(const _BwT &);
  ap_int_base &operator++();
  ap_int_base &operator--();
  _BwInteger<_BwW, _BwS> operator++(int);
  _BwInteger<_BwW, _BwS> operator--(int);
  _BwInteger<_BwW, _BwS> operator+() const;
  _BwInteger<_BwW + 1, true> operator-() const;
  _BwInteger<_BwW + !_BwS, true> operator~() const;
  bool operator!() const;
};

template <int _BwW> struct ap_int : ap_int_base<_BwW, true> {
  using ap_int_base<_BwW, true>::operator=;
  ap_int();
  constexpr explicit ap_int(_BwLiteral _BwX) : ap_int_base<_BwW, true>(_BwX) {}
  ap_int(const ap_int &) = default;
  template <class _BwT> ap_int(const _BwT &);
  ap_int(const char *, signed char);
  ap_int &operator=(const ap_int &) = default;
  template <class _BwT> ap_int &operator=(const _BwT &);
  template <class _BwT> void operator=(const _BwT &) volatile;
};
template <int _BwW> struct ap_uint : ap_int_base<_BwW, false> {
  using ap_int_base<_BwW, false>::operator=;
  ap_uint();
  constexpr explicit ap_uint(_BwLiteral _BwX) : ap_int_base<_BwW, false>(_BwX) {}
  ap_uint(const ap_uint &) = default;
  template <class _BwT> ap_uint(const _BwT &);
  ap_uint(const char *, signed char);
  ap_uint &operator=(const ap_uint &) = default;
  template <class _BwT> ap_uint &operator=(const _BwT &);
  template <class _BwT> void operator=(const _BwT &) volatile;
};

// Parts of an integer: they read as unsigned integers and can be assigned, also as temporaries.
template <int _BwW, bool _BwS> struct ap_bit_ref {
  operator bool() const;
  bool to_bool() const;
  int to_int() const;
  bool get() const;
  bool operator~() const;
  int length() const;
  template <class _BwT> ap_bit_ref &operator=(const _BwT &);
  ap_bit_ref(const ap_bit_ref &) = default;
  ap_bit_ref &operator=(const ap_bit_ref &);
  template <class _BwT> ap_bit_ref &operator|=(const _BwT &);
  template <class _BwT> ap_bit_ref &operator&=(const _BwT &);
  template <class _BwT> ap_bit_ref &operator^=(const _BwT &);
  void set(bool);
  ap_int_base<1, false> *_BwUnder() const;
  template <int _BwV, bool _BwR> ap_concat_ref<1 + _BwV> concat(const ap_int_base<_BwV, _BwR> &) const;
};
template <int _BwW, bool _BwS> struct ap_range_ref : ap_int_base<_BwW, false> {
  ap_range_ref(const ap_range_ref &) = default;
  ap_range_ref &operator=(const ap_range_ref &);
  template <class _BwT> ap_range_ref &operator=(const _BwT &);
  ap_uint<_BwW> get() const;
  template <class _BwT> void set(const _BwT &);
  int length() const;
};
template <int _BwW> struct ap_concat_ref : ap_int_base<_BwW, false> {
  ap_concat_ref(const ap_concat_ref &) = default;
  ap_concat_ref &operator=(const ap_concat_ref &);
  template <class _BwT> ap_concat_ref &operator=(const _BwT &);
  ap_uint<_BwW> get() const;
};

// What a built-in number counts as beside an arbitrary-precision integer.
template <class _BwT> struct _BwBitsOf {
  static constexpr int width = __is_same(_BwT, bool) ? 1 : int(sizeof(_BwT)) * 8;
  static constexpr bool sign_flag = _BwT(-1) < _BwT(1) && !__is_same(_BwT, bool);
};
template <class _BwT> using _BwWhole = _BwEnable<_BwIsNumber<_BwT>::value && !__is_floating_point(_BwT), _BwBitsOf<_BwT>>;
template <class _BwT> using _BwFloat = _BwEnable<__is_floating_point(_BwT), _BwT>;

// Widths and signs of results: wide enough to lose nothing.
template <int _BwW, bool _BwS, int _BwV, bool _BwR> struct _BwResult {
  static constexpr bool _BwAny = _BwS || _BwR;
  static constexpr int _BwWide = _BwMax(_BwW + (_BwR && !_BwS), _BwV + (_BwS && !_BwR));
  typedef _BwInteger<_BwWide + 1, _BwAny> plus;
  typedef _BwInteger<_BwWide + 1, true> minus;
  typedef _BwInteger<_BwW + _BwV, _BwAny> mult;
  typedef _BwInteger<_BwW + _BwR, _BwAny> div;
  typedef _BwInteger<_BwMin(_BwW, _BwV + (!_BwR && _BwS)), _BwS> mod;
  typedef _BwInteger<_BwWide, _BwAny> logic;
};

#define _BwBinary(_BwOp, _BwKind)                                                                                                 \
  template <int _BwW, bool _BwS, int _BwV, bool _BwR>                                                                             \
  typename _BwResult<_BwW, _BwS, _BwV, _BwR>::_BwKind operator _BwOp(const ap_int_base<_BwW, _BwS> &, const ap_int_base<_BwV, _BwR> &);       \
  template <int _BwW, bool _BwS, class _BwT, class _BwB = _BwWhole<_BwT>>                                                         \
  typename _BwResult<_BwW, _BwS, _BwB::width, _BwB::sign_flag>::_BwKind operator _BwOp(const ap_int_base<_BwW, _BwS> &, _BwT);                \
  template <int _BwW, bool _BwS, class _BwT, class _BwB = _BwWhole<_BwT>>                                                         \
  typename _BwResult<_BwB::width, _BwB::sign_flag, _BwW, _BwS>::_BwKind operator _BwOp(_BwT, const ap_int_base<_BwW, _BwS> &);
#define _BwWithFloat(_BwOp)                                                                                                       \
  template <int _BwW, bool _BwS, class _BwT> _BwFloat<_BwT> operator _BwOp(const ap_int_base<_BwW, _BwS> &, _BwT);                  \
  template <int _BwW, bool _BwS, class _BwT> _BwFloat<_BwT> operator _BwOp(_BwT, const ap_int_base<_BwW, _BwS> &);
#define _BwCompare(_BwOp)                                                                                                         \
  template <int _BwW, bool _BwS, int _BwV, bool _BwR>                                                                             \
  bool operator _BwOp(const ap_int_base<_BwW, _BwS> &, const ap_int_base<_BwV, _BwR> &);                                              \
  template <int _BwW, bool _BwS, class _BwT, class = _BwEnable<_BwIsNumber<_BwT>::value>>                                         \
  bool operator _BwOp(const ap_int_base<_BwW, _BwS> &, _BwT);                                                                       \
  template <int _BwW, bool _BwS, class _BwT, class = _BwEnable<_BwIsNumber<_BwT>::value>>                                         \
  bool operator _BwOp(_BwT, const ap_int_base<_BwW, _BwS> &);
#define _BwShift(_BwOp)                                                                                                           \
  template <int _BwW, bool _BwS, int _BwV, bool _BwR>                                                                             \
  _BwInteger<_BwW, _BwS> operator _BwOp(const ap_int_base<_BwW, _BwS> &, const ap_int_base<_BwV, _BwR> &);                          \
  template <int _BwW, bool _BwS, class _BwT, class = _BwWhole<_BwT>>                                                              \
  _BwInteger<_BwW, _BwS> operator _BwOp(const ap_int_base<_BwW, _BwS> &, _BwT);                                                     \
  template <int _BwW, bool _BwS, class _BwT, class = _BwWhole<_BwT>> _BwT operator _BwOp(_BwT, const ap_int_base<_BwW, _BwS> &);
#define _BwUpdate(_BwOp)                                                                                                          \
  template <int _BwW, class _BwT> ap_int<_BwW> &operator _BwOp(ap_int<_BwW> &, const _BwT &);                                     \
  template <int _BwW, class _BwT> ap_uint<_BwW> &operator _BwOp(ap_uint<_BwW> &, const _BwT &);                                   \
  template <int _BwW, bool _BwS, class _BwT> ap_range_ref<_BwW, _BwS> &operator _BwOp(ap_range_ref<_BwW, _BwS> &&, const _BwT &); \
  template <int _BwW, bool _BwS, class _BwT> ap_int_base<_BwW, _BwS> &operator _BwOp(ap_int_base<_BwW, _BwS> &, const _BwT &);        \
  template <class _BwN, int _BwW, bool _BwS, class = _BwEnable<__is_arithmetic(_BwN)>>                                            \
  _BwN &operator _BwOp(_BwN &, const ap_int_base<_BwW, _BwS> &);
_BwBinary(+, plus) _BwBinary(-, minus) _BwBinary(*, mult) _BwBinary(/, div) _BwBinary(%, mod)
_BwBinary(&, logic) _BwBinary(|, logic) _BwBinary(^, logic)
_BwWithFloat(+) _BwWithFloat(-) _BwWithFloat(*) _BwWithFloat(/)
_BwCompare(==) _BwCompare(!=) _BwCompare(<) _BwCompare(<=) _BwCompare(>) _BwCompare(>=)
_BwShift(<<) _BwShift(>>)
_BwUpdate(+=) _BwUpdate(-=) _BwUpdate(*=) _BwUpdate(/=) _BwUpdate(%=) _BwUpdate(&=) _BwUpdate(|=) _BwUpdate(^=) _BwUpdate(<<=) _BwUpdate(>>=)
#undef _BwBinary
#undef _BwWithFloat
#undef _BwCompare
#undef _BwShift
#undef _BwUpdate

// Concatenation, high part first.
template <int _BwW, bool _BwS, int _BwV, bool _BwR>
ap_concat_ref<_BwW + _BwV> operator,(const ap_int_base<_BwW, _BwS> &, const ap_int_base<_BwV, _BwR> &);
template <int _BwW, bool _BwS, class _BwT, class _BwB = _BwWhole<_BwT>>
ap_concat_ref<_BwW + _BwB::width> operator,(const ap_int_base<_BwW, _BwS> &, _BwT);
template <int _BwW, bool _BwS, class _BwT, class _BwB = _BwWhole<_BwT>>
ap_concat_ref<_BwW + _BwB::width> operator,(_BwT, const ap_int_base<_BwW, _BwS> &);
template <int _BwW, bool _BwS, int _BwV, bool _BwR>
ap_concat_ref<_BwW + 1> operator,(const ap_int_base<_BwW, _BwS> &, const ap_bit_ref<_BwV, _BwR> &);
template <int _BwW, bool _BwS, int _BwV, bool _BwR>
ap_concat_ref<_BwV + 1> operator,(const ap_bit_ref<_BwW, _BwS> &, const ap_int_base<_BwV, _BwR> &);
template <int _BwW, bool _BwS, int _BwV, bool _BwR>
ap_concat_ref<2> operator,(const ap_bit_ref<_BwW, _BwS> &, const ap_bit_ref<_BwV, _BwR> &);
