#pragma once
#include <stddef.h>
namespace hls {
template <class _BwT> class burst_maxi {
  _BwT *_BwBase;

public:
  typedef _BwT value_type;
  burst_maxi(_BwT *);
  void read_request(size_t _BwFirst, size_t _BwCount);
  _BwT read();
  void write_request(size_t _BwFirst, size_t _BwCount);
  void write(const _BwT &);
  void write(const _BwT &, size_t _BwBytesEnabled);
  void write_response();
};
}
