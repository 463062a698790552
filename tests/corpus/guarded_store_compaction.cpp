// truth: compact n=1000 in[1000] out[1000]
extern "C" void compact(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    int kept = 0;
    for (int i = 0; i < n; i++) {
        int x = in[i];  //! read in sequential run=1000
        if (x > 127) out[kept++] = x;  //! write out sequential run=data guarded tells=guarded-access
    }
}
