// truth: add_three n=511 in[512] out[512]
extern "C" void add_three(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    int i = 0;
    for (; i + 4 <= n; i += 4) {
        for (int u = 0; u < 4; u++) {
#pragma HLS UNROLL factor = 4
            out[i + u] = in[i + u] + 3;  //! read in sequential run=508 //! write out sequential run=508
        }
    }
    for (; i < n; i++) out[i] = in[i] + 3;  //! read in sequential run=3 //! write out sequential run=3
}
