// truth: lower m[1024] out[528]
extern "C" void lower(const int *m, int *out) {
#pragma HLS INTERFACE m_axi port=m bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    int k = 0;
    for (int i = 0; i < 32; i++)
        for (int j = 0; j <= i; j++) out[k++] = m[i * 32 + j];  //! read m sequential run=16.5 //! write out sequential run=528
}
