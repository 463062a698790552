// truth: prefix n=400 a[400]
extern "C" void prefix(int n, int *a) {
#pragma HLS INTERFACE m_axi port=a bundle=g0
    for (int i = 1; i < n; i++)
        a[i] = a[i] + a[i - 1];  //! read a sequential run=399 tells=in-place-update //! write a sequential run=399
}
