// truth: forces n=48 x[48] y[48] fx[48]
extern "C" void forces(int n, const float *x, const float *y, float *fx) {
#pragma HLS INTERFACE m_axi port=x bundle=g0
#pragma HLS INTERFACE m_axi port=y bundle=g1
#pragma HLS INTERFACE m_axi port=fx bundle=g2
    for (int i = 0; i < n; i++) {
        float xi = x[i], sum = 0;  //! read x sequential run=48
        for (int j = 0; j < n; j++) {
            if (i == j) continue;
            float d = x[j] - xi;  //! read x sequential run=24
            sum += y[j] / (d * d + 1.0f);  //! read y sequential run=24
        }
        fx[i] = sum;  //! write fx sequential run=48
    }
}
