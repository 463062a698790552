// truth: transpose_tiles in[4096] out[4096]
constexpr int SIDE = 64, TILE = 16;
extern "C" void transpose_tiles(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    int tile[TILE][TILE];
    for (int y = 0; y < SIDE; y += TILE)
        for (int x = 0; x < SIDE; x += TILE) {
            for (int i = 0; i < TILE; i++)
                for (int j = 0; j < TILE; j++) tile[i][j] = in[(y + i) * SIDE + x + j];  //! read in sequential run=16
            for (int i = 0; i < TILE; i++)
                for (int j = 0; j < TILE; j++) out[(x + i) * SIDE + y + j] = tile[j][i];  //! write out sequential run=16
        }
}
