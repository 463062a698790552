// truth: prefix n=400 a[400] b[400]
extern "C" void prefix(int n, const int *a, int *b) {
#pragma HLS INTERFACE m_axi port=a bundle=g0
#pragma HLS INTERFACE m_axi port=b bundle=g1
    int sum = 0;
    for (int i = 0; i < n; i++) b[i] = (sum += a[i]);  //! read a sequential run=400 //! write b sequential run=400
}
