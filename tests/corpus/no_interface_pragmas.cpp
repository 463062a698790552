// truth: plain in[128] out[128]
// Ports without a directive: each pointer of the top function is one of its own.
extern "C" void plain(const float *in, float *out) {
    for (int i = 0; i < 128; i++) out[i] = in[i] * in[i];  //! read in sequential run=128 //! write out sequential run=128
}
