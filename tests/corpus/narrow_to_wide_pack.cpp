// truth: pack words=32 in[512] out[32]
#include "ap_int.h"
extern "C" void pack(int words, const unsigned *in, ap_uint<512> *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    ap_uint<512> word = 0;
    for (int i = 0; i < words * 16; i++) {
#pragma HLS PIPELINE II=1
        word.range(32 * (i % 16) + 31, 32 * (i % 16)) = in[i];  //! read in sequential run=512
        if (i % 16 == 15) out[i / 16] = word;  //! write out sequential run=32 element=64
    }
}
