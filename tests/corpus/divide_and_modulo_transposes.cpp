// truth: turn in[512] out[512]
#define ROWS 16
#define COLS 32
extern "C" void turn(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int k = 0; k < ROWS * COLS; k++)
        out[(k % COLS) * ROWS + k / COLS] = in[k];  //! write out strided stride=64 tells=strided-access //! read in sequential run=512
}
