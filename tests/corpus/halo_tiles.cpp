// truth: tiles in[4356] out[4096]
// Tiles of 16 x 16 with a border of one cell around them.
#define T 16
#define W 66
extern "C" void tiles(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    int tile[T + 2][T + 2];
    for (int ty = 0; ty < 4; ty++)
        for (int tx = 0; tx < 4; tx++) {
            for (int y = 0; y < T + 2; y++)
                for (int x = 0; x < T + 2; x++) tile[y][x] = in[(ty * T + y) * W + tx * T + x];  //! read in sequential run=18
            for (int y = 0; y < T; y++)
                for (int x = 0; x < T; x++) out[((ty * T + y) * 4 + tx) * T + x] = tile[y][x + 1] + tile[y + 2][x + 1];  //! write out sequential run=16.2
        }
}
