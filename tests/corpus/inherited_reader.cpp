// truth: derived_copy in[160] out[160]
struct Reader {
    const int *from;
    int at = 0;
    int take() { return from[at++]; }  //! read in sequential run=160
};
struct OffsetReader : Reader {
    int offset;
    OffsetReader(const int *f, int o) : offset(o) { from = f; }
    int take() { return Reader::take() + offset; }
};
extern "C" void derived_copy(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    OffsetReader reader(in, 5);
    for (int i = 0; i < 160; i++) out[i] = reader.take();  //! write out sequential run=160
}
