// truth: apply in[200] out[200]
static int twice(int x) { return 2 * x; }
static int square(int x) { return x * x; }
static void map_with(int (*f)(int), const int *in, int *out, int n) {
    for (int i = 0; i < n; i++) out[i] = f(in[i]);  //! read in sequential run=100 //! write out sequential run=100
}
extern "C" void apply(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    map_with(twice, in, out, 100);
    map_with(square, in + 100, out + 100, 100);
}
