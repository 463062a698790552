// truth: expand frontier_size=30 frontier[30]=permutation row[65]=rows:1..4 neighbour[256]=0..63 level[64]=zero
extern "C" void expand(int frontier_size, const int *frontier, const int *row, const int *neighbour, int *level) {
#pragma HLS INTERFACE m_axi port=frontier bundle=g0
#pragma HLS INTERFACE m_axi port=row bundle=g1
#pragma HLS INTERFACE m_axi port=neighbour bundle=g2
#pragma HLS INTERFACE m_axi port=level bundle=g3
    for (int f = 0; f < frontier_size; f++) {
        int v = frontier[f];  //! read frontier sequential run=30
        int begin = row[v];  //! read row indirect run=1 tells=indirect-index
        int end = row[v + 1];  //! read row indirect run=1
        for (int e = begin; e < end; e++) {
            int w = neighbour[e];  //! read neighbour sequential/indirect run=data
            if (level[w] == 0)  //! read level indirect run=1 tells=indirect-index
                level[w] = 7;  //! write level indirect run=1 guarded
        }
    }
}
