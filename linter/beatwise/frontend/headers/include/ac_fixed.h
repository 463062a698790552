#pragma once
#include <_bw/fixed.h>
#include <ac_int.h>
enum ac_q_mode { AC_TRN, AC_RND, AC_TRN_ZERO, AC_RND_ZERO, AC_RND_INF, AC_RND_MIN_INF, AC_RND_CONV, AC_RND_CONV_ODD };
enum ac_o_mode { AC_WRAP, AC_SAT, AC_SAT_ZERO, AC_SAT_SYM };
template <int _BwW, int _BwI, bool _BwS = true, ac_q_mode _BwQ = AC_TRN, ac_o_mode _BwO = AC_WRAP> struct ac_fixed : ap_fixed_base<_BwW, _BwI, _BwS> {
  static constexpr int i_width = _BwI;
  static constexpr bool sign = _BwS;
  ac_fixed();
  constexpr explicit ac_fixed(_BwLiteral _BwX) : ap_fixed_base<_BwW, _BwI, _BwS>(_BwX) {}
  ac_fixed(const ac_fixed &) = default;
  template <class _BwT> ac_fixed(const _BwT &);
  ac_fixed &operator=(const ac_fixed &) = default;
  template <class _BwT> ac_fixed &operator=(const _BwT &);
  template <int _BwV> ac_int<_BwV, _BwS> slc(int) const;
  template <class _BwT> ac_fixed &set_slc(int, const _BwT &);
  ac_int<_BwI, _BwS> to_ac_int() const;
};
#define _BwUpdate(_BwOp)                                                                      \
  template <int _BwW, int _BwI, bool _BwS, ac_q_mode _BwQ, ac_o_mode _BwO, class _BwT>        \
  ac_fixed<_BwW, _BwI, _BwS, _BwQ, _BwO> &operator _BwOp(ac_fixed<_BwW, _BwI, _BwS, _BwQ, _BwO> &, const _BwT &);
_BwUpdate(+=) _BwUpdate(-=) _BwUpdate(*=) _BwUpdate(/=) _BwUpdate(<<=) _BwUpdate(>>=)
#undef _BwUpdate
