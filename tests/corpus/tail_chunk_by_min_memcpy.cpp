// truth: relay n=1000 in[1024] out[1024]
#include <algorithm>
#include <cstring>
static const int BLOCK = 128;
void relay(int n, const float *in, float *out) {
#pragma HLS interface mode=m_axi port=in bundle=left
#pragma HLS interface mode=m_axi port=out bundle=right
    float block[BLOCK];
    for (int i = 0; i < n; i += BLOCK) {
        int count = std::min(BLOCK, n - i);
        std::memcpy(block, in + i, count * sizeof(float));  //! read in sequential run=125
        for (int j = 0; j < count; j++) block[j] += 0.25f;
        std::memcpy(out + i, block, count * sizeof(float));  //! write out sequential run=125
    }
}
