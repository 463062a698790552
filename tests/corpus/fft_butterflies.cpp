// truth: stages re[128] im[128]
// All stages in place, through memory; the partner lies a power of two away.
#define N 128
extern "C" void stages(int *re, int *im) {
#pragma HLS INTERFACE m_axi port=re bundle=g0
#pragma HLS INTERFACE m_axi port=im bundle=g1
    for (int half = 1; half < N; half <<= 1) {
        for (int group = 0; group < N; group += 2 * half) {
            for (int k = 0; k < half; k++) {
                int a = re[group + k];  //! read re sequential/irregular run=data
                int b = re[group + k + half];  //! read re sequential/irregular run=data
                re[group + k] = a + b;  //! write re sequential/irregular run=data
                re[group + k + half] = a - b;  //! write re sequential/irregular run=data
            }
        }
    }
    for (int i = 0; i < N; i++) im[i] = 0;  //! write im sequential run=128
}
