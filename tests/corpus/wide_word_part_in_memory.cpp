// truth: low_halves in[128] out[128]
#include "ap_int.h"
extern "C" void low_halves(const ap_uint<256> *in, unsigned *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0; i < 128; i++)
        out[i] = in[i].range(31, 0).to_uint();  //! read in sequential run=128 element=32 tells=partial-record //! write out sequential run=128
}
