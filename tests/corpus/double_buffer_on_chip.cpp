// truth: overlap in[1024] out[1024]
#define B 128
static void fetch(const int *in, int *buffer, int block) {
    for (int i = 0; i < B; i++) buffer[i] = in[block * B + i];  //! read in sequential run=1024
}
static void emit(const int *buffer, int *out, int block) {
    for (int i = 0; i < B; i++) out[block * B + i] = buffer[i] * 2;  //! write out sequential run=1024
}
extern "C" void overlap(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    int ping[B], pong[B];
    for (int b = 0; b < 8; b++) {
        int *buffer = (b & 1) ? pong : ping;
        fetch(in, buffer, b);
        emit(buffer, out, b);
    }
}
