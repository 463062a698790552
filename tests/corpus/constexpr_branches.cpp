// truth: moves in[256] out[256]
template <bool FORWARD, int N>
static void move(const int *in, int *out) {
    for (int i = 0; i < N; i++) {
        if constexpr (FORWARD)
            out[i] = in[i];  //! read in sequential run=128 //! write out sequential run=128
        else
            out[i] = in[N - 1 - i];  //! read in descending //! write out sequential run=128
    }
}
extern "C" void moves(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    move<true, 128>(in, out);
    move<false, 128>(in + 128, out + 128);
}
