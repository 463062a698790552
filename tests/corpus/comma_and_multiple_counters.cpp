// truth: zip n=100 a[300] b[100] out[100]
extern "C" void zip(int n, const int *a, const int *b, int *out) {
#pragma HLS INTERFACE m_axi port=a bundle=g0
#pragma HLS INTERFACE m_axi port=b bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    for (int i = 0, j = 2, k = n - 1; i < n; ++i, j += 3, --k)
        out[i] = a[j] + b[k];  //! read a strided stride=12 tells=strided-access //! read b descending tells=descending-access //! write out sequential run=100
}
