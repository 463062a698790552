// truth: guarded_entry n=64 in[64] out[64]
extern "C" void guarded_entry(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    if (n <= 0) return;
    if (n > 64) n = 64;
    for (int i = 0; i < n; ++i) out[i] = in[i];  //! read in sequential run=64 //! write out sequential run=64
}
