// truth: rewrap in[640] out[640]
#define C 40
extern "C" void rewrap(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int k = 0; k < 16 * C; k++) {
        int row = k / C, col = k % C;
        out[C * row + col] = in[k] - 7;  //! write out sequential run=640 //! read in sequential run=640
    }
}
