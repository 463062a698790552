// truth: tint lut[256] in[1024] out[1024]
#include <stdint.h>
extern "C" void tint(const uint8_t *lut, const uint8_t *in, uint8_t *out) {
#pragma HLS INTERFACE m_axi port=lut bundle=gmem0
#pragma HLS INTERFACE m_axi port=in bundle=gmem1
#pragma HLS INTERFACE m_axi port=out bundle=gmem2
    uint8_t j = 0;
    for (int i = 0; i < 1024; i++) {
        out[i] = in[i] + lut[j];  //! read lut sequential run=256 //! read in sequential run=1024 //! write out sequential run=1024
        j++;
    }
}
