// truth: crop in[2048] out[600]
namespace layout {
constexpr int width = 64, height = 32;
constexpr int margin() { return 2; }
struct Box {
    int top, left, rows, columns;
};
constexpr Box inner{margin(), 2 * margin(), 20, 30};
}  // namespace layout
extern "C" void crop(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    using namespace layout;
    for (int r = 0; r < inner.rows; ++r)
        for (int c = 0; c < inner.columns; ++c)
            out[r * inner.columns + c] = in[(r + inner.top) * width + c + inner.left];  //! read in sequential run=30 //! write out sequential run=600
}
