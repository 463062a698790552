// truth: sum_rows in[800] out[20]
extern "C" void sum_rows(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    typedef const int row_t[40];
    row_t *rows = (row_t *)in;
    for (int r = 0; r < 20; r++) {
        int s = 0;
        for (int c = 0; c < 40; c++) s += rows[r][c];  //! read in sequential run=800
        out[r] = s;  //! write out sequential run=20
    }
}
