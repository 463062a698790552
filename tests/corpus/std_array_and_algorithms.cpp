// truth: blocks n=256 in[256] out[256]
#include <algorithm>
#include <array>
extern "C" void blocks(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    std::array<int, 32> block;
    for (int b = 0; b < n; b += 32) {
        for (std::size_t i = 0; i < block.size(); ++i) block[i] = in[b + i];  //! read in sequential run=256
        for (std::size_t i = 0; i < block.size() / 2; ++i) std::swap(block[i], block[31 - i]);
        for (int i = 0; i < 32; ++i) out[b + i] = std::max(block[i], 0);  //! write out sequential run=256
    }
}
