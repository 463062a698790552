// truth: project cube[4096] plane[256]
#define S 16
extern "C" void project(const float *cube, float *plane) {
#pragma HLS INTERFACE m_axi port=cube bundle=g0
#pragma HLS INTERFACE m_axi port=plane bundle=g1
    float sum[S * S];
    for (int i = 0; i < S * S; i++) sum[i] = 0;
    for (int z = 0; z < S; z++)
        for (int i = 0; i < S * S; i++) sum[i] += cube[z * S * S + i];  //! read cube sequential run=4096
    for (int i = 0; i < S * S; i++) plane[i] = sum[i];  //! write plane sequential run=256
}
