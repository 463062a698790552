// truth: crop in[1024] out[480]
#define ROWS 10
#define COLS 48
#define PITCH 96
extern "C" void crop(const short *in, short *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    int r = 0, c = 0;
    for (int k = 0; k < ROWS * COLS; ++k) {
        out[k] = in[r * PITCH + c];  //! read in sequential run=48 //! write out sequential run=480
        c = (c == COLS - 1) ? 0 : c + 1;
        if (c == 0) r = r + 1;
    }
}
