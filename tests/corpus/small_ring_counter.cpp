// truth: into_ring in[160] ring[16]
#include "ap_int.h"
extern "C" void into_ring(const int *in, int *ring) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=ring bundle=gmem1
    ap_uint<4> slot = 0;
    for (int i = 0; i < 160; i++) {
        ring[slot] = in[i];  //! write ring sequential run=16 //! read in sequential run=160
        slot++;
    }
}
