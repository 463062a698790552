// truth: window map[2048] out[144]
#define W 16
void window(const int map[2][4][W][W], int *out) {
#pragma HLS INTERFACE m_axi port=map bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    int n = 0;
    for (int b = 0; b < 2; b++)
        for (int ch = 0; ch < 2; ch++)
            for (int y = 4; y < 10; y++)
                for (int x = 5; x < 11; x++) out[n++] = map[b][ch][y][x];  //! read map sequential run=6 //! write out sequential run=144
}
