// truth: collect_banks in[1024] out[1024]
extern "C" void collect_banks(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int i = 0; i < 1024; i++)
        out[i] = in[(i & 3) * 256 + (i >> 2)];  //! read in strided stride=1024 tells=strided-access //! write out sequential run=1024
}
