// The function set of <math.h> for fixed-point, integer and half-precision numbers too; a result has its argument's type.
#pragma once
#include <_bw/fixed.h>
#include <hls_half.h>
#include <math.h>
#include <stdint.h>
namespace hls {
template <class _BwT> struct _BwResultOf { typedef _BwChoose<__is_integral(_BwT), double, _BwT> type; };
template <int _BwW, bool _BwS> struct _BwResultOf<ap_range_ref<_BwW, _BwS>> { typedef ap_uint<_BwW> type; };
#define _BwOne(_BwName) template <class _BwT> typename _BwResultOf<_BwT>::type _BwName(const _BwT &);
#define _BwTwo(_BwName)                                         \
  template <class _BwT> _BwT _BwName(const _BwT &, const _BwT &); \
  template <class _BwA, class _BwB> _BwChoose<__is_arithmetic(_BwA) && __is_floating_point(_BwB), _BwB, _BwA> _BwName(const _BwA &, const _BwB &);
#define _BwTest(_BwName) template <class _BwT> bool _BwName(const _BwT &);
#define _BwSingle(_BwName) float _BwName(float);
_BwOne(sqrt)
_BwOne(cbrt)
_BwOne(rsqrt)
_BwOne(recip)
_BwOne(exp)
_BwOne(exp2)
_BwOne(exp10)
_BwOne(expm1)
_BwOne(log)
_BwOne(log2)
_BwOne(log10)
_BwOne(log1p)
_BwOne(logb)
_BwOne(sin)
_BwOne(cos)
_BwOne(tan)
_BwOne(asin)
_BwOne(acos)
_BwOne(atan)
_BwOne(sinh)
_BwOne(cosh)
_BwOne(tanh)
_BwOne(asinh)
_BwOne(acosh)
_BwOne(atanh)
_BwOne(sinpi)
_BwOne(cospi)
_BwOne(tanpi)
_BwOne(floor)
_BwOne(ceil)
_BwOne(round)
_BwOne(trunc)
_BwOne(rint)
_BwOne(nearbyint)
_BwOne(fabs)
_BwOne(erf)
_BwOne(erfc)
_BwOne(tgamma)
_BwOne(lgamma)
template <class _BwT> _BwT abs(const _BwT &);
_BwTwo(pow)
_BwTwo(powr)
_BwTwo(atan2)
_BwTwo(fmod)
_BwTwo(remainder)
_BwTwo(fmin)
_BwTwo(fmax)
_BwTwo(fdim)
_BwTwo(hypot)
_BwTwo(copysign)
_BwTwo(nextafter)
_BwTwo(divide)
_BwTwo(max)
_BwTwo(min)
_BwTest(isnan)
_BwTest(isinf)
_BwTest(isfinite)
_BwTest(isnormal)
_BwTest(signbit)
_BwSingle(sqrtf)
_BwSingle(cbrtf)
_BwSingle(rsqrtf)
_BwSingle(recipf)
_BwSingle(expf)
_BwSingle(exp2f)
_BwSingle(exp10f)
_BwSingle(expm1f)
_BwSingle(logf)
_BwSingle(log2f)
_BwSingle(log10f)
_BwSingle(log1pf)
_BwSingle(logbf)
_BwSingle(sinf)
_BwSingle(cosf)
_BwSingle(tanf)
_BwSingle(asinf)
_BwSingle(acosf)
_BwSingle(atanf)
_BwSingle(sinhf)
_BwSingle(coshf)
_BwSingle(tanhf)
_BwSingle(asinhf)
_BwSingle(acoshf)
_BwSingle(atanhf)
_BwSingle(sinpif)
_BwSingle(cospif)
_BwSingle(tanpif)
_BwSingle(floorf)
_BwSingle(ceilf)
_BwSingle(roundf)
_BwSingle(truncf)
_BwSingle(rintf)
_BwSingle(nearbyintf)
_BwSingle(fabsf)
_BwSingle(erff)
_BwSingle(erfcf)
_BwSingle(tgammaf)
_BwSingle(lgammaf)
float powf(float, float);
float fmodf(float, float);
float atan2f(float, float);
float fminf(float, float);
float fmaxf(float, float);
template <class _BwT> int ilogb(const _BwT &);
template <class _BwT> long lround(const _BwT &);
template <class _BwT> long long llround(const _BwT &);
template <class _BwT> long lrint(const _BwT &);
template <class _BwT> _BwT ldexp(const _BwT &, int);
template <class _BwT> _BwT frexp(const _BwT &, int *);
template <class _BwT> _BwT modf(const _BwT &, _BwT *);
template <class _BwT> _BwT fma(const _BwT &, const _BwT &, const _BwT &);
template <class _BwT> _BwT mad(const _BwT &, const _BwT &, const _BwT &);
template <class _BwT> void sincos(const _BwT &, _BwT *, _BwT *);
template <class _BwT> _BwT maxmag(const _BwT &, const _BwT &);
template <class _BwT> _BwT minmag(const _BwT &, const _BwT &);
#undef _BwOne
#undef _BwTwo
#undef _BwTest
#undef _BwSingle
}
