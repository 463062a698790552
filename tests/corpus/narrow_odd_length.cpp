// truth: copy_odd n=999 in[1024] out[1024]
extern "C" void copy_odd(int n, const float *in, float *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0; i < n; i++)
        out[i] = in[i];  //! read in sequential run=999 tells=narrow-port //! write out sequential run=999 tells=narrow-port
}
