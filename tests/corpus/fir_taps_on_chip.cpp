// truth: fir n=600 taps[16] in[600] out[600]
#define TAPS 16
extern "C" void fir(int n, const int *taps, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=taps bundle=g0
#pragma HLS INTERFACE m_axi port=in bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    int c[TAPS], shift[TAPS] = {0};
#pragma HLS ARRAY_PARTITION variable=c complete
#pragma HLS ARRAY_PARTITION variable=shift complete
load_taps:
    for (int t = 0; t < TAPS; t++) c[t] = taps[t];  //! read taps sequential run=16
samples:
    for (int i = 0; i < n; i++) {
#pragma HLS PIPELINE II=1
        int acc = 0;
        for (int t = TAPS - 1; t > 0; t--) {
            shift[t] = shift[t - 1];
            acc += shift[t] * c[t];
        }
        shift[0] = in[i];  //! read in sequential run=600
        out[i] = acc + shift[0] * c[0];  //! write out sequential run=600
    }
}
