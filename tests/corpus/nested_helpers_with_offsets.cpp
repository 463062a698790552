// truth: volumes in[1920] out[1920]
static void gate_row(const int *in, int *out, int n) {
    for (int g = 0; g < n; g++) out[g] = in[g] * 3;  //! read in sequential run=1920 //! write out sequential run=1920
}
static void one_scan(const int *in, int *out, int rays, int gates) {
    for (int r = 0; r < rays; r++) gate_row(in + r * gates, out + r * gates, gates);
}
extern "C" void volumes(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int v = 0; v < 4; v++) one_scan(&in[v * 480], &out[v * 480], 8, 60);
}
