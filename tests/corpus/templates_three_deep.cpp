// truth: nested in[288] out[288]
template <int N> struct Shape {
    static constexpr int rows = N, pitch = 3 * N;
};
template <class S, int STAGE>
struct Stage {
    template <class T>
    static void run(const T *in, T *out) {
        for (int r = 0; r < S::rows; r++)
            for (int c = 0; c < S::rows; c++)
                out[r * S::pitch + c + STAGE] = in[r * S::pitch + c];  //! read in sequential run=8 //! write out sequential run=8
    }
};
template <int N>
struct Kernel {
    static void run(const int *in, int *out) {
        Stage<Shape<N>, 0>::run(in, out);
        Stage<Shape<N>, 8>::template run<int>(in, out);
    }
};
extern "C" void nested(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    Kernel<8>::run(in, out);
}
