// truth: smooth3 n=502 in[512] out[512]
extern "C" void smooth3(int n, const float *in, float *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 1; i < n - 1; i++)
        out[i] = (in[i - 1] + in[i] + in[i + 1]) / 3.0f;  //! read in sequential run=500 tells=interleaved-accesses //! write out sequential run=500
}
