// truth: clip n=384 in[384] out[384]
// The look-alike of a guarded store: data decide what is stored, never whether.
extern "C" void clip(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int i = 0; i < n; i++) {
        int x = in[i];  //! read in sequential run=384
        if (x > 200) x = 200;
        out[i] = x > 100 ? x - 100 : 0;  //! write out sequential run=384
    }
}
