// truth: run_filter n=256 in[256] out[256]
template <typename T, int DEPTH>
class Filter {
    const T *source;
    T *sink;
    T state[DEPTH];

public:
    Filter(const T *from, T *to) : source(from), sink(to) {
        for (int d = 0; d < DEPTH; ++d) state[d] = T(0);
    }
    void step(int i) {
        T now = source[i];  //! read in sequential run=256
        sink[i] = now - state[i % DEPTH];  //! write out sequential run=256
        state[i % DEPTH] = now;
    }
    template <int TIMES>
    void run(int n) {
        for (int block = 0; block < n / TIMES; ++block)
            for (int k = 0; k < TIMES; ++k) step(block * TIMES + k);
    }
};
extern "C" void run_filter(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    Filter<int, 4> filter(in, out);
    filter.run<16>(n);
}
