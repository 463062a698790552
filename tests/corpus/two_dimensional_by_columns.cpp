// truth: column_sums grid[2048] sums[64]
extern "C" void column_sums(const float (*grid)[64], float *sums) {
#pragma HLS INTERFACE m_axi port=grid bundle=gmem0
#pragma HLS INTERFACE m_axi port=sums bundle=gmem1
    for (int c = 0; c < 64; c++) {
        float s = 0;
        for (int r = 0; r < 32; r++)
            s += grid[r][c];  //! read grid strided stride=256 tells=strided-access
        sums[c] = s;  //! write sums sequential run=64
    }
}
