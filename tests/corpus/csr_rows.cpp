// truth: spmv rows=64 row[65]=rows:2..6 col[400]=0..255 val[400] x[256] y[64]
extern "C" void spmv(int rows, const int *row, const int *col, const float *val, const float *x, float *y) {
#pragma HLS INTERFACE m_axi port=row bundle=g0
#pragma HLS INTERFACE m_axi port=col bundle=g1
#pragma HLS INTERFACE m_axi port=val bundle=g2
#pragma HLS INTERFACE m_axi port=x bundle=g3
#pragma HLS INTERFACE m_axi port=y bundle=g4
    for (int r = 0; r < rows; r++) {
        float sum = 0;
        int begin = row[r];  //! read row sequential run=64 tells=interleaved-accesses
        int end = row[r + 1];  //! read row sequential run=64 tells=interleaved-accesses
        for (int k = begin; k < end; k++) {
            int c = col[k];  //! read col sequential/indirect run=data
            float v = val[k];  //! read val sequential/indirect run=data
            sum += v * x[c];  //! read x indirect run=1 tells=indirect-index
        }
        y[r] = sum;  //! write y sequential run=64
    }
}
