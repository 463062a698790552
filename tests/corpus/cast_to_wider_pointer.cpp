// truth: sum_pairs in[1024] out[512]
extern "C" void sum_pairs(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    const long long *pairs = (const long long *)in;
    for (int i = 0; i < 512; i++) {
        long long both = pairs[i];  //! read in sequential run=512 element=8
        out[i] = (int)(both >> 32) + (int)both;  //! write out sequential run=512
    }
}
