// truth: poll n=64 status[64] out[64]
extern "C" void poll(int n, volatile int *status, int *out) {
#pragma HLS INTERFACE m_axi port=status bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0; i < n; i++)
        out[i] = status[i];  //! read status sequential run=64 tells=volatile-access //! write out sequential run=64
}
