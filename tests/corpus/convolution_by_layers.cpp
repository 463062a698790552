// truth: layer in[2048] weight[1152] out[1568]
#define CI 8
#define CO 16
#define S 16
#define K 3
typedef float data_t;
extern "C" void layer(const data_t *in, const data_t *weight, data_t *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=weight bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    data_t map[S][S];
    data_t acc[S - K + 1][S - K + 1];
    for (int co = 0; co < 8; co++) {
        for (int y = 0; y < S - K + 1; y++)
            for (int x = 0; x < S - K + 1; x++) acc[y][x] = 0;
        for (int ci = 0; ci < CI; ci++) {
            data_t w[K][K];
            for (int k = 0; k < K * K; k++) w[k / K][k % K] = weight[(co * CI + ci) * K * K + k];  //! read weight sequential run=576
            for (int y = 0; y < S; y++)
                for (int x = 0; x < S; x++) map[y][x] = in[(ci * S + y) * S + x];  //! read in sequential run=2048
            for (int y = 0; y < S - K + 1; y++)
                for (int x = 0; x < S - K + 1; x++)
                    for (int dy = 0; dy < K; dy++)
                        for (int dx = 0; dx < K; dx++) acc[y][x] += map[y + dy][x + dx] * w[dy][dx];
        }
        for (int y = 0; y < S - K + 1; y++)
            for (int x = 0; x < S - K + 1; x++) out[co * 196 + y * 14 + x] = acc[y][x];  //! write out sequential run=1568
    }
}
