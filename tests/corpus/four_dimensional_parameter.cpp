// truth: sum_taps taps[288] first[8]
#define O 8
#define I 4
#define K 3
void sum_taps(const int taps[O][I][K][K], int first[O]) {
#pragma HLS INTERFACE m_axi port=taps bundle=gmem0
#pragma HLS INTERFACE m_axi port=first bundle=gmem1
    for (int o = 0; o < O; o++) {
        int s = 0;
        for (int i = 0; i < I; i++)
            for (int y = 0; y < K; y++)
                for (int x = 0; x < K; x++) s += taps[o][i][y][x];  //! read taps sequential run=288
        first[o] = s;  //! write first sequential run=8
    }
}
