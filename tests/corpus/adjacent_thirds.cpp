// truth: luminance rgb[1536] y[512]
// Weights 0.299, 0.587, 0.114 of ITU-R BT.601 (from memory), times 256.
extern "C" void luminance(const unsigned char *rgb, unsigned char *y) {
#pragma HLS INTERFACE m_axi port=rgb bundle=gmem0
#pragma HLS INTERFACE m_axi port=y bundle=gmem1
    for (int i = 0; i < 512; i++) {
        int sum = 77 * rgb[3 * i];  //! read rgb sequential joined run=1536
        sum += 150 * rgb[3 * i + 1];  //! read rgb sequential joined run=1536
        sum += 29 * rgb[3 * i + 2];  //! read rgb sequential joined run=1536
        y[i] = sum >> 8;  //! write y sequential run=512
    }
}
