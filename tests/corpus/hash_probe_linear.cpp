// truth: probe n=100 keys[100]=0..9999 table[1088]=0..4 where[100]
// Looks on until a free slot is found. 40503 is 2^16 over the golden ratio: Knuth, TAOCP vol. 3, section 6.4 (from memory).
extern "C" void probe(int n, const unsigned *keys, const unsigned *table, int *where) {
#pragma HLS INTERFACE m_axi port=keys bundle=g0
#pragma HLS INTERFACE m_axi port=table bundle=g1
#pragma HLS INTERFACE m_axi port=where bundle=g2
    for (int i = 0; i < n; i++) {
        unsigned slot = (keys[i] * 40503u) % 1024u;  //! read keys sequential run=100
        while (table[slot] != 0 && slot < 1087) slot++;  //! read table sequential/indirect run=data tells=early-exit tells=early-exit
        where[i] = slot;  //! write where sequential run=100
    }
}
