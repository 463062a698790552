// truth: probe n=300 keys[300]=0..9999 table[1024]=0..9999 hits[1]
// 2654435761 is 2^32 over the golden ratio, made prime: Knuth, TAOCP vol. 3, section 6.4 (from memory).
static unsigned hash_of(unsigned key) {
    key ^= key >> 7;
    key *= 2654435761u;
    return (key >> 13) & 1023u;
}
extern "C" void probe(int n, const unsigned *keys, const unsigned *table, unsigned *hits) {
#pragma HLS INTERFACE m_axi port=keys bundle=g0
#pragma HLS INTERFACE m_axi port=table bundle=g1
#pragma HLS INTERFACE m_axi port=hits bundle=g2
    unsigned found = 0;
    for (int i = 0; i < n; i++) {
        unsigned key = keys[i];  //! read keys sequential run=300
        if (table[hash_of(key)] == key) found++;  //! read table indirect run=1 tells=indirect-index
    }
    *hits = found;  //! write hits single
}
