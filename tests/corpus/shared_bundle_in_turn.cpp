// truth: append a[256] b[256] out[512]
// One bundle, but never two of its arguments in one loop.
extern "C" void append(const int *a, const int *b, int *out) {
#pragma HLS INTERFACE m_axi port=a bundle=gmem
#pragma HLS INTERFACE m_axi port=b bundle=gmem
#pragma HLS INTERFACE m_axi port=out bundle=other
    int k = 0;
    for (int i = 0; i < 256; i++) out[k++] = a[i];  //! read a sequential run=256 //! write out sequential run=256
    for (int i = 0; i < 256; i++) out[k++] = b[i];  //! read b sequential run=256 //! write out sequential run=256
}
