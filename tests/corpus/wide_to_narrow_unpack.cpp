// truth: unpack words=40 in[40] out[640]
#include <ap_int.h>
extern "C" void unpack(int words, const ap_uint<512> *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int w = 0; w < words; w++) {
        ap_uint<512> word = in[w];  //! read in sequential run=40 element=64
        for (int l = 0; l < 16; l++) {
#pragma HLS PIPELINE II=1
            out[w * 16 + l] = word(32 * l + 31, 32 * l).to_int();  //! write out sequential run=640
        }
    }
}
