// Records of a stream port: data with its side channels. A width of 0 means that the channel is absent.
#pragma once
#include <ap_int.h>
#define AXIS_ENABLE_DATA 0b00000001
#define AXIS_ENABLE_DEST 0b00000010
#define AXIS_ENABLE_ID 0b00000100
#define AXIS_ENABLE_KEEP 0b00001000
#define AXIS_ENABLE_LAST 0b00010000
#define AXIS_ENABLE_STRB 0b00100000
#define AXIS_ENABLE_USER 0b01000000
#define AXIS_DISABLE_ALL 0b00000000
#define AXIS_ENABLE_ALL 0b01111111
#define _BwMembers(_BwData, _BwBytesWide, _BwU, _BwI, _BwD)                                                  \
  _BwData data;                                                                                              \
  ap_uint<_BwBytesWide> keep;                                                                                \
  ap_uint<_BwBytesWide> strb;                                                                                \
  ap_uint<_BwMax(_BwU, 1)> user;                                                                             \
  ap_uint<1> last;                                                                                           \
  ap_uint<_BwMax(_BwI, 1)> id;                                                                               \
  ap_uint<_BwMax(_BwD, 1)> dest;                                                                             \
  _BwData get_data() const;                                                                                  \
  ap_uint<_BwBytesWide> get_keep() const;                                                                    \
  ap_uint<_BwBytesWide> get_strb() const;                                                                    \
  ap_uint<_BwMax(_BwU, 1)> get_user() const;                                                                 \
  ap_uint<1> get_last() const;                                                                               \
  ap_uint<_BwMax(_BwI, 1)> get_id() const;                                                                   \
  ap_uint<_BwMax(_BwD, 1)> get_dest() const;                                                                 \
  void set_data(const _BwData &);                                                                            \
  void set_keep(const ap_uint<_BwBytesWide> &);                                                              \
  void set_strb(const ap_uint<_BwBytesWide> &);                                                              \
  void set_user(const ap_uint<_BwMax(_BwU, 1)> &);                                                           \
  void set_last(const ap_uint<1> &);                                                                         \
  void set_id(const ap_uint<_BwMax(_BwI, 1)> &);                                                             \
  void set_dest(const ap_uint<_BwMax(_BwD, 1)> &);                                                           \
  void keep_all();                                                                                           \
  void strb_all();
namespace hls {
template <class _BwT, size_t _BwU = 0, size_t _BwI = 0, size_t _BwD = 0, unsigned char _BwE = AXIS_ENABLE_ALL, bool _BwF = false> struct axis {
  _BwMembers(_BwT, (sizeof(_BwT)), int(_BwU), int(_BwI), int(_BwD))
};
template <class _BwT> using axis_data = axis<_BwT, 0, 0, 0, AXIS_ENABLE_DATA | AXIS_ENABLE_KEEP | AXIS_ENABLE_LAST>;
#define _BwMemory(_BwName, _BwS)                                                                             \
  template <int _BwW, size_t _BwU, size_t _BwI, size_t _BwD, unsigned char _BwE, bool _BwF>                  \
  struct axis<_BwName<_BwW>, _BwU, _BwI, _BwD, _BwE, _BwF> {                                                 \
    _BwMembers(_BwName<_BwW>, ((_BwW + 7) / 8), int(_BwU), int(_BwI), int(_BwD))                             \
  };
_BwMemory(ap_int, true) _BwMemory(ap_uint, false)
#undef _BwMemory
}
template <int _BwW, int _BwU = 1, int _BwI = 1, int _BwD = 1, unsigned char _BwE = AXIS_ENABLE_ALL, bool _BwF = false> using ap_axis = hls::axis<ap_int<_BwW>, _BwU, _BwI, _BwD, _BwE, _BwF>;
template <int _BwW, int _BwU = 1, int _BwI = 1, int _BwD = 1, unsigned char _BwE = AXIS_ENABLE_ALL, bool _BwF = false> using ap_axiu = hls::axis<ap_uint<_BwW>, _BwU, _BwI, _BwD, _BwE, _BwF>;
template <int _BwW, int _BwU = 0, int _BwI = 0, int _BwD = 0> struct qdma_axis { _BwMembers(ap_uint<_BwW>, ((_BwW + 7) / 8), _BwU, _BwI, _BwD) };
#undef _BwMembers
