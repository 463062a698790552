// What the stand-ins for unknown names are made of: a value that can be built from anything, used in any way, and
// converted to anything. Everything that is stood in for is declared in namespace _BwInvented.
//
// _BwAny is what comes out of a stand-in. Its converting constructors are explicit, so that `known ? any : 1` has one
// meaning; those of a stand-in type are not, so that it can be passed, returned and initialised like a number.
#pragma once
#ifndef _BwAnyMembers
#define _BwAnyMembers
#endif
#include <_bw/traits.h>
namespace _BwInvented {
template <class _BwT, class = void> struct _BwIsAny { static constexpr bool value = false; };
template <class _BwT> struct _BwIsAny<_BwT, typename _BwT::_BwSwallows> { static constexpr bool value = true; };
// Makes a type one that a constexpr variable may have. Its other constructors must not be constexpr: the compiler would
// work out every element of a large array, which takes seconds.
enum class _BwLiteral {};
struct _BwAny;
struct _BwUsable {
  typedef void _BwOpen, _BwSwallows;
  operator long long() const;
  template <class _BwT, class = _BwEnable<!_BwIsOpen<_BwT>::value>> operator _BwT() const;
  template <class... _BwA> _BwAny operator()(_BwA &&...) const;
  template <class _BwT> _BwAny &operator[](const _BwT &) const;
  _BwAny &operator*() const;
  _BwAny &operator++();
  _BwAny operator++(int);
  _BwAny &operator--();
  _BwAny operator--(int);
  _BwAny operator-() const;
  _BwAny operator+() const;
  _BwAny operator~() const;
};
struct _BwAny : _BwUsable {
  _BwAny();
  _BwAny(const _BwAny &) = default;
  template <class... _BwA> explicit _BwAny(_BwA &&...);
  _BwAny &operator=(const _BwAny &) = default;
  template <class _BwT> _BwAny &operator=(const _BwT &);
  _BwAny operator&() const;
  _BwAny *operator->() const;
  _BwAnyMembers
};
#define _BwEither _BwEnable<_BwIsAny<_BwA>::value || _BwIsAny<_BwB>::value>
#define _BwBinary(_BwOp, _BwResult) template <class _BwA, class _BwB, class = _BwEither> _BwResult operator _BwOp(const _BwA &, const _BwB &);
#define _BwUpdate(_BwOp) template <class _BwA, class _BwB, class = _BwEither> _BwA &operator _BwOp(_BwA &, const _BwB &);
_BwBinary(+, _BwAny) _BwBinary(-, _BwAny) _BwBinary(*, _BwAny) _BwBinary(/, _BwAny) _BwBinary(%, _BwAny) _BwBinary(&, _BwAny) _BwBinary(|, _BwAny)
_BwBinary(^, _BwAny) _BwBinary(>>, _BwAny)
_BwBinary(==, bool) _BwBinary(!=, bool) _BwBinary(<, bool) _BwBinary(<=, bool) _BwBinary(>, bool) _BwBinary(>=, bool)
_BwUpdate(+=) _BwUpdate(-=) _BwUpdate(*=) _BwUpdate(/=) _BwUpdate(%=) _BwUpdate(&=) _BwUpdate(|=) _BwUpdate(^=) _BwUpdate(<<=) _BwUpdate(>>=)
// Not for `stream << any`, which the stream knows better.
template <class _BwA, class _BwB, class = _BwEither, class = _BwEnable<!__is_class(_BwA) || _BwIsOpen<_BwA>::value>> _BwAny operator<<(const _BwA &, const _BwB &);
#undef _BwEither
#undef _BwBinary
#undef _BwUpdate
// The body of a stand-in type; each is a type of its own.
#define _BwStandIn(_BwName)                                                  \
  _BwName();                                                                 \
  template <class _BwT, class = _BwEnable<__is_same(_BwT, _BwLiteral)>>      \
  constexpr explicit _BwName(_BwT) {}                                        \
  _BwName(const _BwName &) = default;                                        \
  template <class... _BwArguments> _BwName(_BwArguments &&...);              \
  _BwName &operator=(const _BwName &) = default;                             \
  template <class _BwFrom> _BwName &operator=(const _BwFrom &);              \
  template <class _BwFrom> void operator=(const _BwFrom &) volatile;         \
  _BwName *operator->() const;                                               \
  _BwName &operator*() const;
}
