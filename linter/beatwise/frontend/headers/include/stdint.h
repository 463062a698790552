#pragma once
#include <stddef.h>
typedef signed char int8_t;
typedef unsigned char uint8_t;
typedef signed short int16_t;
typedef unsigned short uint16_t;
typedef signed int int32_t;
typedef unsigned int uint32_t;
typedef signed long int64_t;
typedef unsigned long uint64_t;
typedef signed char int_least8_t;
typedef unsigned char uint_least8_t;
typedef signed short int_least16_t;
typedef unsigned short uint_least16_t;
typedef signed int int_least32_t;
typedef unsigned int uint_least32_t;
typedef signed long int_least64_t;
typedef unsigned long uint_least64_t;
typedef signed char int_fast8_t;
typedef unsigned char uint_fast8_t;
typedef signed long int_fast16_t;
typedef unsigned long uint_fast16_t;
typedef signed long int_fast32_t;
typedef unsigned long uint_fast32_t;
typedef signed long int_fast64_t;
typedef unsigned long uint_fast64_t;
typedef signed long intptr_t;
typedef unsigned long uintptr_t;
typedef signed long intmax_t;
typedef unsigned long uintmax_t;
#define INT8_MAX 127
#define INT8_MIN (-127 - 1)
#define UINT8_MAX 255
#define INT16_MAX 32767
#define INT16_MIN (-32767 - 1)
#define UINT16_MAX 65535
#define INT32_MAX 2147483647
#define INT32_MIN (-2147483647 - 1)
#define UINT32_MAX 4294967295U
#define INT64_MAX 9223372036854775807L
#define INT64_MIN (-9223372036854775807L - 1)
#define UINT64_MAX 18446744073709551615UL
#define INTMAX_MAX INT64_MAX
#define INTMAX_MIN INT64_MIN
#define INTPTR_MAX INT64_MAX
#define INTPTR_MIN INT64_MIN
#define UINTMAX_MAX UINT64_MAX
#define UINTPTR_MAX UINT64_MAX
#define SIZE_MAX UINT64_MAX
#define PTRDIFF_MAX INT64_MAX
#define PTRDIFF_MIN INT64_MIN
#define INT8_C(_BwX) _BwX
#define UINT8_C(_BwX) _BwX##U
#define INT16_C(_BwX) _BwX
#define UINT16_C(_BwX) _BwX##U
#define INT32_C(_BwX) _BwX
#define UINT32_C(_BwX) _BwX##U
#define INT64_C(_BwX) _BwX##L
#define UINT64_C(_BwX) _BwX##UL
#define INTMAX_C(_BwX) _BwX##L
#define UINTMAX_C(_BwX) _BwX##UL
#define PRId8 "d"
#define PRId16 "d"
#define PRId32 "d"
#define PRId64 "ld"
#define PRIi8 "i"
#define PRIi16 "i"
#define PRIi32 "i"
#define PRIi64 "li"
#define PRIu8 "u"
#define PRIu16 "u"
#define PRIu32 "u"
#define PRIu64 "lu"
#define PRIx8 "x"
#define PRIx16 "x"
#define PRIx32 "x"
#define PRIx64 "lx"
#define PRIX8 "X"
#define PRIX16 "X"
#define PRIX32 "X"
#define PRIX64 "lX"
#define SCNd32 "d"
#define SCNd64 "ld"
#define SCNu32 "u"
#define SCNu64 "lu"
#define SCNx32 "x"
#define SCNx64 "lx"
namespace std {
using ::int8_t;
using ::uint8_t;
using ::int16_t;
using ::uint16_t;
using ::int32_t;
using ::uint32_t;
using ::int64_t;
using ::uint64_t;
using ::int_least8_t;
using ::uint_least8_t;
using ::int_least16_t;
using ::uint_least16_t;
using ::int_least32_t;
using ::uint_least32_t;
using ::int_least64_t;
using ::uint_least64_t;
using ::int_fast8_t;
using ::uint_fast8_t;
using ::int_fast16_t;
using ::uint_fast16_t;
using ::int_fast32_t;
using ::uint_fast32_t;
using ::int_fast64_t;
using ::uint_fast64_t;
using ::intptr_t;
using ::uintptr_t;
using ::intmax_t;
using ::uintmax_t;
}
