// truth: halve in[4096] out[1024]
#define W 64
#define H 64
extern "C" void halve(const unsigned char *in, unsigned char *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int y = 0; y < H / 2; y++)
        for (int x = 0; x < W / 2; x++) {
            int a = in[(2 * y) * W + 2 * x];  //! read in sequential run=64 joined=upper tells=interleaved-accesses
            int b = in[(2 * y) * W + 2 * x + 1];  //! read in sequential run=64 joined=upper tells=interleaved-accesses
            int c = in[(2 * y + 1) * W + 2 * x];  //! read in sequential run=64 joined=lower
            int d = in[(2 * y + 1) * W + 2 * x + 1];  //! read in sequential run=64 joined=lower
            out[y * (W / 2) + x] = (a + b + c + d) >> 2;  //! write out sequential run=1024
        }
}
