// truth: by_lines in[640] out[640]
static void read_line(const int *in, int (&line)[64], int which) {
    for (int i = 0; i < 64; i++) line[i] = in[which * 64 + i];  //! read in sequential run=640
}
static void write_line(int *out, const int (&line)[64], int which) {
    int i = 0;
    for (int value : line) out[which * 64 + i++] = value;  //! write out sequential run=640
}
extern "C" void by_lines(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    int line[64];
    for (int l = 0; l < 10; l++) {
        read_line(in, line, l);
        write_line(out, line, 9 - (9 - l));
    }
}
