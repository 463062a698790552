// truth: product a[1024] b[1024] c[1024]
#define N 32
extern "C" void product(const float *a, const float *b, float *c) {
#pragma HLS INTERFACE m_axi port=a bundle=ga
#pragma HLS INTERFACE m_axi port=b bundle=gb
#pragma HLS INTERFACE m_axi port=c bundle=gc
    for (int i = 0; i < N; i++)
        for (int j = 0; j < N; j++) {
            float sum = 0;
            for (int k = 0; k < N; k++) {
                float left = a[i * N + k];  //! read a sequential run=32
                float right = b[k * N + j];  //! read b strided stride=128 tells=strided-access
                sum += left * right;
            }
            c[i * N + j] = sum;  //! write c sequential run=1024
        }
}
