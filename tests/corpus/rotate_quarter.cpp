// truth: rotate in[1536] out[1536]
#define W 48
#define H 32
extern "C" void rotate(const short in[H][W], short out[W][H]) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int y = 0; y < W; y++)
        for (int x = 0; x < H; x++) out[y][x] = in[H - 1 - x][y];  //! read in strided stride=-96 tells=strided-access //! write out sequential run=1536
}
