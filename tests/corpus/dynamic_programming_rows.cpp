// truth: align la=40 lb=50 a[40] b[50] score[2091]
// Each row of the score matrix is made from the row before, which is still in memory.
#define MAX(x, y) ((x) > (y) ? (x) : (y))
extern "C" void align(int la, int lb, const char *a, const char *b, int *score) {
#pragma HLS INTERFACE m_axi port=a bundle=g0
#pragma HLS INTERFACE m_axi port=b bundle=g1
#pragma HLS INTERFACE m_axi port=score bundle=g2
    int pitch = lb + 1;
    for (int j = 0; j <= lb; j++) score[j] = -j;  //! write score sequential run=51
    for (int i = 1; i <= la; i++) {
        score[i * pitch] = -i;  //! write score strided stride=204
        for (int j = 1; j <= lb; j++) {
            int same = a[i - 1] == b[j - 1] ? 2 : -1;  //! read a repeated //! read b sequential run=50
            int diagonal = score[(i - 1) * pitch + j - 1];  //! read score sequential run=50
            int up = score[(i - 1) * pitch + j];  //! read score sequential run=50
            int left = score[i * pitch + j - 1];  //! read score sequential run=50
            int best = MAX(diagonal + same, MAX(up, left) - 1);
            score[i * pitch + j] = best;  //! write score sequential run=50
        }
    }
}
