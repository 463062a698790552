// Each function exists for float, double and long double, and takes integers as double, as the standard has it.
#pragma once
#include <_bw/traits.h>
#include <stdlib.h>
typedef float float_t;
typedef double double_t;
#define M_E 2.71828182845904523536
#define M_LOG2E 1.44269504088896340736
#define M_LOG10E 0.43429448190325182765
#define M_LN2 0.69314718055994530942
#define M_LN10 2.30258509299404568402
#define M_PI 3.14159265358979323846
#define M_PI_2 1.57079632679489661923
#define M_PI_4 0.78539816339744830962
#define M_1_PI 0.31830988618379067154
#define M_2_PI 0.63661977236758134308
#define M_2_SQRTPI 1.12837916709551257390
#define M_SQRT2 1.41421356237309504880
#define M_SQRT1_2 0.70710678118654752440
#define HUGE_VAL __builtin_huge_val()
#define HUGE_VALF __builtin_huge_valf()
#define INFINITY __builtin_inff()
#define NAN __builtin_nanf("")
#define FP_NAN 0
#define FP_INFINITE 1
#define FP_ZERO 2
#define FP_SUBNORMAL 3
#define FP_NORMAL 4
template <class _BwT> using _BwIntegerOnly = _BwEnable<__is_integral(_BwT) || _BwIsOpen<_BwT>::value, double>;
template <class _BwT> struct _BwTakesReal { static constexpr bool value = __is_arithmetic(_BwT) || _BwIsOpen<_BwT>::value; };
template <class _BwA, class _BwB> using _BwReal =
    _BwEnable<_BwTakesReal<_BwA>::value && _BwTakesReal<_BwB>::value && !__is_same(_BwA, _BwB), double>;
#define _BwOne(_BwName) \
  float _BwName(float); double _BwName(double); long double _BwName(long double); \
  template <class _BwT> _BwIntegerOnly<_BwT> _BwName(_BwT);
#define _BwTwo(_BwName) \
  float _BwName(float, float); double _BwName(double, double); long double _BwName(long double, long double); \
  template <class _BwA, class _BwB> _BwReal<_BwA, _BwB> _BwName(_BwA, _BwB); \
  template <class _BwA> _BwIntegerOnly<_BwA> _BwName(_BwA, _BwA);
#define _BwTest(_BwName) template <class _BwT> _BwEnable<_BwTakesReal<_BwT>::value, bool> _BwName(_BwT);
_BwOne(sqrt)
_BwOne(cbrt)
_BwOne(exp)
_BwOne(exp2)
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
_BwTwo(pow)
_BwTwo(atan2)
_BwTwo(fmod)
_BwTwo(remainder)
_BwTwo(fmin)
_BwTwo(fmax)
_BwTwo(fdim)
_BwTwo(hypot)
_BwTwo(copysign)
_BwTwo(nextafter)
_BwTest(isnan)
_BwTest(isinf)
_BwTest(isfinite)
_BwTest(isnormal)
_BwTest(signbit)
#undef _BwOne
#undef _BwTwo
#undef _BwTest
float ldexp(float, int);
double ldexp(double, int);
long double ldexp(long double, int);
float scalbn(float, int);
double scalbn(double, int);
long double scalbn(long double, int);
float frexp(float, int *);
double frexp(double, int *);
long double frexp(long double, int *);
float modf(float, float *);
double modf(double, double *);
long double modf(long double, long double *);
float fma(float, float, float);
double fma(double, double, double);
long double fma(long double, long double, long double);
int ilogb(float);
int ilogb(double);
int ilogb(long double);
long lround(float);
long lround(double);
long lround(long double);
long long llround(float);
long long llround(double);
long long llround(long double);
long lrint(float);
long lrint(double);
long lrint(long double);
long long llrint(float);
long long llrint(double);
long long llrint(long double);
float sqrtf(float);
float cbrtf(float);
float expf(float);
float exp2f(float);
float expm1f(float);
float logf(float);
float log2f(float);
float log10f(float);
float log1pf(float);
float logbf(float);
float sinf(float);
float cosf(float);
float tanf(float);
float asinf(float);
float acosf(float);
float atanf(float);
float sinhf(float);
float coshf(float);
float tanhf(float);
float asinhf(float);
float acoshf(float);
float atanhf(float);
float floorf(float);
float ceilf(float);
float roundf(float);
float truncf(float);
float rintf(float);
float nearbyintf(float);
float fabsf(float);
float erff(float);
float erfcf(float);
float tgammaf(float);
float lgammaf(float);
float powf(float, float);
float atan2f(float, float);
float fmodf(float, float);
float remainderf(float, float);
float fminf(float, float);
float fmaxf(float, float);
float fdimf(float, float);
float hypotf(float, float);
float copysignf(float, float);
float nextafterf(float, float);
float ldexpf(float, int);
float frexpf(float, int *);
float modff(float, float *);
float fmaf(float, float, float);
long lroundf(float);
long lrintf(float);
void sincos(double, double *, double *);
void sincosf(float, float *, float *);
namespace std {
using ::sqrt; using ::cbrt; using ::exp; using ::exp2; using ::expm1; using ::log; using ::log2; using ::log10; using ::log1p; using ::logb;
using ::sin; using ::cos; using ::tan; using ::asin; using ::acos; using ::atan; using ::sinh; using ::cosh; using ::tanh; using ::asinh;
using ::acosh; using ::atanh; using ::floor; using ::ceil; using ::round; using ::trunc; using ::rint; using ::nearbyint; using ::fabs; using ::erf;
using ::erfc; using ::tgamma; using ::lgamma; using ::pow; using ::atan2; using ::fmod; using ::remainder; using ::fmin; using ::fmax; using ::fdim;
using ::hypot; using ::copysign; using ::nextafter; using ::isnan; using ::isinf; using ::isfinite; using ::isnormal; using ::signbit; using ::ldexp; using ::scalbn;
using ::frexp; using ::modf; using ::fma; using ::ilogb; using ::lround; using ::llround; using ::lrint; using ::llrint; using ::sqrtf; using ::cbrtf;
using ::expf; using ::exp2f; using ::expm1f; using ::logf; using ::log2f; using ::log10f; using ::log1pf; using ::logbf; using ::sinf; using ::cosf;
using ::tanf; using ::asinf; using ::acosf; using ::atanf; using ::sinhf; using ::coshf; using ::tanhf; using ::asinhf; using ::acoshf; using ::atanhf;
using ::floorf; using ::ceilf; using ::roundf; using ::truncf; using ::rintf; using ::nearbyintf; using ::fabsf; using ::erff; using ::erfcf; using ::tgammaf;
using ::lgammaf; using ::powf; using ::atan2f; using ::fmodf; using ::remainderf; using ::fminf; using ::fmaxf; using ::fdimf; using ::hypotf; using ::copysignf;
using ::nextafterf; using ::ldexpf; using ::frexpf; using ::modff; using ::fmaf; using ::lroundf; using ::lrintf;
}
