// truth: anti_diagonals m[256] out[256]
#define N 16
extern "C" void anti_diagonals(const int *m, int *out) {
#pragma HLS INTERFACE m_axi port=m bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    int k = 0;
    for (int d = 0; d < 2 * N - 1; d++) {
        int first = d < N ? 0 : d - N + 1;
        int last = d < N ? d : N - 1;
        for (int i = first; i <= last; i++) out[k++] = m[i * N + d - i];  //! read m strided stride=60 //! write out sequential run=256
    }
}
