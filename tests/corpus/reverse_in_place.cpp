// truth: reverse n=300 a[300]
extern "C" void reverse(int n, int *a) {
#pragma HLS INTERFACE m_axi port=a bundle=g0
    int low = 0, high = n - 1;
    while (low < high) {
        int first = a[low];  //! read a sequential run=150
        int last = a[high];  //! read a descending
        a[low++] = last;  //! write a sequential run=150
        a[high--] = first;  //! write a descending
    }
}
