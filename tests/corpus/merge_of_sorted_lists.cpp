// truth: merge_lists na=128 nb=128 a[128]=iota b[128]=iota out[256]
// Which list gives the next element depends on what was read.
extern "C" void merge_lists(int na, int nb, const int *a, const int *b, int *out) {
#pragma HLS INTERFACE m_axi port=a bundle=g0
#pragma HLS INTERFACE m_axi port=b bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    int i = 0, j = 0;
    for (int k = 0; k < na + nb; k++) {
        bool left = j >= nb || (i < na && a[i] <= b[j]);  //! read a sequential/indirect/repeated/irregular run=data guarded //! read b sequential/indirect/repeated/irregular run=data guarded
        if (left)
            out[k] = a[i++];  //! read a sequential/indirect/steered run=data guarded //! write out sequential joined run=256
        else
            out[k] = b[j++];  //! read b sequential/indirect/steered run=data guarded //! write out sequential joined run=256
    }
}
