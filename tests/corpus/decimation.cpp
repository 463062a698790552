// truth: decimate n=1024 in[1024] out[128]
extern "C" void decimate(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0, k = 0; i < n; i += 8, k++)
        out[k] = in[i];  //! read in strided stride=32 tells=strided-access //! write out sequential run=128
}
