// truth: windows n=300 in[300] out[292]
extern "C" void windows(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    int sum = 0;
    for (int i = 0; i < 8; i++) sum += in[i];  //! read in sequential run=8
    for (int i = 8; i < n; i++) {
        out[i - 8] = sum;  //! write out sequential run=292
        int fresh = in[i];  //! read in sequential run=292 tells=interleaved-accesses
        int old = in[i - 8];  //! read in sequential run=292
        sum += fresh - old;
    }
}
