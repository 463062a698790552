// truth: first_big rows=20 in[640]=0..300 out[20]
static int scan(const int *row) {
    for (int i = 0; i < 32; i++) {
        int x = row[i];  //! read in sequential run=data tells=early-exit
        if (x > 290) return i;
    }
    return -1;
}
extern "C" void first_big(int rows, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int r = 0; r < rows; r++) out[r] = scan(in + 32 * r);  //! write out sequential run=20
}
