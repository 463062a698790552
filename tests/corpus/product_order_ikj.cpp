// truth: product a[256] b[256] c[256]
#define N 16
extern "C" void product(const float *a, const float *b, float *c) {
#pragma HLS INTERFACE m_axi port=a bundle=ga
#pragma HLS INTERFACE m_axi port=b bundle=gb
#pragma HLS INTERFACE m_axi port=c bundle=gc
    for (int i = 0; i < N; i++)
        for (int k = 0; k < N; k++)
            for (int j = 0; j < N; j++)
                c[i * N + j] += a[i * N + k] * b[k * N + j];  //! read c sequential run=16 tells=in-place-update //! write c sequential run=16 //! read a repeated tells=repeated-address //! read b sequential run=256
}
