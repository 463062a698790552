// truth: offset_gates src[512] dst[512] n=512
extern "C" void offset_gates(const float *src, float *dst, int n) {
#pragma HLS INTERFACE m_axi port=src offset=slave bundle=a
#pragma HLS INTERFACE m_axi port=dst offset=slave bundle=b
    while (n-- > 0)
        *dst++ = *src++ + 1.5f;  //! read src sequential run=512 //! write dst sequential run=512
}
