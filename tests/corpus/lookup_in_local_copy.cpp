// truth: local_table n=500 table[256] in[500]=0..255 out[500]
// The look-alike of a gather: the table is on the chip.
extern "C" void local_table(int n, const int *table, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=table bundle=g0
#pragma HLS INTERFACE m_axi port=in bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    int local[256];
    for (int i = 0; i < 256; i++) local[i] = table[i];  //! read table sequential run=256
    for (int i = 0; i < n; i++) out[i] = local[in[i]];  //! read in sequential run=500 //! write out sequential run=500
}
