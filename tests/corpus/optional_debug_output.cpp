// truth: process n=256 verbose=0 in[256] out[256] trace[256]
extern "C" void process(int n, bool verbose, const int *in, int *out, int *trace) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
#pragma HLS INTERFACE m_axi port=trace bundle=g2
    for (int i = 0; i < n; i++) {
        int v = in[i] + 1;  //! read in sequential run=256
        if (verbose) trace[i] = v;
        out[i] = v;  //! write out sequential run=256
    }
}
