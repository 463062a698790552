// truth: valid_rows flag[400]=0..1 in[6400] out[6400]
// Data decide about whole rows; within a row the run is whole.
extern "C" void valid_rows(const int *flag, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=flag bundle=g0
#pragma HLS INTERFACE m_axi port=in bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    for (int r = 0; r < 400; r++) {
        if (flag[r] == 0) continue;  //! read flag sequential run=400
        for (int c = 0; c < 16; c++) out[r * 16 + c] = in[r * 16 + c];  //! read in sequential run=32 guarded //! write out sequential run=32 guarded
    }
}
