// truth: modes n=128 mode=1 in[128] out[128] debug[128]
extern "C" void modes(int n, int mode, const int *in, int *out, int *debug) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
#pragma HLS INTERFACE m_axi port=debug bundle=gmem2
    for (int i = 0; i < n; i++) {
        int x = in[i];  //! read in sequential run=128
        if (mode == 3) debug[(i * 37) & 127] = x;
        if (mode == 1)
            out[i] = x;  //! write out sequential run=128
        else
            out[i * 2 % 128] = x;
    }
}
