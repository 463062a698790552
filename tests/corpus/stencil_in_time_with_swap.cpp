// truth: diffuse steps=4 a[130] b[130]
extern "C" void diffuse(int steps, float *a, float *b) {
#pragma HLS INTERFACE m_axi port=a bundle=g0
#pragma HLS INTERFACE m_axi port=b bundle=g1
    for (int t = 0; t < steps; t += 2) {
        for (int i = 1; i < 129; i++) b[i] = a[i - 1] + a[i + 1];  //! read a sequential run=128 tells=interleaved-accesses //! write b sequential run=128
        for (int i = 1; i < 129; i++) a[i] = b[i - 1] + b[i + 1];  //! read b sequential run=128 tells=interleaved-accesses //! write a sequential run=128
    }
}
