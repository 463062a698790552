// truth: offset_all n=350 in[350] out[350]
extern "C" void offset_all(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    const int bias = 3;
    auto at = [&](int i) { return in[i] + bias; };  //! read in sequential run=350
    auto store = [out](int i, int v) { out[i] = v; };  //! write out sequential run=350
    for (int i = 0; i < n; i++) store(i, at(i));
}
