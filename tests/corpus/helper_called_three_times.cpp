// truth: three a[128] b[256] c[96] sums[3]
static float total(const float *v, int n, int step) {
    float s = 0;
    for (int i = 0; i < n; i++)
        s += v[i * step];  //! read a sequential run=128 //! read b strided stride=8 //! read c strided stride=12
    return s;
}
extern "C" void three(const float *a, const float *b, const float *c, float *sums) {
#pragma HLS INTERFACE m_axi port=a bundle=g0
#pragma HLS INTERFACE m_axi port=b bundle=g1
#pragma HLS INTERFACE m_axi port=c bundle=g2
#pragma HLS INTERFACE m_axi port=sums bundle=g3
    sums[0] = total(a, 128, 1);  //! write sums single
    sums[1] = total(b, 128, 2);  //! write sums single
    sums[2] = total(c, 32, 3);  //! write sums single
}
