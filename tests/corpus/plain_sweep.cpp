// truth: sweep n=1000 in[1024] out[1024]
extern "C" void sweep(int n, const float *in, float *out) {
#pragma HLS interface m_axi port = in bundle = gates
#pragma HLS interface m_axi port = out bundle = scaled
    for (int i = 0; i < n; ++i)
        out[i] = 0.5f * in[i];  //! read in sequential run=1000 //! write out sequential run=1000
}
