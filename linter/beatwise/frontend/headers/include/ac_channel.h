#pragma once
#include <stddef.h>
template <class _BwT> class ac_channel {
public:
  typedef _BwT element_type;
  ac_channel();
  explicit ac_channel(int);
  _BwT read();
  void read(_BwT &);
  bool nb_read(_BwT &);
  void write(const _BwT &);
  bool nb_write(const _BwT &);
  bool available(unsigned) const;
  bool empty() const;
  unsigned size() const;
  unsigned debug_size() const;
  const _BwT &operator[](unsigned) const;
};
