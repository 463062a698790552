// truth: scale n=300 coefficient[4] in[300] out[300]
extern "C" void scale(int n, const float *coefficient, const float *in, float *out) {
#pragma HLS INTERFACE m_axi port=coefficient bundle=g0
#pragma HLS INTERFACE m_axi port=in bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    for (int i = 0; i < n; i++)
        out[i] = coefficient[2] * in[i];  //! read coefficient repeated tells=repeated-address //! read in sequential run=300 //! write out sequential run=300
}
