// truth: fill_banks in[300]=0..255 low[300] high[300]
struct Bank {
    int *base;
    int used;
};
extern "C" void fill_banks(const int *in, int *low, int *high) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=low bundle=g1
#pragma HLS INTERFACE m_axi port=high bundle=g2
    Bank banks[2] = {{low, 0}, {high, 0}};
    for (int i = 0; i < 300; i++) {
        int x = in[i];  //! read in sequential run=300
        Bank &bank = banks[x > 127];
        bank.base[bank.used++] = x;  //! write low,high steered tells=data-dependent-destination
    }
}
