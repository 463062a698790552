#pragma once
typedef decltype(sizeof(0)) size_t;
typedef decltype((char *)0 - (char *)0) ptrdiff_t;
typedef decltype(nullptr) nullptr_t;
typedef struct { long long _BwA; long double _BwB; } max_align_t;
typedef long ssize_t;
#define NULL 0
#define offsetof(_BwRecord, _BwField) __builtin_offsetof(_BwRecord, _BwField)
namespace std {
using ::size_t;
using ::ptrdiff_t;
using ::nullptr_t;
using ::max_align_t;
enum class byte : unsigned char {};
}
