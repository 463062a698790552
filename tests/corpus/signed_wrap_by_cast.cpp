// truth: wrapped in[256] out[400]
extern "C" void wrapped(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int i = 0; i < 400; i++)
        out[i] = in[128 + (signed char)i];  //! read in sequential run=133.3 //! write out sequential run=400
}
