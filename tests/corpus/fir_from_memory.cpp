// truth: fir n=200 taps[8] in[256] out[200]
extern "C" void fir(int n, const int *taps, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=taps bundle=g0
#pragma HLS INTERFACE m_axi port=in bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    for (int i = 0; i < n; i++) {
        int acc = 0;
        for (int t = 0; t < 8; t++)
            acc += taps[t] * in[i + t];  //! read taps sequential run=8 //! read in sequential run=8
        out[i] = acc;  //! write out sequential run=200
    }
}
