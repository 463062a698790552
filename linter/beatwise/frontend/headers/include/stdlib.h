#pragma once
#include <_bw/traits.h>
#include <stddef.h>
#define EXIT_SUCCESS 0
#define EXIT_FAILURE 1
#define RAND_MAX 2147483647
typedef unsigned char u_int8_t;
typedef unsigned short ushort, u_int16_t;
typedef unsigned int uint, u_int32_t;
typedef unsigned long ulong, u_int64_t;
typedef struct { int quot, rem; } div_t;
typedef struct { long quot, rem; } ldiv_t;
typedef struct { long long quot, rem; } lldiv_t;
void *malloc(size_t _BwBytes);
void *calloc(size_t _BwCount, size_t _BwBytes);
void *realloc(void *_BwOld, size_t _BwBytes);
void *alloca(size_t _BwBytes);
void *aligned_alloc(size_t _BwAlignment, size_t _BwBytes);
int posix_memalign(void **_BwTo, size_t _BwAlignment, size_t _BwBytes);
void free(void *_BwOld);
[[noreturn]] void exit(int _BwStatus);
[[noreturn]] void abort();
int atexit(void (*_BwFunction)());
int system(const char *_BwCommand);
char *getenv(const char *_BwName);
int setenv(const char *_BwName, const char *_BwText, int _BwOver);
int rand();
void srand(unsigned _BwSeed);
long random();
void srandom(unsigned _BwSeed);
double drand48();
void srand48(long _BwSeed);
int rand_r(unsigned *_BwSeed);
int atoi(const char *_BwText);
long atol(const char *_BwText);
long long atoll(const char *_BwText);
double atof(const char *_BwText);
long strtol(const char *_BwText, char **_BwEnd, int _BwRadix);
unsigned long strtoul(const char *_BwText, char **_BwEnd, int _BwRadix);
long long strtoll(const char *_BwText, char **_BwEnd, int _BwRadix);
unsigned long long strtoull(const char *_BwText, char **_BwEnd, int _BwRadix);
double strtod(const char *_BwText, char **_BwEnd);
float strtof(const char *_BwText, char **_BwEnd);
void qsort(void *_BwIn, size_t _BwCount, size_t _BwBytes, int (*_BwOrder)(const void *, const void *));
void *bsearch(const void *_BwKey, const void *_BwIn, size_t _BwCount, size_t _BwBytes,
              int (*_BwOrder)(const void *, const void *));
int abs(int _BwX);
long abs(long _BwX);
long long abs(long long _BwX);
float abs(float _BwX);
double abs(double _BwX);
long double abs(long double _BwX);
template <class _BwT> _BwEnable<_BwIsOpen<_BwT>::value, _BwT> abs(const _BwT &);
long labs(long _BwX);
long long llabs(long long _BwX);
div_t div(int _BwA, int _BwB);
ldiv_t div(long _BwA, long _BwB);
ldiv_t ldiv(long _BwA, long _BwB);
lldiv_t lldiv(long long _BwA, long long _BwB);
namespace std {
using ::malloc; using ::calloc; using ::realloc; using ::aligned_alloc; using ::free; using ::exit; using ::abort; using ::atexit;
using ::system; using ::getenv; using ::rand; using ::srand; using ::atoi; using ::atol; using ::atoll; using ::atof;
using ::strtol; using ::strtoul; using ::strtoll; using ::strtoull; using ::strtod; using ::strtof; using ::qsort; using ::bsearch;
using ::abs; using ::labs; using ::llabs; using ::div; using ::div_t; using ::ldiv_t; using ::lldiv_t;
}
