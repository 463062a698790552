// truth: fold_groups in[512] out[64]
template <int N>
struct Fold {
    static int run(const int *p) { return Fold<N / 2>::run(p) + Fold<N / 2>::run(p + N / 2); }
};
template <>
struct Fold<1> {
    static int run(const int *p) { return p[0]; }  //! read in sequential joined run=512
};
extern "C" void fold_groups(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int g = 0; g < 64; g++) out[g] = Fold<8>::run(in + 8 * g);  //! write out sequential run=64
}
