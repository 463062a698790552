// truth: outer a[64] b[64] c[4096]
#define N 64
#define T 8
extern "C" void outer(const float *a, const float *b, float *c) {
#pragma HLS INTERFACE m_axi port=a bundle=ga
#pragma HLS INTERFACE m_axi port=b bundle=gb
#pragma HLS INTERFACE m_axi port=c bundle=gc
    float la[N], lb[N];
    for (int i = 0; i < N; i++) {
        la[i] = a[i];  //! read a sequential run=64
        lb[i] = b[i];  //! read b sequential run=64
    }
    for (int bi = 0; bi < N / T; bi++)
        for (int bj = 0; bj < N / T; bj++)
            for (int i = bi * T; i < (bi + 1) * T; i++)
                for (int j = bj * T; j < bj * T + T; j++) c[i * N + j] = la[i] * lb[j];  //! write c sequential run=8 tells=short-run
}
