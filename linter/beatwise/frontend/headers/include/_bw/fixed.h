// Fixed-point numbers: W bits, I of them before the point. In memory they take what an integer of W bits takes.
#pragma once
#include <_bw/integer.h>

enum ap_q_mode { AP_RND, AP_RND_ZERO, AP_RND_MIN_INF, AP_RND_INF, AP_RND_CONV, AP_TRN, AP_TRN_ZERO };
enum ap_o_mode { AP_SAT, AP_SAT_ZERO, AP_SAT_SYM, AP_WRAP, AP_WRAP_SM };

template <int _BwW, int _BwI, ap_q_mode _BwQ = AP_TRN, ap_o_mode _BwO = AP_WRAP, int _BwN = 0> struct ap_fixed;
template <int _BwW, int _BwI, ap_q_mode _BwQ = AP_TRN, ap_o_mode _BwO = AP_WRAP, int _BwN = 0> struct ap_ufixed;
template <int _BwW, int _BwI, bool _BwS> using _BwFixed = _BwChoose<_BwS, ap_fixed<_BwW, _BwI>, ap_ufixed<_BwW, _BwI>>;

template <int _BwW, int _BwI, bool _BwS> struct ap_fixed_base {
  typedef void _BwOpen;
  static constexpr int width = _BwW;
  static constexpr int iwidth = _BwI;
  static constexpr bool sign_flag = _BwS;
  alignas(_BwMin(_BwBytes(_BwW), 512)) unsigned char _BwStore[_BwBytes(_BwW)];

  ap_fixed_base();
  constexpr explicit ap_fixed_base(_BwLiteral) : _BwStore{} {}
  template <class _BwT> ap_fixed_base(const _BwT &);
  template <class _BwT, class = _BwEnable<__is_arithmetic(_BwT)>> operator _BwT() const;
  int to_int() const;
  unsigned to_uint() const;
  long to_long() const;
  unsigned long to_ulong() const;
  long long to_int64() const;
  unsigned long long to_uint64() const;
  float to_float() const;
  double to_double() const;
  float to_half() const;
  ap_int<_BwMax(_BwI, 1)> to_ap_int() const;
  _BwInteger<_BwMax(_BwI, 1), _BwS> to_ap_int_base() const;
  typename ap_int_base<_BwW, _BwS>::_BwText to_string(signed char = 2) const;
  int length() const;
  bool is_neg() const;
  bool is_zero() const;
  ap_bit_ref<_BwW, _BwS> operator[](int);
  bool operator[](int) const;
  ap_bit_ref<_BwW, _BwS> bit(int);
  bool get_bit(int) const;
  void set_bit(int, bool);
  ap_range_ref<_BwW, _BwS> range(int, int) const;
  ap_range_ref<_BwW, _BwS> range() const;
  ap_range_ref<_BwW, _BwS> operator()(int, int) const;
  template <class _BwT> ap_fixed_base &operator=(const _BwT &);
  ap_fixed_base &operator++();
  ap_fixed_base &operator--();
  _BwFixed<_BwW, _BwI, _BwS> operator++(int);
  _BwFixed<_BwW, _BwI, _BwS> operator--(int);
  _BwFixed<_BwW, _BwI, _BwS> operator+() const;
  _BwFixed<_BwW + 1, _BwI + 1, true> operator-() const;
  _BwFixed<_BwW, _BwI, _BwS> operator~() const;
  bool operator!() const;
};
#define _BwNumber(_BwName, _BwS)                                                                    \
  template <int _BwW, int _BwI, ap_q_mode _BwQ, ap_o_mode _BwO, int _BwN>                           \
  struct _BwName : ap_fixed_base<_BwW, _BwI, _BwS> {                                                \
    static constexpr ap_q_mode qmode = _BwQ;                                                        \
    static constexpr ap_o_mode omode = _BwO;                                                        \
    _BwName();                                                                            \
    constexpr explicit _BwName(_BwLiteral _BwX) : ap_fixed_base<_BwW, _BwI, _BwS>(_BwX) {}          \
    _BwName(const _BwName &) = default;                                                             \
    template <class _BwT> _BwName(const _BwT &);                                                    \
    _BwName &operator=(const _BwName &) = default;                                                  \
    template <class _BwT> _BwName &operator=(const _BwT &);                                         \
    template <class _BwT> void operator=(const _BwT &) volatile;                                    \
  };
_BwNumber(ap_fixed, true) _BwNumber(ap_ufixed, false)
#undef _BwNumber

// What another number counts as beside a fixed-point one.
template <class _BwT> struct _BwFixedOf {
  static constexpr int width = _BwBitsOf<_BwT>::width, iwidth = width;
  static constexpr bool sign_flag = _BwBitsOf<_BwT>::sign_flag;
};
template <int _BwW, bool _BwS> struct _BwFixedOf<ap_int_base<_BwW, _BwS>> {
  static constexpr int width = _BwW, iwidth = _BwW;
  static constexpr bool sign_flag = _BwS;
};
template <int _BwW, int _BwI, bool _BwS> struct _BwFixedOf<ap_fixed_base<_BwW, _BwI, _BwS>> : ap_fixed_base<_BwW, _BwI, _BwS> {};
template <class _BwA, class _BwB> struct _BwFixedResult {
  static constexpr bool _BwAny = _BwA::sign_flag || _BwB::sign_flag;
  static constexpr int _BwPoint = _BwMax(_BwA::iwidth + (_BwB::sign_flag && !_BwA::sign_flag), _BwB::iwidth + (_BwA::sign_flag && !_BwB::sign_flag));
  static constexpr int _BwAfter = _BwMax(_BwA::width - _BwA::iwidth, _BwB::width - _BwB::iwidth);
  typedef _BwFixed<_BwPoint + _BwAfter + 1, _BwPoint + 1, _BwAny> plus;
  typedef _BwFixed<_BwPoint + _BwAfter + 1, _BwPoint + 1, true> minus;
  typedef _BwFixed<_BwA::width + _BwB::width, _BwA::iwidth + _BwB::iwidth, _BwAny> mult;
  typedef _BwFixed<_BwA::width + _BwMax(_BwB::width - _BwB::iwidth, 0) + _BwB::sign_flag, _BwA::iwidth + _BwB::width - _BwB::iwidth + _BwB::sign_flag, _BwAny> div;
  typedef _BwFixed<_BwMax(_BwPoint + _BwAfter, 1), _BwPoint, _BwAny> logic;
};
template <class _BwT, class _BwF, class _BwWide> using _BwBeside = _BwEnable<_BwIsNumber<_BwT>::value, _BwWide>;
template <class _BwA, class _BwB, class _BwT, bool = __is_floating_point(_BwT)> struct _BwMixed : _BwFixedResult<_BwA, _BwB> {};
template <class _BwA, class _BwB, class _BwT> struct _BwMixed<_BwA, _BwB, _BwT, true> {
  typedef _BwT plus, minus, mult, div, logic;
};

#define _BwP int _BwW, int _BwI, bool _BwS
#define _BwX ap_fixed_base<_BwW, _BwI, _BwS>
#define _BwBinary(_BwOp, _BwKind)                                                                                                         \
  template <_BwP, int _BwV, int _BwJ, bool _BwR>                                                                                          \
  typename _BwFixedResult<_BwX, ap_fixed_base<_BwV, _BwJ, _BwR>>::_BwKind operator _BwOp(const _BwX &, const ap_fixed_base<_BwV, _BwJ, _BwR> &); \
  template <_BwP, int _BwV, bool _BwR>                                                                                                    \
  typename _BwFixedResult<_BwX, _BwFixedOf<ap_int_base<_BwV, _BwR>>>::_BwKind operator _BwOp(const _BwX &, const ap_int_base<_BwV, _BwR> &);     \
  template <_BwP, int _BwV, bool _BwR>                                                                                                    \
  typename _BwFixedResult<_BwFixedOf<ap_int_base<_BwV, _BwR>>, _BwX>::_BwKind operator _BwOp(const ap_int_base<_BwV, _BwR> &, const _BwX &);     \
  template <_BwP, class _BwT, class = _BwEnable<_BwIsNumber<_BwT>::value>>                                                                \
  typename _BwMixed<_BwX, _BwFixedOf<_BwT>, _BwT>::_BwKind operator _BwOp(const _BwX &, _BwT);                                            \
  template <_BwP, class _BwT, class = _BwEnable<_BwIsNumber<_BwT>::value>>                                                                \
  typename _BwMixed<_BwFixedOf<_BwT>, _BwX, _BwT>::_BwKind operator _BwOp(_BwT, const _BwX &);
#define _BwCompare(_BwOp)                                                                                                                 \
  template <_BwP, int _BwV, int _BwJ, bool _BwR> bool operator _BwOp(const _BwX &, const ap_fixed_base<_BwV, _BwJ, _BwR> &);              \
  template <_BwP, int _BwV, bool _BwR> bool operator _BwOp(const _BwX &, const ap_int_base<_BwV, _BwR> &);                                  \
  template <_BwP, int _BwV, bool _BwR> bool operator _BwOp(const ap_int_base<_BwV, _BwR> &, const _BwX &);                                  \
  template <_BwP, class _BwT, class = _BwEnable<_BwIsNumber<_BwT>::value>> bool operator _BwOp(const _BwX &, _BwT);                       \
  template <_BwP, class _BwT, class = _BwEnable<_BwIsNumber<_BwT>::value>> bool operator _BwOp(_BwT, const _BwX &);
#define _BwShift(_BwOp)                                                                                                                   \
  template <_BwP, int _BwV, bool _BwR> _BwFixed<_BwW, _BwI, _BwS> operator _BwOp(const _BwX &, const ap_int_base<_BwV, _BwR> &);            \
  template <_BwP> _BwFixed<_BwW, _BwI, _BwS> operator _BwOp(const _BwX &, int);
#define _BwUpdate(_BwOp)                                                                                                                  \
  template <int _BwW, int _BwI, ap_q_mode _BwQ, ap_o_mode _BwO, int _BwN, class _BwT>                                                     \
  ap_fixed<_BwW, _BwI, _BwQ, _BwO, _BwN> &operator _BwOp(ap_fixed<_BwW, _BwI, _BwQ, _BwO, _BwN> &, const _BwT &);                         \
  template <int _BwW, int _BwI, ap_q_mode _BwQ, ap_o_mode _BwO, int _BwN, class _BwT>                                                     \
  ap_ufixed<_BwW, _BwI, _BwQ, _BwO, _BwN> &operator _BwOp(ap_ufixed<_BwW, _BwI, _BwQ, _BwO, _BwN> &, const _BwT &);                       \
  template <class _BwT, _BwP, class = _BwEnable<__is_arithmetic(_BwT)>> _BwT &operator _BwOp(_BwT &, const _BwX &);
_BwBinary(+, plus) _BwBinary(-, minus) _BwBinary(*, mult) _BwBinary(/, div) _BwBinary(&, logic) _BwBinary(|, logic) _BwBinary(^, logic)
_BwCompare(==) _BwCompare(!=) _BwCompare(<) _BwCompare(<=) _BwCompare(>) _BwCompare(>=)
_BwShift(<<) _BwShift(>>)
_BwUpdate(+=) _BwUpdate(-=) _BwUpdate(*=) _BwUpdate(/=) _BwUpdate(<<=) _BwUpdate(>>=) _BwUpdate(&=) _BwUpdate(|=) _BwUpdate(^=)
#undef _BwP
#undef _BwX
#undef _BwBinary
#undef _BwCompare
#undef _BwShift
#undef _BwUpdate
