// truth: clutter_mean in[1024] out[1024]
#define W 32
#define H 32
void clutter_mean(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int y = 1; y < H - 1; y++)
        for (int x = 1; x < W - 1; x++) {
            int s = 0;
            for (int dy = -1; dy <= 1; dy++)
                for (int dx = -1; dx <= 1; dx++) s += in[(y + dy) * W + x + dx];  //! read in sequential run=3 tells=short-run
            out[y * W + x] = s / 9;  //! write out sequential run=30
        }
}
