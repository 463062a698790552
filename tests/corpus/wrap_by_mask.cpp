// truth: cyclic in[512] window[64] out[512]
extern "C" void cyclic(const int *in, const int *window, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=window bundle=gmem1
#pragma HLS INTERFACE m_axi port=out bundle=gmem2
    for (int i = 0; i < 512; i++)
        out[i] = in[i] * window[i & 63];  //! read window sequential run=64 //! read in sequential run=512 //! write out sequential run=512
}
