// truth: by_row_pointers in[512] out[512]
extern "C" void by_row_pointers(int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    int *rows[8];
    for (int r = 0; r < 8; r++) rows[r] = in + r * 64;
    for (int r = 0; r < 8; r++)
        for (int c = 0; c < 64; c++) out[r * 64 + c] = rows[7 - r][c];  //! read in sequential run=64 //! write out sequential run=512
}
