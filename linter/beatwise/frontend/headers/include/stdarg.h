#pragma once
typedef __builtin_va_list va_list;
#define va_start(...) __builtin_va_start(__VA_ARGS__)
#define va_end(_BwList) __builtin_va_end(_BwList)
#define va_arg(_BwList, _BwType) __builtin_va_arg(_BwList, _BwType)
#define va_copy(_BwTo, _BwFrom) __builtin_va_copy(_BwTo, _BwFrom)
namespace std { using ::va_list; }
