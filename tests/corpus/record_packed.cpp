// truth: unpack in[64] out[64]
#include <stdint.h>
struct __attribute__((packed)) Report {
    uint8_t kind;
    uint32_t value;
};
extern "C" void unpack(const Report *in, uint32_t *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0; i < 64; i++) out[i] = in[i].value;  //! read in sequential run=64 element=5 tells=partial-record //! write out sequential run=64
}
