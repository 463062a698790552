// truth: squares n=128 in[128] out[128]
extern "C" void squares(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int i = 0; i < n; i++) {
        int s = in[i];  //! read in sequential run=128
        s *= in[i];  //! read in sequential run=128
        out[i] = s;  //! write out sequential run=128
    }
}
