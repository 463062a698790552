// truth: find_storm n=2000 dbz[2000]=0..500 where[1]
extern "C" void find_storm(int n, const int *dbz, int *where) {
#pragma HLS INTERFACE m_axi port=dbz bundle=gmem0
#pragma HLS INTERFACE m_axi port=where bundle=gmem1
    int found = -1;
    for (int i = 0; i < n; i++) {
        if (dbz[i] == 500) {  //! read dbz sequential run=data tells=early-exit
            found = i;
            break;
        }
    }
    where[0] = found;  //! write where single
}
