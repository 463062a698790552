// What the containers share: iterators are plain pointers.
#pragma once
#include <initializer_list>
#include <stddef.h>
namespace std {
struct input_iterator_tag {};
struct output_iterator_tag {};
struct forward_iterator_tag : input_iterator_tag {};
struct bidirectional_iterator_tag : forward_iterator_tag {};
struct random_access_iterator_tag : bidirectional_iterator_tag {};
template <class _BwI> struct iterator_traits {
  typedef typename _BwI::value_type value_type;
  typedef ptrdiff_t difference_type;
};
template <class _BwT> struct iterator_traits<_BwT *> {
  typedef _BwT value_type;
  typedef ptrdiff_t difference_type;
  typedef _BwT *pointer;
  typedef _BwT &reference;
  typedef random_access_iterator_tag iterator_category;
};
template <class _BwT> struct iterator_traits<const _BwT *> : iterator_traits<_BwT *> {};
template <class _BwI> struct reverse_iterator {
  typedef typename iterator_traits<_BwI>::value_type value_type;
  reverse_iterator();
  explicit reverse_iterator(_BwI);
  auto operator*() const -> decltype(*_BwI());
  _BwI operator->() const;
  _BwI base() const;
  reverse_iterator &operator++();
  reverse_iterator operator++(int);
  reverse_iterator operator+(ptrdiff_t) const;
  ptrdiff_t operator-(const reverse_iterator &) const;
  bool operator==(const reverse_iterator &) const;
  bool operator!=(const reverse_iterator &) const;
  bool operator<(const reverse_iterator &) const;
};
template <class _BwC> auto begin(_BwC &_BwIn) -> decltype(_BwIn.begin());
template <class _BwC> auto begin(const _BwC &_BwIn) -> decltype(_BwIn.begin());
template <class _BwC> auto end(_BwC &_BwIn) -> decltype(_BwIn.end());
template <class _BwC> auto end(const _BwC &_BwIn) -> decltype(_BwIn.end());
template <class _BwT, size_t _BwN> constexpr _BwT *begin(_BwT (&_BwIn)[_BwN]) { return _BwIn; }
template <class _BwT, size_t _BwN> constexpr _BwT *end(_BwT (&_BwIn)[_BwN]) { return _BwIn + _BwN; }
template <class _BwT, size_t _BwN> constexpr size_t size(const _BwT (&)[_BwN]) { return _BwN; }
template <class _BwC> constexpr auto size(const _BwC &_BwIn) -> decltype(_BwIn.size());
template <class _BwI> void advance(_BwI &, ptrdiff_t);
template <class _BwI> ptrdiff_t distance(_BwI, _BwI);
template <class _BwI> _BwI next(_BwI, ptrdiff_t = 1);
template <class _BwI> _BwI prev(_BwI, ptrdiff_t = 1);
struct _BwInserter {
  _BwInserter &operator*();
  _BwInserter &operator++();
  _BwInserter operator++(int);
  template <class _BwT> _BwInserter &operator=(const _BwT &);
};
template <class _BwC> _BwInserter back_inserter(_BwC &);
template <class _BwC> _BwInserter front_inserter(_BwC &);
template <class _BwC> _BwInserter inserter(_BwC &, typename _BwC::iterator);
}

// The members every sequence has; used inside a class whose element is _BwT and which has push_back and the like.
#define _BwSequence(_BwClass)                                             \
  typedef _BwT value_type;                                                \
  typedef size_t size_type;                                               \
  typedef ptrdiff_t difference_type;                                      \
  typedef _BwT &reference;                                                \
  typedef const _BwT &const_reference;                                    \
  typedef _BwT *pointer;                                                  \
  typedef const _BwT *const_pointer;                                      \
  typedef _BwT *iterator;                                                 \
  typedef const _BwT *const_iterator;                                     \
  typedef std::reverse_iterator<iterator> reverse_iterator;               \
  typedef std::reverse_iterator<const_iterator> const_reverse_iterator;   \
  iterator begin();                                                       \
  iterator end();                                                         \
  const_iterator begin() const;                                           \
  const_iterator end() const;                                             \
  const_iterator cbegin() const;                                          \
  const_iterator cend() const;                                            \
  reverse_iterator rbegin();                                              \
  reverse_iterator rend();                                                \
  const_reverse_iterator rbegin() const;                                  \
  const_reverse_iterator rend() const;                                    \
  bool empty() const;                                                     \
  size_t size() const;                                                    \
  size_t max_size() const;                                                \
  _BwT &front();                                                          \
  const _BwT &front() const;                                              \
  _BwT &back();                                                           \
  const _BwT &back() const;                                               \
  void clear();                                                           \
  void swap(_BwClass &);                                                  \
  void push_back(const _BwT &);                                           \
  void pop_back();                                                        \
  template <class... _BwMore> _BwT &emplace_back(_BwMore &&...);          \
  void resize(size_t);                                                    \
  void resize(size_t, const _BwT &);                                      \
  void assign(size_t, const _BwT &);                                      \
  template <class _BwI> void assign(_BwI, _BwI);                          \
  iterator insert(const_iterator, const _BwT &);                          \
  iterator insert(const_iterator, size_t, const _BwT &);                  \
  template <class _BwI> iterator insert(const_iterator, _BwI, _BwI);      \
  template <class... _BwMore> iterator emplace(const_iterator, _BwMore &&...); \
  iterator erase(const_iterator);                                         \
  iterator erase(const_iterator, const_iterator);                         \
  friend bool operator==(const _BwClass &, const _BwClass &) { return false; } \
  friend bool operator!=(const _BwClass &, const _BwClass &) { return false; } \
  friend bool operator<(const _BwClass &, const _BwClass &) { return false; }
