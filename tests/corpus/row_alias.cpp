// truth: shift_rows in[1600] out[1600]
extern "C" void shift_rows(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int r = 0; r < 20; r++) {
        const int *from = in + r * 80;
        int *to = &out[r * 80 + 10];
        for (int c = 0; c < 60; c++) to[c] = from[c];  //! read in sequential run=60 //! write out sequential run=60
    }
}
