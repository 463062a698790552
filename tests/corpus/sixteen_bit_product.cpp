// truth: far_rows in[65536] out[640]
// row * pitch does not fit into 16 bits from row 4 on.
#include <cstdint>
extern "C" void far_rows(const uint8_t *in, uint8_t *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    uint16_t pitch = 16384;
    for (uint16_t row = 0; row < 8; row++) {
        uint16_t base = row * pitch;
        for (int i = 0; i < 80; i++) out[row * 80 + i] = in[(uint16_t)(base + i)];  //! read in sequential run=80 //! write out sequential run=640
    }
}
