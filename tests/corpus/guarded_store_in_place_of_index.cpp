// truth: flag_only n=2000 in[2000] out[2000]
extern "C" void flag_only(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0; i < n; i++) {
        int x = in[i];  //! read in sequential run=2000
        if (x > 127) {
            out[i] = x;  //! write out sequential run=2 guarded basis=data tells=guarded-access
        }
    }
}
