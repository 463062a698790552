// truth: checksum in[256] out[1]
#include <cstdint>
extern "C" void checksum(const uint32_t *in, uint32_t *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    auto bytes = reinterpret_cast<const uint8_t *>(in);
    uint32_t sum = 0;
    for (int i = 0; i < 1024; i++) sum += bytes[i];  //! read in sequential run=1024 element=1
    out[0] = sum;  //! write out single
}
