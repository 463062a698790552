// truth: vertical_sum in[1024] out[1024]
extern "C" void vertical_sum(const short in[1024], short out[1024]) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    static short line[2][64];
#pragma HLS ARRAY_PARTITION variable=line dim=1 complete
    for (int y = 0; y < 16; y++) {
        for (int x = 0; x < 64; x++) {
            short now = in[y * 64 + x];  //! read in sequential run=1024
            short sum = line[0][x] + line[1][x] + now;
            line[0][x] = line[1][x];
            line[1][x] = now;
            out[y * 64 + x] = sum;  //! write out sequential run=1024
        }
    }
}
