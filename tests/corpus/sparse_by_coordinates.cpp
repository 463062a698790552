// truth: scatter_entries n=200 row[200]=0..31 col[200]=0..31 val[200] dense[1024]
extern "C" void scatter_entries(int n, const int *row, const int *col, const float *val, float *dense) {
#pragma HLS INTERFACE m_axi port=row bundle=g0
#pragma HLS INTERFACE m_axi port=col bundle=g1
#pragma HLS INTERFACE m_axi port=val bundle=g2
#pragma HLS INTERFACE m_axi port=dense bundle=g3
    for (int i = 0; i < n; i++)
        dense[row[i] * 32 + col[i]] = val[i];  //! read row sequential run=200 //! read col sequential run=200 //! read val sequential run=200 //! write dense indirect run=1 tells=indirect-index
}
