// truth: lookup n=256 idx[256]=0..2047 table[2048] out[256]
extern "C" void lookup(int n, const int *idx, const float *table, float *out) {
#pragma HLS INTERFACE m_axi port=idx bundle=g0
#pragma HLS INTERFACE m_axi port=table bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    for (int i = 0; i < n; i++)
        out[i] = table[idx[i]];  //! read idx sequential run=256 //! read table indirect run=1 tells=indirect-index //! write out sequential run=256
}
