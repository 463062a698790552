// truth: headers count=50 bytes[3200] out[50]
// Packets of 64 bytes; the field wanted lies at byte 12.
#include <stdint.h>
static inline uint16_t big_endian(const uint8_t *p) {
    return (uint16_t)((p[0] << 8) | p[1]);  //! read bytes strided stride=64
}
extern "C" void headers(int count, const uint8_t *bytes, uint16_t *out) {
#pragma HLS INTERFACE m_axi port=bytes bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int p = 0; p < count; p++) out[p] = big_endian(bytes + 64 * p + 12);  //! write out sequential run=50
}
