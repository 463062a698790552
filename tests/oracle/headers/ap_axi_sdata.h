// Side-channel stream records.
#pragma once
#include "ap_int.h"

template <int DATA, int USER = 1, int ID = 1, int DEST = 1>
struct ap_axiu {
    ap_uint<DATA> data;
    ap_uint<DATA / 8> keep, strb;
    ap_uint<USER> user;
    ap_uint<1> last;
    ap_uint<ID> id;
    ap_uint<DEST> dest;
};

template <int DATA, int USER = 1, int ID = 1, int DEST = 1>
struct ap_axis {
    ap_int<DATA> data;
    ap_uint<DATA / 8> keep, strb;
    ap_uint<USER> user;
    ap_uint<1> last;
    ap_uint<ID> id;
    ap_uint<DEST> dest;
};
