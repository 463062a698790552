// truth: macro_copy in[1200] out[1200]
#define FOR(v, n) for (int v = 0; v < (n); ++v)
#define AT(a, r, c, p) (a)[(r) * (p) + (c)]
extern "C" void macro_copy(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    FOR(r, 12) FOR(c, 100)
        AT(out, r, c, 100) = AT(in, r, c, 100);  //! read in sequential run=1200 //! write out sequential run=1200
    FOR(c, 100) FOR(r, 12) AT(out, r, c, 100) += 1;  //! read out strided stride=400 //! write out strided stride=400
}
