// Type computations that the other headers share. The standard names for them are in <type_traits>.
#pragma once
template <bool _BwC, class _BwT = void> struct _BwEnableIf {};
template <class _BwT> struct _BwEnableIf<true, _BwT> { typedef _BwT type; };
template <bool _BwC, class _BwT = void> using _BwEnable = typename _BwEnableIf<_BwC, _BwT>::type;
template <bool _BwC, class _BwA, class _BwB> struct _BwChooseOf { typedef _BwA type; };
template <class _BwA, class _BwB> struct _BwChooseOf<false, _BwA, _BwB> { typedef _BwB type; };
template <bool _BwC, class _BwA, class _BwB> using _BwChoose = typename _BwChooseOf<_BwC, _BwA, _BwB>::type;
template <class _BwT> struct _BwBareOf { typedef _BwT type; };
template <class _BwT> struct _BwBareOf<_BwT &> { typedef _BwT type; };
template <class _BwT> struct _BwBareOf<_BwT &&> { typedef _BwT type; };
template <class _BwT> using _BwBare = typename _BwBareOf<_BwT>::type;
template <class _BwT> _BwT &&_BwValue() noexcept;

// A built-in number: an arithmetic type or an unscoped enumeration.
template <class _BwT> struct _BwIsNumber {
  static constexpr bool value = __is_arithmetic(_BwT) || (__is_enum(_BwT) && __is_convertible_to(_BwT, int));
};
// The type of arithmetic between two built-in numbers.
template <class _BwA, class _BwB> using _BwCommon = decltype(true ? _BwValue<_BwA>() : _BwValue<_BwB>());

// A class that a number can be had from: arbitrary precision, or a stand-in.
template <class _BwT, class = void> struct _BwIsOpen { static constexpr bool value = false; };
template <class _BwT> struct _BwIsOpen<_BwT, typename _BwT::_BwOpen> { static constexpr bool value = true; };
