// truth: row_sums grid[2048] sums[32]
extern "C" void row_sums(const float grid[32][64], float sums[32]) {
#pragma HLS INTERFACE m_axi port=grid bundle=gmem0
#pragma HLS INTERFACE m_axi port=sums bundle=gmem1
    for (int r = 0; r < 32; r++) {
        float s = 0;
        for (int c = 0; c < 64; c++) s += grid[r][c];  //! read grid sequential run=2048
        sums[r] = s;  //! write sums sequential run=32
    }
}
