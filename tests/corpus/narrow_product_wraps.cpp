// truth: rows_of_eight in[512] out[512]
// The row offset is kept in eight bits: row 8 starts at 0 again.
extern "C" void rows_of_eight(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int row = 0; row < 16; row++) {
        unsigned char base = row * 32;
        for (int c = 0; c < 32; c++) out[row * 32 + c] = in[base + c];  //! read in sequential run=256 //! write out sequential run=512
    }
}
