// truth: transpose in[2048] out[2048]
#define R 32
#define C 64
extern "C" void transpose(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int r = 0; r < R; r++)
        for (int c = 0; c < C; c++)
            out[c * R + r] = in[r * C + c];  //! read in sequential run=2048 //! write out strided stride=128 tells=strided-access
}
