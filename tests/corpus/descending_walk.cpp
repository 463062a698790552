// truth: rewind_ray n=640 in[640] out[640]
extern "C" void rewind_ray(int n, const float *in, float *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    int k = 0;
    for (int i = n - 1; i >= 0; --i)
        out[k++] = in[i];  //! read in descending stride=-4 tells=descending-access //! write out sequential run=640
}
