// truth: pass n=200 a[200]=permutation
extern "C" void pass(int n, int *a) {
#pragma HLS INTERFACE m_axi port=a bundle=g0
    for (int i = 0; i < n - 1; i++) {
        int left = a[i];  //! read a sequential run=199
        int right = a[i + 1];  //! read a sequential run=199
        if (left > right) {
            a[i] = right;  //! write a sequential run=data guarded
            a[i + 1] = left;  //! write a sequential run=data guarded
        }
    }
}
