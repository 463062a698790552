// truth: strided_pick n=100 in[1000] out[100]
struct Picker {
    const float *base;
    int step;
    float operator()(int i) const { return base[i * step]; }  //! read in strided stride=40 tells=strided-access
};
extern "C" void strided_pick(int n, const float *in, float *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    Picker pick{in, 10};
    for (int i = 0; i < n; i++) out[i] = pick(i);  //! write out sequential run=100
}
