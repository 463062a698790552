// truth: blocks in[4096] out[4096]
#define S 16
#define B 4
extern "C" void blocks(const int in[S][S][S], int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    int k = 0;
    for (int z = 0; z < S; z += B)
        for (int y = 0; y < S; y += B)
            for (int x = 0; x < S; x += B)
                for (int dz = 0; dz < B; dz++)
                    for (int dy = 0; dy < B; dy++)
                        for (int dx = 0; dx < B; dx++) out[k++] = in[z + dz][y + dy][x + dx];  //! read in sequential run=4 //! write out sequential run=4096
}
