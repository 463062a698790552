// truth: matvec m[2048] v[64] out[32]
extern "C" void matvec(const float m[32][64], const float v[64], float out[32]) {
#pragma HLS INTERFACE m_axi port=m bundle=g0
#pragma HLS INTERFACE m_axi port=v bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
row:
    for (int r = 0; r < 32; r++) {
        float sum = 0;
    col:
        for (int c = 0; c < 64; c++) sum += m[r][c] * v[c];  //! read m sequential run=2048 //! read v sequential run=64
        out[r] = sum;  //! write out sequential run=32
    }
}
