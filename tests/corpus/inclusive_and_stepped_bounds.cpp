// truth: windows n=63 in[1024] out[1024]
extern "C" void windows(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int w = 0; w <= n; w += 3)
        for (int i = 4; i <= 11; i++) out[w * 16 + i] = in[w * 16 + i];  //! read in sequential run=8 tells=short-run //! write out sequential run=8 tells=short-run
}
