#pragma once
#include <ap_int.h>
template <class _BwT, unsigned _BwDepth> class ap_shift_reg {
  _BwT _BwHeld[_BwDepth];

public:
  ap_shift_reg();
  explicit ap_shift_reg(const char *);
  _BwT shift(const _BwT &, unsigned = _BwDepth - 1, bool = true);
  _BwT read(unsigned = _BwDepth - 1) const;
};
