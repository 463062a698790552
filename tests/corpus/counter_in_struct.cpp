// truth: count_in_state n=200 in[200] out[200]
struct State {
    struct { int row, column; } at;
    const int *source;
};
static int fetch(State &state) {
    int value = state.source[state.at.row * 20 + state.at.column];  //! read in sequential run=200
    if (++state.at.column == 20) {
        state.at.column = 0;
        ++state.at.row;
    }
    return value;
}
extern "C" void count_in_state(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    State state = {{0, 0}, in};
    for (int i = 0; i < n; i++) out[i] = fetch(state);  //! write out sequential run=200
}
