// truth: map_pass in[256] out[256]
template <class Op>
static void for_each_gate(const short *in, short *out, int n, Op op) {
GATES:
    for (int g = 0; g < n; ++g) {
#pragma HLS PIPELINE II = 1
        out[g] = op(in[g]);  //! read in sequential run=256 //! write out sequential run=256
    }
}
struct Halve {
    short operator()(short x) const { return x / 2; }
};
extern "C" void map_pass(const short *in, short *out) {
#pragma HLS INTERFACE mode = m_axi port = in bundle = gmem0
#pragma HLS INTERFACE mode = m_axi port = out bundle = gmem1
    for_each_gate(in, out, 256, Halve());
}
